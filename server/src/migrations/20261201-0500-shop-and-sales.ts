import type { Migration } from './migration';
import { guardByWorkshop } from './migration';

const SHOP = `
  CREATE TABLE shops (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL UNIQUE REFERENCES workshops (id),
    slug text NOT NULL CONSTRAINT shops_slug_once UNIQUE CHECK (slug ~ '^[a-z0-9]+(-[a-z0-9]+)*$'),
    is_open boolean NOT NULL DEFAULT false,
    headline text NOT NULL,
    about text NOT NULL,
    currency text NOT NULL CHECK (currency IN ('EUR', 'USD')),
    tax_name text NOT NULL,
    tax_basis_points integer NOT NULL CHECK (tax_basis_points BETWEEN 0 AND 3000),
    tax_number text NOT NULL,
    postage_minor integer NOT NULL CHECK (postage_minor >= 0),
    packing_days integer NOT NULL CHECK (packing_days >= 0),
    sender_address text NOT NULL,
    questions_to text NOT NULL,
    revision integer NOT NULL DEFAULT 1,
    UNIQUE (workshop_id, id)
  );

  CREATE TABLE listings (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL REFERENCES workshops (id),
    state text NOT NULL DEFAULT 'draft' CHECK (state IN ('draft', 'published', 'withdrawn')),
    revision_id uuid,
    kit_id uuid,
    slug text NOT NULL,
    title text NOT NULL,
    summary text NOT NULL,
    fits text NOT NULL,
    does_not_fit text NOT NULL,
    fitting_steps text NOT NULL,
    price_minor integer NOT NULL CHECK (price_minor >= 0),
    finishes jsonb NOT NULL,
    lead_time_days integer NOT NULL CHECK (lead_time_days > 0),
    revision integer NOT NULL DEFAULT 1,
    created_at timestamptz NOT NULL,
    UNIQUE (workshop_id, id),
    CONSTRAINT listings_slug_once UNIQUE (workshop_id, slug),
    FOREIGN KEY (workshop_id, revision_id) REFERENCES revisions (workshop_id, id),
    FOREIGN KEY (workshop_id, kit_id) REFERENCES kits (workshop_id, id),
    CHECK ((revision_id IS NULL) <> (kit_id IS NULL))
  );
  CREATE TABLE listing_photos (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL,
    listing_id uuid NOT NULL,
    position integer NOT NULL,
    description text NOT NULL,
    stored_as text NOT NULL,
    content_type text NOT NULL,
    UNIQUE (workshop_id, id),
    FOREIGN KEY (workshop_id, listing_id) REFERENCES listings (workshop_id, id)
  );
`;

