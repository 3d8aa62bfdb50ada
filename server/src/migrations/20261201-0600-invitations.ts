import type { Migration } from './migration';
import { guardByWorkshop } from './migration';

const TABLES = `
  ALTER TABLE memberships ADD COLUMN revision integer NOT NULL DEFAULT 1;
  CREATE TABLE invitations (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL REFERENCES workshops (id),
    email text NOT NULL CHECK (email = lower(email)),
    role text NOT NULL CHECK (role IN ('owner', 'fabricator', 'viewer')),
    -- Only what the link hashes to: whoever reads this table can't join with it.
    link_hash text NOT NULL CONSTRAINT invitations_link_once UNIQUE CHECK (link_hash ~ '^[0-9a-f]{64}$'),
    invited_by uuid NOT NULL REFERENCES users (id),
    invited_by_name text NOT NULL,
    sent_at timestamptz NOT NULL,
    expires_at timestamptz NOT NULL,
    ended_at timestamptz,
    accepted_by uuid REFERENCES users (id),
    UNIQUE (workshop_id, id),
    CHECK (accepted_by IS NULL OR ended_at IS NOT NULL)
  );
  CREATE UNIQUE INDEX invitations_one_open ON invitations (workshop_id, email) WHERE ended_at IS NULL;
`;

export const invitations: Migration = {
  name: '20261201-0600-invitations',
  async up({ query }) {
    await query(TABLES);
    await query(guardByWorkshop('invitations'));
    await query('REVOKE DELETE ON invitations FROM foldwright_app');
  },
  async down({ query }) {
    await query(`
      DROP TABLE invitations;
      ALTER TABLE memberships DROP COLUMN revision;
    `);
  },
};
