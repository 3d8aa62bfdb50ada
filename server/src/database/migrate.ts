import { withMigrator } from './migrator';

export interface MigrateOptions {
  /** Address of the database for the role that owns its tables. */
  readonly ownerUrl: string;
  /** Password that the application's role gets. */
  readonly applicationPassword: string;
}

/** Bring a database to the newest schema and answer the names of the steps that were run. */
export async function migrateDatabase({ ownerUrl, applicationPassword }: MigrateOptions): Promise<string[]> {
  return withMigrator(ownerUrl, applicationPassword, async (umzug) => (await umzug.up()).map(({ name }) => name));
}