const SALES = `
  CREATE TABLE sales (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL REFERENCES workshops (id),
    number integer NOT NULL CHECK (number > 0),
    -- The private link. Whoever has it sees the order, so it is as long as a key.
    link text NOT NULL CONSTRAINT sales_link_once UNIQUE CHECK (length(link) >= 40),
    idempotency_key text NOT NULL,
    request_hash text NOT NULL,
    customer_id uuid REFERENCES users (id),
    customer_name text NOT NULL,
    customer_email text NOT NULL,
    address jsonb NOT NULL,
    currency text NOT NULL CHECK (currency IN ('EUR', 'USD')),
    items_minor integer NOT NULL CHECK (items_minor >= 0),
    postage_minor integer NOT NULL CHECK (postage_minor >= 0),
    tax_name text NOT NULL,
    tax_basis_points integer NOT NULL,
    tax_minor integer NOT NULL CHECK (tax_minor >= 0),
    total_minor integer NOT NULL CHECK (total_minor > 0 AND total_minor = items_minor + postage_minor),
    leaves_in_days integer NOT NULL,
    state text NOT NULL CHECK (state IN ('placed', 'paid', 'partly-shipped', 'shipped', 'delivered', 'cancelled')),
    payment_state text NOT NULL CHECK (payment_state IN ('open', 'paid', 'failed', 'partly-refunded', 'refunded')),
    refunded_minor integer NOT NULL DEFAULT 0 CHECK (refunded_minor BETWEEN 0 AND total_minor),
    checkout_round integer NOT NULL DEFAULT 0,
    checkout_id text,
    revision integer NOT NULL,
    placed_at timestamptz NOT NULL,
    UNIQUE (workshop_id, id),
    CONSTRAINT sales_number_once UNIQUE (workshop_id, number),
    CONSTRAINT sales_once UNIQUE (workshop_id, idempotency_key)
  );
  CREATE INDEX sales_newest ON sales (workshop_id, number DESC);
  CREATE INDEX sales_of_customer ON sales (customer_id, placed_at DESC) WHERE customer_id IS NOT NULL;

  CREATE TABLE sale_lines (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL,
    sale_id uuid NOT NULL,
    position integer NOT NULL,
    listing_id uuid NOT NULL,
    kind text NOT NULL CHECK (kind IN ('bracket', 'kit')),
    title text NOT NULL,
    finish_id text NOT NULL,
    fitting_steps text NOT NULL,
    quantity integer NOT NULL CHECK (quantity > 0),
    cancelled integer NOT NULL DEFAULT 0 CHECK (cancelled BETWEEN 0 AND quantity),
    each_minor integer NOT NULL CHECK (each_minor >= 0),
    total_minor integer NOT NULL CHECK (total_minor = each_minor * quantity),
    tax_minor integer NOT NULL,
    UNIQUE (workshop_id, id),
    UNIQUE (sale_id, position),
    FOREIGN KEY (workshop_id, sale_id) REFERENCES sales (workshop_id, id),
    FOREIGN KEY (workshop_id, listing_id) REFERENCES listings (workshop_id, id)
  );

  -- What has to reach the customer, piece by piece: the exact revision and hash as they were when it was sold.
  CREATE TABLE sale_items (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL,
    sale_id uuid NOT NULL,
    line_id uuid NOT NULL,
    position integer NOT NULL,
    revision_id uuid,
    part_id uuid,
    part_name text,
    part_number text,
    letter text,
    hash text CHECK (hash ~ '^[0-9a-f]{64}$'),
    hand text CHECK (hand IN ('either', 'left', 'right')),
    finish_id text,
    hardware_id uuid,
    hardware_name text,
    hardware_specification text,
    /* How many belong to one of the line. */
    per_line integer NOT NULL CHECK (per_line > 0),
    quantity integer NOT NULL CHECK (quantity > 0),
    reserved integer NOT NULL DEFAULT 0 CHECK (reserved >= 0),
    shipped integer NOT NULL DEFAULT 0 CHECK (shipped >= 0),
    cancelled integer NOT NULL DEFAULT 0 CHECK (cancelled >= 0),
    returned integer NOT NULL DEFAULT 0 CHECK (returned >= 0),
    UNIQUE (workshop_id, id),
    UNIQUE (sale_id, position),
    FOREIGN KEY (workshop_id, sale_id) REFERENCES sales (workshop_id, id),
    FOREIGN KEY (workshop_id, line_id) REFERENCES sale_lines (workshop_id, id),
    FOREIGN KEY (workshop_id, revision_id) REFERENCES revisions (workshop_id, id),
    FOREIGN KEY (workshop_id, part_id) REFERENCES parts (workshop_id, id),
    FOREIGN KEY (workshop_id, hardware_id) REFERENCES hardware_items (workshop_id, id),
    CHECK ((revision_id IS NULL) <> (hardware_id IS NULL)),
    CHECK ((revision_id IS NULL) = (hash IS NULL) AND (revision_id IS NULL) = (finish_id IS NULL)
      AND (revision_id IS NULL) = (letter IS NULL) AND (revision_id IS NULL) = (hand IS NULL) AND (revision_id IS NULL) = (part_id IS NULL)),
    CHECK ((hardware_id IS NULL) = (hardware_name IS NULL)),
    CONSTRAINT sale_items_balance CHECK (reserved + shipped + cancelled <= quantity AND returned <= shipped)
  );
  CREATE INDEX sale_items_of_revision ON sale_items (revision_id) WHERE revision_id IS NOT NULL;
  CREATE INDEX sale_items_of_hardware ON sale_items (hardware_id) WHERE hardware_id IS NOT NULL;

  CREATE TABLE sale_facts (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL,
    sale_id uuid NOT NULL,
    key text NOT NULL,
    kind text NOT NULL,
    at timestamptz NOT NULL,
    source text NOT NULL,
    details jsonb NOT NULL,
    UNIQUE (workshop_id, id),
    CONSTRAINT sale_facts_once UNIQUE (sale_id, key),
    FOREIGN KEY (workshop_id, sale_id) REFERENCES sales (workshop_id, id)
  );

  CREATE TABLE shipments (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL,
    sale_id uuid NOT NULL,
    number integer NOT NULL,
    carrier text NOT NULL,
    tracking_code text,
    shipped_at timestamptz NOT NULL,
    delivered_at timestamptz,
    UNIQUE (workshop_id, id),
    UNIQUE (sale_id, number),
    FOREIGN KEY (workshop_id, sale_id) REFERENCES sales (workshop_id, id)
  );
  CREATE TABLE shipment_items (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL,
    shipment_id uuid NOT NULL,
    item_id uuid NOT NULL,
    quantity integer NOT NULL CHECK (quantity > 0),
    UNIQUE (workshop_id, id),
    UNIQUE (shipment_id, item_id),
    FOREIGN KEY (workshop_id, shipment_id) REFERENCES shipments (workshop_id, id),
    FOREIGN KEY (workshop_id, item_id) REFERENCES sale_items (workshop_id, id)
  );

  CREATE TABLE refunds (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL,
    sale_id uuid NOT NULL,
    key text NOT NULL,
    payment_id text NOT NULL,
    amount_minor integer NOT NULL CHECK (amount_minor > 0),
    reason text NOT NULL,
    state text NOT NULL CHECK (state IN ('asked', 'sent', 'done', 'failed')),
    problem text,
    attempt integer NOT NULL DEFAULT 1 CHECK (attempt > 0),
    asked_at timestamptz NOT NULL,
    UNIQUE (workshop_id, id),
    CONSTRAINT refunds_once UNIQUE (sale_id, key),
    FOREIGN KEY (workshop_id, sale_id) REFERENCES sales (workshop_id, id),
    CHECK (state <> 'failed' OR problem IS NOT NULL)
  );

  -- Which order to the cutting service makes what for which sale.
  CREATE TABLE cut_assignments (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL,
    sale_id uuid NOT NULL,
    item_id uuid NOT NULL,
    order_id uuid NOT NULL,
    quantity integer NOT NULL CHECK (quantity > 0),
    arrived integer NOT NULL DEFAULT 0 CHECK (arrived BETWEEN 0 AND quantity),
    UNIQUE (workshop_id, id),
    UNIQUE (item_id, order_id),
    FOREIGN KEY (workshop_id, sale_id) REFERENCES sales (workshop_id, id),
    FOREIGN KEY (workshop_id, item_id) REFERENCES sale_items (workshop_id, id),
    FOREIGN KEY (workshop_id, order_id) REFERENCES orders (workshop_id, id)
  );

  CREATE TABLE questions (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL REFERENCES workshops (id),
    sale_id uuid,
    listing_id uuid,
    asker_name text NOT NULL,
    asker_email text NOT NULL,
    link text NOT NULL CONSTRAINT questions_link_once UNIQUE CHECK (length(link) >= 40),
    asked_at timestamptz NOT NULL,
    is_answered boolean NOT NULL DEFAULT false,
    UNIQUE (workshop_id, id),
    FOREIGN KEY (workshop_id, sale_id) REFERENCES sales (workshop_id, id),
    FOREIGN KEY (workshop_id, listing_id) REFERENCES listings (workshop_id, id)
  );
  CREATE TABLE question_messages (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL,
    question_id uuid NOT NULL,
    key text NOT NULL,
    side text NOT NULL CHECK (side IN ('customer', 'workshop')),
    by_name text NOT NULL,
    text text NOT NULL CHECK (text <> ''),
    at timestamptz NOT NULL,
    UNIQUE (workshop_id, id),
    CONSTRAINT question_messages_once UNIQUE (question_id, key),
    FOREIGN KEY (workshop_id, question_id) REFERENCES questions (workshop_id, id)
  );

  ALTER TABLE stock_moves
    ADD CONSTRAINT stock_moves_sale FOREIGN KEY (workshop_id, sale_id) REFERENCES sales (workshop_id, id);

  -- Messages and mails are now about an order to the cutting service or about a sale.
  ALTER TABLE webhook_events
    ALTER COLUMN order_id DROP NOT NULL,
    ADD COLUMN sale_id uuid,
    ADD CONSTRAINT webhook_events_sale FOREIGN KEY (workshop_id, sale_id) REFERENCES sales (workshop_id, id),
    ADD CONSTRAINT webhook_events_about CHECK ((order_id IS NULL) <> (sale_id IS NULL));
  ALTER TABLE mails
    ADD COLUMN sale_id uuid,
    ADD CONSTRAINT mails_sale FOREIGN KEY (workshop_id, sale_id) REFERENCES sales (workshop_id, id);
`;

