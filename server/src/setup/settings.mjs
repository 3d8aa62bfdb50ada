// What may be set from the environment, and what is said when a setting cannot be used.
import { randomBytes } from 'node:crypto';
import net from 'node:net';
import path from 'node:path';
import { dataDirectory, ensureDirectory, readJson, ROOT, writeJson } from './places.mjs';

/** Where the product answers unless told otherwise. */
export const DEFAULT_PORT = 4400;

/** Settings that cannot be used, one line each. */
export class SettingsError extends Error {
  constructor(problems) {
    super(problems.join('\n'));
    this.name = 'SettingsError';
    this.problems = problems;
  }
}

const port = (text) => {
  const number = Number(text);
  const isPort = /^\d+$/.test(text) && number >= 1 && number <= 65535;
  return isPort ? undefined : 'must be a whole number from 1 to 65535';
};

const address = (protocols) => (text) => {
  const wanted = protocols.map((protocol) => `${protocol}://`).join(' or ');
  if (!URL.canParse(text)) return `must be an address that begins with ${wanted}`;
  return protocols.includes(new URL(text).protocol.slice(0, -1)) ? undefined : `must begin with ${wanted}`;
};

const secret = (least) => (text) => (text.length >= least ? undefined : `must have at least ${least} characters`);

const directory = (text) => (text.includes('\0') ? 'must be the path of a folder' : undefined);

const oneOf = (choices) => (text) => (choices.includes(text) ? undefined : `must be one of ${choices.join(', ')}`);

const count = (text) => (/^[1-9]\d{0,8}$/.test(text) ? undefined : 'must be a whole number, at least 1');

const host = (text) => (net.isIP(text) > 0 ? undefined : 'must be the number of a network address, such as 127.0.0.1');

const sender = (text) =>
  /^[^\s@<>]+@[^\s@<>]+$/.test(text) || /^[^<>]*<[^\s@<>]+@[^\s@<>]+>$/.test(text)
    ? undefined
    : 'must be a mail address, alone or as Name <address>';

/**
 * Every setting: how it is judged, whether it is a secret (then its value is never shown), and which other settings
 * must come with it because they describe one outside service.
 */
const SETTINGS = {
  FOLDWRIGHT_PORT: { judge: port },
  FOLDWRIGHT_HOST: { judge: host },
  FOLDWRIGHT_PUBLIC_URL: { judge: address(['http', 'https']) },
  FOLDWRIGHT_DATA_DIR: { judge: directory },
  FOLDWRIGHT_REQUESTS_PER_MINUTE: { judge: count },
  FOLDWRIGHT_SEED_DEMO: { judge: oneOf(['yes', 'no']) },
  LOG_LEVEL: { judge: oneOf(['fatal', 'error', 'warn', 'info', 'debug', 'silent']) },
  NODE_ENV: { judge: oneOf(['development', 'production', 'test']) },
  DATABASE_URL: { judge: address(['postgres', 'postgresql']), isSecret: true, needs: ['DATABASE_OWNER_URL'] },
  DATABASE_OWNER_URL: { judge: address(['postgres', 'postgresql']), isSecret: true, needs: ['DATABASE_URL'] },
  SESSION_SECRET: { judge: secret(32), isSecret: true },
  FILES_DIR: { judge: directory },
  PAYMENT_API_KEY: { judge: secret(16), isSecret: true },
  PAYMENT_HOST_URL: { judge: address(['http', 'https']), needs: ['PAYMENT_API_KEY', 'PAYMENT_WEBHOOK_SECRET'] },
  PAYMENT_WEBHOOK_SECRET: { judge: secret(16), isSecret: true },
  CUTTING_SERVICE_URL: {
    judge: address(['http', 'https']),
    needs: ['CUTTING_SERVICE_KEY', 'CUTTING_SERVICE_CALLBACK_SECRET'],
  },
  CUTTING_SERVICE_KEY: { judge: secret(16), isSecret: true },
  CUTTING_SERVICE_CALLBACK_SECRET: { judge: secret(16), isSecret: true },
  SMTP_URL: { judge: address(['smtp', 'smtps']) },
  MAIL_FROM: { judge: sender },
  WEB_DIST: { judge: directory },
};

/** Names that begin with this are ours, so one we do not know is a slip of the pen. */
const OWN_PREFIX = 'FOLDWRIGHT_';

/**
 * The settings that the environment gives, judged.
 * @returns {Record<string, string>} only those that are set
 * @throws {SettingsError} naming every one that cannot be used
 */
export function readSettings(env = process.env) {
  const problems = [];
  const given = {};
  for (const [name, { judge, isSecret, needs = [] }] of Object.entries(SETTINGS)) {
    const text = env[name];
    if (text === undefined || text === '') continue;
    given[name] = text;
    const fault = judge(text);
    if (fault !== undefined) problems.push(`${name} ${fault}${isSecret ? '.' : `; it is "${text}".`}`);
    for (const other of needs) {
      if (!env[other]) problems.push(`${name} is set, so ${other} must be set too.`);
    }
  }
  for (const name of Object.keys(env)) {
    if (!name.startsWith(OWN_PREFIX) || name in SETTINGS) continue;
    const known = Object.keys(SETTINGS).filter((each) => each.startsWith(OWN_PREFIX));
    problems.push(`${name} is not a setting; there are ${known.join(', ')}.`);
  }
  if (problems.length > 0) throw new SettingsError(problems);
  return given;
}

const KEPT_SECRETS = {
  SESSION_SECRET: '',
  PAYMENT_API_KEY: 'sk_test_',
  PAYMENT_WEBHOOK_SECRET: 'whsec_',
  CUTTING_SERVICE_KEY: '',
  CUTTING_SERVICE_CALLBACK_SECRET: '',
};

/** The random secrets of this checkout, made at the first start and kept readable by nobody else. */
export function keptSecrets(dataDir) {
  const file = path.join(dataDir, 'secrets.json');
  const kept = readJson(file) ?? {};
  const secrets = Object.fromEntries(
    Object.entries(KEPT_SECRETS).map(([name, prefix]) => [
      name,
      typeof kept[name] === 'string' ? kept[name] : `${prefix}${randomBytes(32).toString('hex')}`,
    ]),
  );
  if (JSON.stringify(secrets) !== JSON.stringify(kept)) writeJson(file, secrets, 0o600);
  return secrets;
}

/** The folders of one installation: settings, or places below the data folder. */
export function places(given) {
  const dataDir = ensureDirectory(dataDirectory(given));
  return {
    dataDir,
    files: ensureDirectory(path.resolve(ROOT, given.FILES_DIR ?? path.join(dataDir, 'files')), 0o700),
    logs: ensureDirectory(path.join(dataDir, 'logs'), 0o700),
    fakes: ensureDirectory(path.join(dataDir, 'fakes'), 0o700),
    webDist: path.resolve(ROOT, given.WEB_DIST ?? 'dist/foldwright/browser'),
  };
}
