import type { Migration } from './migration';

/** Solids of a revision are written after its release, by a worker: the modeller needs a second that nobody has to wait for. */
export const solids: Migration = {
  name: '20261201-0900-solids',
  async up({ query }) {
    await query(`
      ALTER TABLE revision_files DROP CONSTRAINT revision_files_kind_check;
      ALTER TABLE revision_files ADD CONSTRAINT revision_files_kind_check
        CHECK (kind IN ('dxf', 'drawing', 'full-size-print', 'step'));
      SELECT pgboss.create_queue('solid', '{"policy":"standard","retryLimit":3,"retryDelay":5,"expireInSeconds":300}');
      GRANT SELECT, INSERT, UPDATE, DELETE ON ALL TABLES IN SCHEMA pgboss TO foldwright_app;
    `);
  },
  async down({ query }) {
    await query(`
      SELECT pgboss.delete_queue('solid');
      DELETE FROM revision_files WHERE kind = 'step';
      ALTER TABLE revision_files DROP CONSTRAINT revision_files_kind_check;
      ALTER TABLE revision_files ADD CONSTRAINT revision_files_kind_check
        CHECK (kind IN ('dxf', 'drawing', 'full-size-print'));
    `);
  },
};