// Postings of one entry add up to nothing: looked at when the transaction ends, so they can be written one by one.
const LEDGER = `
  CREATE TABLE ledger_entries (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL REFERENCES workshops (id),
    key text NOT NULL,
    at timestamptz NOT NULL,
    text text NOT NULL,
    sale_id uuid,
    order_id uuid,
    UNIQUE (workshop_id, id),
    CONSTRAINT ledger_entries_once UNIQUE (workshop_id, key),
    FOREIGN KEY (workshop_id, sale_id) REFERENCES sales (workshop_id, id),
    FOREIGN KEY (workshop_id, order_id) REFERENCES orders (workshop_id, id)
  );
  CREATE INDEX ledger_entries_newest ON ledger_entries (workshop_id, at DESC);
  CREATE TABLE ledger_postings (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL,
    entry_id uuid NOT NULL,
    account text NOT NULL CHECK (account IN ('payment-host', 'sales', 'postage', 'tax', 'refunds', 'cutting', 'paid-out')),
    amount_minor integer NOT NULL CHECK (amount_minor <> 0),
    currency text NOT NULL CHECK (currency IN ('EUR', 'USD')),
    UNIQUE (workshop_id, id),
    UNIQUE (entry_id, account),
    FOREIGN KEY (workshop_id, entry_id) REFERENCES ledger_entries (workshop_id, id)
  );
  CREATE FUNCTION check_ledger_balance() RETURNS trigger LANGUAGE plpgsql AS $$
    BEGIN
      IF (SELECT COALESCE(SUM(amount_minor), 0) FROM ledger_postings WHERE entry_id = NEW.entry_id) <> 0 THEN
        RAISE EXCEPTION 'postings of ledger entry % do not add up to nothing', NEW.entry_id USING ERRCODE = 'check_violation';
      END IF;
      RETURN NULL;
    END $$;
  CREATE CONSTRAINT TRIGGER ledger_postings_balance AFTER INSERT ON ledger_postings
    DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION check_ledger_balance();
`;

