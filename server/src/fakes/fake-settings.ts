import { z } from 'zod';

const port = z.coerce.number().int().min(0).max(65535);

const schema = z.object({
  FAKE_PORT: port.default(0),
  /** Second port of the mail server: its list of messages for the developer. */
  FAKE_HTTP_PORT: port.default(0),
  FAKE_STATE_DIR: z.string().min(1),
  FAKE_CALLBACK_URL: z.url().optional(),
  FAKE_API_KEY: z.string().min(1).default('key-for-trying-things-out'),
  FAKE_SECRET: z.string().min(1).default('secret-for-trying-things-out'),
  FAKE_PACE_MS: z.coerce.number().int().min(1).default(4000),
});

/** What a stand-in is told when it starts. */
export interface FakeSettings {
  readonly port: number;
  readonly httpPort: number;
  readonly stateDirectory: string;
  /** Where callbacks go; null = nobody is told. */
  readonly callbackUrl: string | null;
  readonly apiKey: string;
  readonly secret: string;
  /** Time that one step of the outside party takes, ms. */
  readonly paceMs: number;
}

/**
 * Settings of a stand-in from its environment.
 * @throws Error naming each variable that can't be used
 */
export function readFakeSettings(environment: Readonly<Record<string, string | undefined>>): FakeSettings {
  const parsed = schema.safeParse(environment);
  if (!parsed.success) {
    const words = parsed.error.issues.map((issue) => `${issue.path.join('.')}: ${issue.message}`);
    throw new Error(`Settings that can't be used: ${words.join('; ')}`);
  }
  return {
    port: parsed.data.FAKE_PORT,
    httpPort: parsed.data.FAKE_HTTP_PORT,
    stateDirectory: parsed.data.FAKE_STATE_DIR,
    callbackUrl: parsed.data.FAKE_CALLBACK_URL ?? null,
    apiKey: parsed.data.FAKE_API_KEY,
    secret: parsed.data.FAKE_SECRET,
    paceMs: parsed.data.FAKE_PACE_MS,
  };
}
