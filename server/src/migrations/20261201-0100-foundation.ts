import PgBoss from 'pg-boss';
import type { Migration } from './migration';
import { guardByWorkshop } from './migration';

const TABLES = `
  CREATE FUNCTION foldwright_workshop() RETURNS uuid LANGUAGE sql STABLE AS
    $$ SELECT NULLIF(current_setting('foldwright.workshop', true), '')::uuid $$;
  CREATE FUNCTION foldwright_user() RETURNS uuid LANGUAGE sql STABLE AS
    $$ SELECT NULLIF(current_setting('foldwright.user', true), '')::uuid $$;
  CREATE FUNCTION foldwright_reads_all() RETURNS boolean LANGUAGE sql STABLE AS
    $$ SELECT COALESCE(current_setting('foldwright.system', true) = 'read', false) $$;

  CREATE TABLE workshops (
    id uuid PRIMARY KEY,
    name text NOT NULL CHECK (name <> ''),
    number_prefix text NOT NULL CHECK (number_prefix ~ '^[A-Z]{1,4}$'),
    time_zone text NOT NULL DEFAULT 'UTC',
    created_at timestamptz NOT NULL DEFAULT now()
  );

  CREATE TABLE users (
    id uuid PRIMARY KEY,
    email text NOT NULL UNIQUE CHECK (email = lower(email)),
    name text NOT NULL CHECK (name <> ''),
    password_hash text NOT NULL,
    is_operator boolean NOT NULL DEFAULT false,
    created_at timestamptz NOT NULL DEFAULT now()
  );

  CREATE TABLE memberships (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL REFERENCES workshops (id),
    user_id uuid NOT NULL REFERENCES users (id),
    role text NOT NULL CHECK (role IN ('owner', 'fabricator', 'viewer', 'customer')),
    created_at timestamptz NOT NULL DEFAULT now(),
    UNIQUE (workshop_id, id),
    UNIQUE (workshop_id, user_id)
  );
  CREATE INDEX memberships_user ON memberships (user_id);

  CREATE TABLE http_sessions (
    sid text PRIMARY KEY,
    sess json NOT NULL,
    expire timestamp(6) NOT NULL
  );
  CREATE INDEX http_sessions_expire ON http_sessions (expire);

  CREATE TABLE rate_limits (
    key varchar(255) PRIMARY KEY,
    points integer NOT NULL DEFAULT 0,
    expire bigint
  );

  CREATE TABLE live_events (
    seq integer GENERATED ALWAYS AS IDENTITY PRIMARY KEY,
    workshop_id uuid NOT NULL REFERENCES workshops (id),
    payload jsonb NOT NULL,
    created_at timestamptz NOT NULL DEFAULT now()
  );
  CREATE INDEX live_events_workshop ON live_events (workshop_id, seq);
  CREATE FUNCTION announce_live_event() RETURNS trigger LANGUAGE plpgsql AS $$
    BEGIN
      PERFORM pg_notify('foldwright_events', NEW.workshop_id::text);
      RETURN NULL;
    END $$;
  CREATE TRIGGER live_events_announce AFTER INSERT ON live_events
    FOR EACH ROW EXECUTE FUNCTION announce_live_event();

  CREATE TABLE audit_entries (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL REFERENCES workshops (id),
    user_id uuid REFERENCES users (id),
    by_name text NOT NULL,
    what text NOT NULL,
    about text,
    created_at timestamptz NOT NULL DEFAULT now(),
    UNIQUE (workshop_id, id)
  );
  CREATE INDEX audit_entries_newest ON audit_entries (workshop_id, created_at DESC);

  CREATE TABLE idempotency_keys (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL REFERENCES workshops (id),
    user_id uuid NOT NULL REFERENCES users (id),
    route text NOT NULL,
    key text NOT NULL,
    request_hash text NOT NULL,
    answer jsonb,
    created_at timestamptz NOT NULL DEFAULT now(),
    UNIQUE (workshop_id, id),
    UNIQUE (workshop_id, user_id, route, key)
  );

  CREATE TABLE worker_heartbeats (
    worker_id uuid PRIMARY KEY,
    started_at timestamptz NOT NULL DEFAULT now(),
    beat_at timestamptz NOT NULL DEFAULT now()
  );

  -- Facts about the installation itself, for the programs that set it up.
  CREATE TABLE installation_facts (
    name text PRIMARY KEY,
    value jsonb NOT NULL
  );

  -- Work that a worker has taken from the queue; what a dead one leaves here goes back.
  CREATE TABLE work_in_hand (
    queue_job_id uuid PRIMARY KEY,
    queue text NOT NULL,
    worker_id uuid NOT NULL,
    taken_at timestamptz NOT NULL DEFAULT now()
  );

  -- Runs with the owner's rights, since old rows of every workshop go; it takes no input, so it can do nothing else.
  CREATE FUNCTION foldwright_prune() RETURNS void LANGUAGE sql SECURITY DEFINER SET search_path = public, pg_temp AS $$
    DELETE FROM live_events WHERE created_at < now() - interval '1 day';
    DELETE FROM idempotency_keys WHERE created_at < now() - interval '7 days';
    DELETE FROM worker_heartbeats WHERE beat_at < now() - interval '1 day';
    DELETE FROM rate_limits WHERE expire < extract(epoch FROM now() - interval '1 hour') * 1000;
  $$;
`;