const QUEUES = `
  SELECT pgboss.create_queue('sale',
    '{"policy":"standard","retryLimit":10000,"retryDelay":20,"retryBackoff":false,"expireInSeconds":60}');
  GRANT SELECT, INSERT, UPDATE, DELETE ON ALL TABLES IN SCHEMA pgboss TO foldwright_app;
`;

const GUARDED = [
  ...['shops', 'listings', 'listing_photos', 'sales', 'sale_lines', 'sale_items', 'sale_facts'],
  ...['shipments', 'shipment_items', 'refunds', 'cut_assignments', 'questions', 'question_messages'],
  ...['ledger_entries', 'ledger_postings'],
];

export const shopAndSales: Migration = {
  name: '20261201-0500-shop-and-sales',
  async up({ query }) {
    await query(SHOP);
    await query(SALES);
    await query(LEDGER);
    for (const table of GUARDED) await query(guardByWorkshop(table));
    // Buyers see their own orders in every shop.
    await query('CREATE POLICY sales_own ON sales FOR SELECT USING (customer_id = foldwright_user())');
    await query(`
      REVOKE UPDATE, DELETE ON ledger_entries, ledger_postings, shipment_items, question_messages FROM foldwright_app;
      REVOKE DELETE ON shops, listings, sales, sale_lines, sale_items, sale_facts, shipments, refunds, cut_assignments, questions
        FROM foldwright_app;
    `);
    await query(QUEUES);
  },
  async down({ query }) {
    await query(`
      SELECT pgboss.delete_queue('sale');
      DROP TABLE ledger_postings, ledger_entries;
      DROP FUNCTION check_ledger_balance;
      DELETE FROM webhook_events WHERE order_id IS NULL;
      ALTER TABLE mails DROP COLUMN sale_id;
      ALTER TABLE webhook_events DROP COLUMN sale_id;
      ALTER TABLE webhook_events ALTER COLUMN order_id SET NOT NULL;
      ALTER TABLE stock_moves DROP CONSTRAINT stock_moves_sale;
      DROP TABLE question_messages, questions, cut_assignments, refunds, shipment_items, shipments, sale_facts, sale_items,
        sale_lines, sales, listing_photos, listings, shops;
    `);
  },
};
