import type { Migration } from './migration';

// Messages that proved where they come from and could not be handled. They belong to no workshop before they are.
const TABLES = `
  CREATE TABLE failed_messages (
    id uuid PRIMARY KEY,
    provider text NOT NULL CHECK (provider IN ('payments', 'cutting')),
    event_id text NOT NULL,
    kind text NOT NULL,
    told jsonb NOT NULL,
    body text NOT NULL,
    error text NOT NULL,
    times integer NOT NULL CHECK (times > 0),
    last_at timestamptz NOT NULL,
    settled_at timestamptz,
    CONSTRAINT failed_messages_once UNIQUE (provider, event_id)
  );
`;

export const failedMessages: Migration = {
  name: '20261201-0700-failed-messages',
  async up({ query }) {
    await query(TABLES);
    await query('REVOKE DELETE ON failed_messages FROM foldwright_app');
  },
  async down({ query }) {
    await query('DROP TABLE failed_messages');
  },
};