// A person sees their own memberships in every workshop, and the names of those workshops.
const POLICIES = `
  CREATE POLICY memberships_own ON memberships FOR SELECT USING (user_id = foldwright_user());

  ALTER TABLE workshops ENABLE ROW LEVEL SECURITY;
  CREATE POLICY workshops_current ON workshops USING (id = foldwright_workshop()) WITH CHECK (id = foldwright_workshop());
  CREATE POLICY workshops_own ON workshops FOR SELECT
    USING (EXISTS (SELECT 1 FROM memberships WHERE workshop_id = workshops.id AND user_id = foldwright_user()));
  CREATE POLICY workshops_system ON workshops FOR SELECT USING (foldwright_reads_all());

  REVOKE UPDATE, DELETE ON audit_entries FROM foldwright_app;
  REVOKE ALL ON installation_facts FROM foldwright_app;
`;

/** The queue's own plan, without its transaction: the migration has one. Queues are made here because only the owner may. */
function queuePlan(): string {
  return PgBoss.getConstructionPlans('pgboss').replace(/^\s*(BEGIN|COMMIT);\s*$/gm, '');
}

const QUEUE_RIGHTS = `
  GRANT USAGE ON SCHEMA pgboss TO foldwright_app;
  GRANT SELECT, INSERT, UPDATE, DELETE ON ALL TABLES IN SCHEMA pgboss TO foldwright_app;
  GRANT EXECUTE ON ALL FUNCTIONS IN SCHEMA pgboss TO foldwright_app;
`;

export const foundation: Migration = {
  name: '20261201-0100-foundation',
  async up({ query }) {
    await query(TABLES);
    for (const table of ['memberships', 'live_events', 'audit_entries', 'idempotency_keys']) {
      await query(guardByWorkshop(table));
    }
    await query(POLICIES);
    await query(queuePlan());
    await query(QUEUE_RIGHTS);
  },
  async down({ query }) {
    await query(`
      DROP SCHEMA pgboss CASCADE;
      DROP FUNCTION foldwright_prune;
      DROP TABLE installation_facts, work_in_hand, worker_heartbeats, idempotency_keys, audit_entries, live_events, rate_limits, http_sessions;
      DROP POLICY workshops_own ON workshops;
      DROP TABLE memberships, users, workshops;
      DROP FUNCTION announce_live_event, foldwright_reads_all, foldwright_user, foldwright_workshop;
    `);
  },
};
