import type { Migration } from './migration';
import { guardByWorkshop } from './migration';

const TABLES = `
  CREATE TABLE parts (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL REFERENCES workshops (id),
    number text NOT NULL CHECK (number <> ''),
    name text NOT NULL CHECK (name <> ''),
    revision integer NOT NULL DEFAULT 1,
    created_at timestamptz NOT NULL DEFAULT now(),
    updated_at timestamptz NOT NULL DEFAULT now(),
    UNIQUE (workshop_id, id),
    CONSTRAINT parts_number_once UNIQUE (workshop_id, number)
  );

  CREATE TABLE revisions (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL,
    part_id uuid NOT NULL,
    letter text NOT NULL,
    position integer NOT NULL,
    hash text NOT NULL CHECK (hash ~ '^[0-9a-f]{64}$'),
    note text NOT NULL,
    document jsonb NOT NULL,
    computed_trial jsonb NOT NULL,
    computed_production jsonb NOT NULL,
    accepted_caution_ids jsonb NOT NULL,
    rules_version text NOT NULL,
    tables_version text NOT NULL,
    released_by uuid NOT NULL REFERENCES users (id),
    released_at timestamptz NOT NULL,
    UNIQUE (workshop_id, id),
    UNIQUE (part_id, letter),
    UNIQUE (part_id, position),
    FOREIGN KEY (workshop_id, part_id) REFERENCES parts (workshop_id, id)
  );

  CREATE TABLE drafts (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL,
    part_id uuid NOT NULL,
    letter text NOT NULL,
    revision integer NOT NULL DEFAULT 0 CHECK (revision >= 0),
    document jsonb NOT NULL,
    has_outline boolean NOT NULL,
    furthest_step text NOT NULL,
    blockers integer NOT NULL DEFAULT 0,
    cautions integer NOT NULL DEFAULT 0,
    hints integer NOT NULL DEFAULT 0,
    updated_by uuid NOT NULL REFERENCES users (id),
    updated_at timestamptz NOT NULL DEFAULT now(),
    closed_at timestamptz,
    released_revision_id uuid,
    UNIQUE (workshop_id, id),
    FOREIGN KEY (workshop_id, part_id) REFERENCES parts (workshop_id, id),
    FOREIGN KEY (workshop_id, released_revision_id) REFERENCES revisions (workshop_id, id),
    CHECK ((closed_at IS NULL) = (released_revision_id IS NULL))
  );
  CREATE UNIQUE INDEX drafts_one_open ON drafts (part_id) WHERE closed_at IS NULL;

  CREATE TABLE command_batches (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL,
    draft_id uuid NOT NULL,
    batch_id uuid NOT NULL,
    revision integer NOT NULL,
    client_id text NOT NULL,
    commands jsonb NOT NULL,
    user_id uuid NOT NULL REFERENCES users (id),
    created_at timestamptz NOT NULL DEFAULT now(),
    UNIQUE (workshop_id, id),
    UNIQUE (draft_id, batch_id),
    UNIQUE (draft_id, revision),
    FOREIGN KEY (workshop_id, draft_id) REFERENCES drafts (workshop_id, id)
  );

  CREATE TABLE revision_files (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL,
    revision_id uuid NOT NULL,
    kind text NOT NULL CHECK (kind IN ('dxf', 'drawing', 'full-size-print')),
    stock text NOT NULL CHECK (stock IN ('trial', 'production')),
    paper text NOT NULL CHECK (paper IN ('none', 'A4', 'Letter')),
    file_name text NOT NULL,
    stored_as text NOT NULL,
    content_type text NOT NULL,
    byte_length integer NOT NULL,
    sha256 text NOT NULL CHECK (sha256 ~ '^[0-9a-f]{64}$'),
    UNIQUE (workshop_id, id),
    UNIQUE (revision_id, kind, stock, paper),
    FOREIGN KEY (workshop_id, revision_id) REFERENCES revisions (workshop_id, id)
  );

  CREATE TABLE photos (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL,
    part_id uuid NOT NULL,
    file_name text NOT NULL,
    media_type text NOT NULL,
    byte_length integer NOT NULL,
    template_kind text NOT NULL,
    template_thickness_mm double precision NOT NULL,
    ruler_x_mm double precision NOT NULL,
    ruler_y_mm double precision NOT NULL,
    width_px integer NOT NULL,
    height_px integer NOT NULL,
    original_stored_as text NOT NULL,
    display_stored_as text NOT NULL,
    rectified_stored_as text,
    rectified jsonb,
    trace jsonb,
    uploaded_by uuid NOT NULL REFERENCES users (id),
    uploaded_at timestamptz NOT NULL DEFAULT now(),
    UNIQUE (workshop_id, id),
    FOREIGN KEY (workshop_id, part_id) REFERENCES parts (workshop_id, id)
  );
  CREATE INDEX photos_of_part ON photos (part_id, uploaded_at);

  CREATE TABLE jobs (
    id uuid PRIMARY KEY,
    workshop_id uuid NOT NULL REFERENCES workshops (id),
    kind text NOT NULL CHECK (kind IN ('trace')),
    state text NOT NULL CHECK (state IN ('waiting', 'running', 'done', 'failed', 'stopped')),
    stages jsonb NOT NULL,
    failure jsonb,
    attempt integer NOT NULL DEFAULT 0,
    photo_id uuid,
    part_id uuid,
    queue_job_id uuid,
    worker_id uuid,
    created_at timestamptz NOT NULL DEFAULT now(),
    updated_at timestamptz NOT NULL DEFAULT now(),
    UNIQUE (workshop_id, id),
    FOREIGN KEY (workshop_id, photo_id) REFERENCES photos (workshop_id, id),
    FOREIGN KEY (workshop_id, part_id) REFERENCES parts (workshop_id, id)
  );
  CREATE INDEX jobs_of_photo ON jobs (photo_id, created_at);
  CREATE INDEX jobs_running ON jobs (worker_id) WHERE state = 'running';
  CREATE UNIQUE INDEX jobs_one_at_work ON jobs (photo_id) WHERE state IN ('waiting', 'running');

  SELECT pgboss.create_queue('trace', '{"policy":"standard","retryLimit":5,"retryDelay":0,"expireInSeconds":120}');
  GRANT SELECT, INSERT, UPDATE, DELETE ON ALL TABLES IN SCHEMA pgboss TO foldwright_app;
`;

const GUARDED = ['parts', 'revisions', 'drafts', 'command_batches', 'revision_files', 'photos', 'jobs'];

export const partsAndPhotos: Migration = {
  name: '20261201-0200-parts-and-photos',
  async up({ query }) {
    await query(TABLES);
    for (const table of GUARDED) await query(guardByWorkshop(table));
    // What is released or logged stays as it is, whatever the application does.
    await query('REVOKE UPDATE, DELETE ON revisions, revision_files, command_batches FROM foldwright_app;');
  },
  async down({ query }) {
    await query(`
      SELECT pgboss.delete_queue('trace');
      DROP TABLE jobs, photos, revision_files, command_batches, drafts, revisions, parts;
    `);
  },
};
