import type { Migration } from './migration';
import { guardByWorkshop } from './migration';

const TABLES = `
  CREATE TABLE quotes (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL,
    revision_id uuid NOT NULL,
    revision_letter text NOT NULL,
    revision_hash text NOT NULL CHECK (revision_hash ~ '^[0-9a-f]{64}$'),
    stock text NOT NULL CHECK (stock IN ('trial', 'production')),
    stock_label text NOT NULL,
    statement text NOT NULL CHECK (statement IN ('cut-and-bend-to-our-flat', 'formed-sizes-rule')),
    quantities jsonb NOT NULL,
    state text NOT NULL CHECK (state IN ('asked', 'priced', 'refused', 'unreachable')),
    breaks jsonb NOT NULL DEFAULT '[]',
    refusal text,
    quote_reference text,
    valid_until timestamptz,
    asked_by uuid NOT NULL REFERENCES users (id),
    asked_at timestamptz NOT NULL,
    idempotency_key text NOT NULL,
    UNIQUE (workshop_id, id),
    CONSTRAINT quotes_once UNIQUE (workshop_id, asked_by, idempotency_key),
    FOREIGN KEY (workshop_id, revision_id) REFERENCES revisions (workshop_id, id),
    CHECK ((state = 'priced') = (valid_until IS NOT NULL)),
    CHECK ((state = 'refused') = (refusal IS NOT NULL)),
    CHECK (state <> 'priced' OR quote_reference IS NOT NULL)
  );
  CREATE INDEX quotes_of_revision ON quotes (revision_id, asked_at DESC);

  CREATE TABLE orders (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL REFERENCES workshops (id),
    number integer NOT NULL CHECK (number > 0),
    quote_id uuid NOT NULL,
    quote_reference text NOT NULL,
    part_id uuid NOT NULL,
    part_name text NOT NULL,
    part_number text NOT NULL,
    revision_id uuid NOT NULL,
    revision_letter text NOT NULL,
    revision_hash text NOT NULL CHECK (revision_hash ~ '^[0-9a-f]{64}$'),
    stock text NOT NULL CHECK (stock IN ('trial', 'production')),
    stock_label text NOT NULL,
    statement text NOT NULL CHECK (statement IN ('cut-and-bend-to-our-flat', 'formed-sizes-rule')),
    quantity integer NOT NULL CHECK (quantity > 0),
    total_minor integer NOT NULL CHECK (total_minor > 0),
    currency text NOT NULL CHECK (currency IN ('EUR', 'USD')),
    lines jsonb NOT NULL,
    lead_time_days integer NOT NULL CHECK (lead_time_days >= 0),
    state text NOT NULL,
    payment_state text NOT NULL,
    tracking_code text,
    revision integer NOT NULL,
    checkout_round integer NOT NULL DEFAULT 0,
    checkout_id text,
    shop_order_reference text,
    placed_by uuid NOT NULL REFERENCES users (id),
    placed_by_name text NOT NULL,
    placed_by_email text NOT NULL,
    placed_at timestamptz NOT NULL,
    UNIQUE (workshop_id, id),
    CONSTRAINT orders_number_once UNIQUE (workshop_id, number),
    FOREIGN KEY (workshop_id, quote_id) REFERENCES quotes (workshop_id, id),
    FOREIGN KEY (workshop_id, part_id) REFERENCES parts (workshop_id, id),
    FOREIGN KEY (workshop_id, revision_id) REFERENCES revisions (workshop_id, id),
    CHECK (state IN ('placed', 'paid', 'accepted', 'cutting', 'bending', 'shipped', 'refused', 'cancelled')),
    CHECK (payment_state IN ('open', 'paid', 'failed', 'refunded'))
  );
  CREATE INDEX orders_newest ON orders (workshop_id, number DESC);

  CREATE TABLE order_events (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL,
    order_id uuid NOT NULL,
    key text NOT NULL,
    kind text NOT NULL,
    at timestamptz NOT NULL,
    source text NOT NULL,
    details jsonb NOT NULL,
    UNIQUE (workshop_id, id),
    CONSTRAINT order_events_once UNIQUE (order_id, key),
    FOREIGN KEY (workshop_id, order_id) REFERENCES orders (workshop_id, id)
  );

  CREATE TABLE mails (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL REFERENCES workshops (id),
    key text NOT NULL,
    order_id uuid,
    recipient text NOT NULL,
    subject text NOT NULL,
    body text NOT NULL,
    message_id text NOT NULL UNIQUE,
    state text NOT NULL DEFAULT 'waiting' CHECK (state IN ('waiting', 'sent', 'failed')),
    attempts integer NOT NULL DEFAULT 0,
    last_error text,
    created_at timestamptz NOT NULL,
    sent_at timestamptz,
    UNIQUE (workshop_id, id),
    CONSTRAINT mails_once UNIQUE (workshop_id, key),
    FOREIGN KEY (workshop_id, order_id) REFERENCES orders (workshop_id, id),
    CHECK ((state = 'sent') = (sent_at IS NOT NULL))
  );
  CREATE INDEX mails_newest ON mails (workshop_id, created_at DESC);
  CREATE INDEX mails_waiting ON mails (created_at) WHERE state = 'waiting';

  CREATE TABLE webhook_events (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL,
    provider text NOT NULL CHECK (provider IN ('payments', 'cutting')),
    event_id text NOT NULL,
    kind text NOT NULL,
    order_id uuid NOT NULL,
    happened_at timestamptz NOT NULL,
    body text NOT NULL,
    received_at timestamptz NOT NULL,
    UNIQUE (workshop_id, id),
    CONSTRAINT webhook_events_once UNIQUE (provider, event_id),
    FOREIGN KEY (workshop_id, order_id) REFERENCES orders (workshop_id, id)
  );

  -- Messages that proved nothing belong to no workshop; only their number is kept.
  CREATE TABLE webhook_refusals (
    provider text PRIMARY KEY CHECK (provider IN ('payments', 'cutting')),
    refused integer NOT NULL CHECK (refused > 0),
    last_at timestamptz NOT NULL
  );

  -- An outside service may be away for two days before its work counts as failed and a person has to look.
  SELECT pgboss.create_queue('mail',
    '{"policy":"standard","retryLimit":1000,"retryDelay":5,"retryBackoff":false,"expireInSeconds":60}');
  SELECT pgboss.create_queue('cutting-order',
    '{"policy":"standard","retryLimit":10000,"retryDelay":20,"retryBackoff":false,"expireInSeconds":60}');
  SELECT pgboss.create_queue('payment',
    '{"policy":"standard","retryLimit":10000,"retryDelay":20,"retryBackoff":false,"expireInSeconds":60}');
  GRANT SELECT, INSERT, UPDATE, DELETE ON ALL TABLES IN SCHEMA pgboss TO foldwright_app;
`;

const GUARDED = ['quotes', 'orders', 'order_events', 'mails', 'webhook_events'];

export const ordersAndMail: Migration = {
  name: '20261201-0300-orders-and-mail',
  async up({ query }) {
    await query(TABLES);
    for (const table of GUARDED) await query(guardByWorkshop(table));
    await query(`
      REVOKE UPDATE, DELETE ON webhook_events FROM foldwright_app;
      REVOKE DELETE ON orders, order_events, quotes, mails, webhook_refusals FROM foldwright_app;
    `);
  },
  async down({ query }) {
    await query(`
      SELECT pgboss.delete_queue('payment');
      SELECT pgboss.delete_queue('cutting-order');
      SELECT pgboss.delete_queue('mail');
      DROP TABLE webhook_refusals, webhook_events, mails, order_events, orders, quotes;
    `);
  },
};
