/** What a migration may do: run SQL inside its own transaction, as the role that owns the tables. */
export interface MigrationContext {
  query(sql: string): Promise<void>;
}

/**
 * One step of the schema. Frozen once it has been merged: it imports neither models nor anything else that may change.
 * Names sort by time.
 */
export interface Migration {
  readonly name: string;
  up(context: MigrationContext): Promise<void>;
  down(context: MigrationContext): Promise<void>;
}

/**
 * SQL that holds a table with a column `workshop_id` to one workshop: rows are read and written only in a transaction
 * that has named their workshop; the system path reads all of them and writes none.
 */
export const guardByWorkshop = (table: string): string => `
  ALTER TABLE ${table} ENABLE ROW LEVEL SECURITY;
  CREATE POLICY ${table}_workshop ON ${table}
    USING (workshop_id = foldwright_workshop()) WITH CHECK (workshop_id = foldwright_workshop());
  CREATE POLICY ${table}_system ON ${table} FOR SELECT USING (foldwright_reads_all());
`;
