import type { Migration } from './migration';
import { guardByWorkshop } from './migration';

const TABLES = `
  ALTER TABLE parts
    ADD COLUMN hand text NOT NULL DEFAULT 'either' CHECK (hand IN ('either', 'left', 'right')),
    ADD COLUMN other_hand_of uuid,
    ADD CONSTRAINT parts_other_hand FOREIGN KEY (workshop_id, other_hand_of) REFERENCES parts (workshop_id, id),
    ADD CONSTRAINT parts_one_other_hand UNIQUE (workshop_id, other_hand_of);
  ALTER TABLE revisions
    ADD COLUMN hand text NOT NULL DEFAULT 'either' CHECK (hand IN ('either', 'left', 'right'));

  CREATE TABLE hardware_items (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL REFERENCES workshops (id),
    name text NOT NULL CHECK (name <> ''),
    specification text NOT NULL,
    cost_minor integer NOT NULL CHECK (cost_minor >= 0),
    currency text NOT NULL CHECK (currency IN ('EUR', 'USD')),
    is_in_use boolean NOT NULL DEFAULT true,
    revision integer NOT NULL DEFAULT 1,
    UNIQUE (workshop_id, id),
    CONSTRAINT hardware_once UNIQUE (workshop_id, name, specification)
  );

  CREATE TABLE part_hardware (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL,
    part_id uuid NOT NULL,
    hardware_id uuid NOT NULL,
    quantity integer NOT NULL CHECK (quantity > 0),
    UNIQUE (workshop_id, id),
    UNIQUE (part_id, hardware_id),
    FOREIGN KEY (workshop_id, part_id) REFERENCES parts (workshop_id, id),
    FOREIGN KEY (workshop_id, hardware_id) REFERENCES hardware_items (workshop_id, id)
  );

  CREATE TABLE kits (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL REFERENCES workshops (id),
    number text NOT NULL CHECK (number <> ''),
    name text NOT NULL CHECK (name <> ''),
    note text NOT NULL,
    revision integer NOT NULL DEFAULT 1,
    created_at timestamptz NOT NULL,
    UNIQUE (workshop_id, id),
    CONSTRAINT kits_number_once UNIQUE (workshop_id, number)
  );
  CREATE TABLE kit_lines (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL,
    kit_id uuid NOT NULL,
    position integer NOT NULL,
    revision_id uuid,
    finish_id text,
    hardware_id uuid,
    quantity integer NOT NULL CHECK (quantity > 0),
    UNIQUE (workshop_id, id),
    UNIQUE (kit_id, position),
    FOREIGN KEY (workshop_id, kit_id) REFERENCES kits (workshop_id, id),
    FOREIGN KEY (workshop_id, revision_id) REFERENCES revisions (workshop_id, id),
    FOREIGN KEY (workshop_id, hardware_id) REFERENCES hardware_items (workshop_id, id),
    CHECK ((revision_id IS NULL) <> (hardware_id IS NULL)),
    CHECK (finish_id IS NULL OR revision_id IS NOT NULL)
  );

  -- One thing on the shelf. The database itself keeps it from being reserved or sent twice.
  CREATE TABLE stock_positions (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL REFERENCES workshops (id),
    revision_id uuid,
    finish_id text,
    hardware_id uuid,
    on_hand integer NOT NULL DEFAULT 0,
    reserved integer NOT NULL DEFAULT 0,
    UNIQUE (workshop_id, id),
    FOREIGN KEY (workshop_id, revision_id) REFERENCES revisions (workshop_id, id),
    FOREIGN KEY (workshop_id, hardware_id) REFERENCES hardware_items (workshop_id, id),
    CONSTRAINT stock_kind CHECK ((revision_id IS NOT NULL) = (finish_id IS NOT NULL) AND (revision_id IS NULL) <> (hardware_id IS NULL)),
    CONSTRAINT stock_not_below_zero CHECK (reserved >= 0 AND on_hand >= reserved)
  );
  CREATE UNIQUE INDEX stock_bracket_once ON stock_positions (workshop_id, revision_id, finish_id) WHERE hardware_id IS NULL;
  CREATE UNIQUE INDEX stock_hardware_once ON stock_positions (workshop_id, hardware_id) WHERE hardware_id IS NOT NULL;

  -- What happened to it. Only ever added to; its sums are what the position says.
  CREATE TABLE stock_moves (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL,
    position_id uuid NOT NULL,
    key text NOT NULL,
    kind text NOT NULL CHECK (kind IN ('received', 'adjusted', 'reserved', 'released', 'shipped', 'returned')),
    on_hand_change integer NOT NULL,
    reserved_change integer NOT NULL,
    on_hand_after integer NOT NULL,
    reason text NOT NULL,
    sale_id uuid,
    order_id uuid,
    by_name text NOT NULL,
    at timestamptz NOT NULL,
    UNIQUE (workshop_id, id),
    CONSTRAINT stock_moves_once UNIQUE (workshop_id, key),
    FOREIGN KEY (workshop_id, position_id) REFERENCES stock_positions (workshop_id, id),
    FOREIGN KEY (workshop_id, order_id) REFERENCES orders (workshop_id, id),
    CHECK (on_hand_change <> 0 OR reserved_change <> 0)
  );
  CREATE INDEX stock_moves_of_position ON stock_moves (position_id, at DESC);
`;

const GUARDED = ['hardware_items', 'part_hardware', 'kits', 'kit_lines', 'stock_positions', 'stock_moves'];

export const stockAndKits: Migration = {
  name: '20261201-0400-stock-and-kits',
  async up({ query }) {
    await query(TABLES);
    for (const table of GUARDED) await query(guardByWorkshop(table));
    await query(`
      REVOKE UPDATE, DELETE ON stock_moves FROM foldwright_app;
      REVOKE DELETE ON stock_positions, hardware_items, kits FROM foldwright_app;
    `);
  },
  async down({ query }) {
    await query(`
      DROP TABLE stock_moves, stock_positions, kit_lines, kits, part_hardware, hardware_items;
      ALTER TABLE revisions DROP COLUMN hand;
      ALTER TABLE parts DROP COLUMN other_hand_of, DROP COLUMN hand;
    `);
  },
};
