import * as z from 'zod/mini';

const text = z.string().check(z.minLength(1));
const url = z.url('it is not an address such as http://127.0.0.1:4310');
const secret = z.string().check(z.minLength(32, 'it has to be at least 32 characters long'));
const PORT_WORDS = 'it is not a port from 0 to 65535';
const port = z.coerce.number(PORT_WORDS).check(z.int(PORT_WORDS), z.gte(0, PORT_WORDS), z.lte(65535, PORT_WORDS));
const COUNT_WORDS = 'it is not a whole number from 1';
const LEVELS = ['fatal', 'error', 'warn', 'info', 'debug', 'silent'] as const;
const oneOf = <const T extends readonly string[]>(values: T) => z.enum(values, `it is none of ${values.join(', ')}`);

const environmentSchema = z.object({
  NODE_ENV: z._default(oneOf(['development', 'production', 'test']), 'production'),
  LOG_LEVEL: z._default(oneOf(LEVELS), 'info'),
  FOLDWRIGHT_HOST: z._default(text, '127.0.0.1'),
  FOLDWRIGHT_PORT: z._default(port, 4310),
  FOLDWRIGHT_PUBLIC_URL: z.optional(url),
  FOLDWRIGHT_REQUESTS_PER_MINUTE: z._default(
    z.coerce.number(COUNT_WORDS).check(z.int(COUNT_WORDS), z.gte(1, COUNT_WORDS)),
    3000,
  ),
  DATABASE_URL: url,
  SESSION_SECRET: secret,
  FILES_DIR: z._default(text, '.data/files'),
  WEB_DIST: z._default(text, 'dist/foldwright/browser'),
  PAYMENT_API_KEY: text,
  PAYMENT_HOST_URL: url,
  PAYMENT_WEBHOOK_SECRET: text,
  CUTTING_SERVICE_URL: url,
  CUTTING_SERVICE_KEY: text,
  CUTTING_SERVICE_CALLBACK_SECRET: text,
  SMTP_URL: url,
  MAIL_FROM: z._default(text, 'Foldwright <no-reply@foldwright.example.test>'),
});

const migrationSchema = z.object({
  LOG_LEVEL: z._default(oneOf(LEVELS), 'info'),
  DATABASE_OWNER_URL: url,
  DATABASE_URL: url,
  FILES_DIR: z._default(text, '.data/files'),
  FOLDWRIGHT_SEED_DEMO: z._default(oneOf(['yes', 'no']), 'yes'),
});

/** Everything the web process and the worker take from outside. Names say what they are; see DEVELOPERS.md. */
export interface Environment {
  readonly mode: 'development' | 'production' | 'test';
  readonly logLevel: string;
  readonly host: string;
  readonly port: number;
  /** Where people reach this installation; links in mails and the origin check use it. */
  readonly publicUrl: string;
  readonly requestsPerMinute: number;
  readonly databaseUrl: string;
  readonly sessionSecret: string;
  readonly filesDirectory: string;
  readonly webDirectory: string;
  readonly payment: { readonly apiKey: string; readonly hostUrl: string; readonly webhookSecret: string };
  readonly cutting: { readonly url: string; readonly key: string; readonly callbackSecret: string };
  readonly mail: { readonly smtpUrl: string; readonly from: string };
}

/** What `migrate` needs: the owner's address, and the application's to give its role the password in it. */
export interface MigrationEnvironment {
  readonly logLevel: string;
  readonly ownerUrl: string;
  readonly databaseUrl: string;
  readonly applicationPassword: string;
  readonly filesDirectory: string;
  readonly seedsDemo: boolean;
}

/** A setting that can't be used; the message names the variable and says what is wrong, fit for a terminal. */
export class EnvironmentError extends Error {}

type Source = Readonly<Record<string, string | undefined>>;

function parse<S extends z.ZodMiniType>(schema: S, source: Source): z.output<S> {
  // An empty variable counts as absent, so that a line in a service file can be blanked.
  const present = Object.fromEntries(Object.entries(source).filter(([, value]) => value !== undefined && value !== ''));
  const result = z.safeParse(schema, present);
  if (result.success) return result.data;
  const lines = result.error.issues.map((issue) => {
    const name = String(issue.path[0]);
    return present[name] === undefined ? `${name} is missing.` : `${name} can’t be used: ${issue.message}.`;
  });
  throw new EnvironmentError(lines.join('\n'));
}

/**
 * Settings of the web process and the worker.
 * @throws EnvironmentError naming every variable that is missing or can't be used.
 */
export function readEnvironment(source: Source = process.env): Environment {
  const env = parse(environmentSchema, source);
  return {
    mode: env.NODE_ENV,
    logLevel: env.LOG_LEVEL,
    host: env.FOLDWRIGHT_HOST,
    port: env.FOLDWRIGHT_PORT,
    publicUrl: (env.FOLDWRIGHT_PUBLIC_URL ?? `http://127.0.0.1:${env.FOLDWRIGHT_PORT}`).replace(/\/$/, ''),
    requestsPerMinute: env.FOLDWRIGHT_REQUESTS_PER_MINUTE,
    databaseUrl: env.DATABASE_URL,
    sessionSecret: env.SESSION_SECRET,
    filesDirectory: env.FILES_DIR,
    webDirectory: env.WEB_DIST,
    payment: {
      apiKey: env.PAYMENT_API_KEY,
      hostUrl: env.PAYMENT_HOST_URL,
      webhookSecret: env.PAYMENT_WEBHOOK_SECRET,
    },
    cutting: {
      url: env.CUTTING_SERVICE_URL,
      key: env.CUTTING_SERVICE_KEY,
      callbackSecret: env.CUTTING_SERVICE_CALLBACK_SECRET,
    },
    mail: { smtpUrl: env.SMTP_URL, from: env.MAIL_FROM },
  };
}

/**
 * Settings of the migration program.
 * @throws EnvironmentError naming every variable that is missing or can't be used.
 */
export function readMigrationEnvironment(source: Source = process.env): MigrationEnvironment {
  const env = parse(migrationSchema, source);
  const applicationPassword = decodeURIComponent(new URL(env.DATABASE_URL).password);
  if (applicationPassword === '') {
    throw new EnvironmentError('DATABASE_URL can’t be used: it carries no password for the application’s role.');
  }
  return {
    logLevel: env.LOG_LEVEL,
    ownerUrl: env.DATABASE_OWNER_URL,
    databaseUrl: env.DATABASE_URL,
    applicationPassword,
    filesDirectory: env.FILES_DIR,
    seedsDemo: env.FOLDWRIGHT_SEED_DEMO === 'yes',
  };
}
