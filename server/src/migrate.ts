import { connectDatabase } from './database/database';
import { migrateDatabase } from './database/migrate';
import { seedDemo } from './database/seed-demo';
import { readMigrationEnvironment } from './env';
import { openFileStore } from './files/file-store';
import { openLog, tellFailure } from './process';

/** Bring the database to the newest schema, and give an empty installation its demo. */
async function main(): Promise<void> {
  const env = readMigrationEnvironment();
  const logger = openLog(env.logLevel, 'migrate');
  const steps = await migrateDatabase({ ownerUrl: env.ownerUrl, applicationPassword: env.applicationPassword });
  logger.info({ steps }, steps.length === 0 ? 'the schema is up to date' : 'the schema was brought up to date');
  if (!env.seedsDemo) return;
  const database = connectDatabase({ url: env.databaseUrl });
  try {
    const files = await openFileStore(env.filesDirectory);
    const isNew = await seedDemo({ ownerUrl: env.ownerUrl, database, files, now: () => new Date() });
    logger.info(isNew ? 'the demo was put in' : 'there is a workshop already; the demo was left out');
  } finally {
    await database.close();
  }
}

main().catch((error: unknown) => {
  tellFailure(error);
  process.exitCode = 1;
});
