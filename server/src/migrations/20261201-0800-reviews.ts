import type { Migration } from './migration';
import { guardByWorkshop } from './migration';

const TABLES = `
  CREATE TABLE review_links (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL,
    revision_id uuid NOT NULL,
    -- Only what the link hashes to: whoever reads this table can't open it.
    link_hash text NOT NULL CONSTRAINT review_links_once UNIQUE CHECK (link_hash ~ '^[0-9a-f]{64}$'),
    guest_name text NOT NULL CHECK (guest_name <> ''),
    made_by uuid NOT NULL REFERENCES users (id),
    made_by_name text NOT NULL,
    made_by_email text NOT NULL,
    made_at timestamptz NOT NULL,
    expires_at timestamptz NOT NULL,
    withdrawn_at timestamptz,
    UNIQUE (workshop_id, id),
    FOREIGN KEY (workshop_id, revision_id) REFERENCES revisions (workshop_id, id)
  );
  CREATE TABLE comments (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL,
    key text NOT NULL,
    part_id uuid NOT NULL,
    revision_id uuid,
    letter text NOT NULL,
    place_x double precision,
    place_y double precision,
    text text NOT NULL CHECK (text <> ''),
    by_name text NOT NULL,
    by_user uuid REFERENCES users (id),
    review_link_id uuid,
    at timestamptz NOT NULL,
    resolved_at timestamptz,
    UNIQUE (workshop_id, id),
    CONSTRAINT comments_once UNIQUE (workshop_id, key),
    FOREIGN KEY (workshop_id, part_id) REFERENCES parts (workshop_id, id),
    FOREIGN KEY (workshop_id, revision_id) REFERENCES revisions (workshop_id, id),
    FOREIGN KEY (workshop_id, review_link_id) REFERENCES review_links (workshop_id, id),
    CHECK ((place_x IS NULL) = (place_y IS NULL)),
    CHECK ((by_user IS NULL) <> (review_link_id IS NULL))
  );
  CREATE INDEX comments_of_part ON comments (part_id, at);
  CREATE TABLE opinions (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL,
    key text NOT NULL,
    revision_id uuid NOT NULL,
    letter text NOT NULL,
    hash text NOT NULL CHECK (hash ~ '^[0-9a-f]{64}$'),
    verdict text NOT NULL CHECK (verdict IN ('agreed', 'changes-wanted')),
    note text NOT NULL,
    by_name text NOT NULL,
    by_user uuid REFERENCES users (id),
    review_link_id uuid,
    at timestamptz NOT NULL,
    UNIQUE (workshop_id, id),
    CONSTRAINT opinions_once UNIQUE (workshop_id, key),
    FOREIGN KEY (workshop_id, revision_id) REFERENCES revisions (workshop_id, id),
    FOREIGN KEY (workshop_id, review_link_id) REFERENCES review_links (workshop_id, id),
    CHECK ((by_user IS NULL) <> (review_link_id IS NULL))
  );
`;

export const reviews: Migration = {
  name: '20261201-0800-reviews',
  async up({ query }) {
    await query(TABLES);
    for (const table of ['review_links', 'comments', 'opinions']) await query(guardByWorkshop(table));
    await query(`
      REVOKE DELETE ON review_links, comments FROM foldwright_app;
      REVOKE UPDATE, DELETE ON opinions FROM foldwright_app;
    `);
  },
  async down({ query }) {
    await query('DROP TABLE opinions, comments, review_links');
  },
};
