import { spawnSync } from 'node:child_process';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { keptSecrets, readSettings } from '@foldwright/server/setup/settings.mjs';

const START = path.resolve(__dirname, '../../server/src/setup/start.mjs');

describe('readSettings', () => {
  it('asks for nothing', () => {
    expect(readSettings({ PATH: '/usr/bin' })).toEqual({});
  });

  it('takes what can be used', () => {
    const env = {
      FOLDWRIGHT_PORT: '8080',
      FOLDWRIGHT_HOST: '0.0.0.0',
      FOLDWRIGHT_PUBLIC_URL: 'https://parts.example.test',
      SMTP_URL: 'smtp://mail.example.test:2525',
      MAIL_FROM: 'The shop <shop@example.test>',
      SESSION_SECRET: 'x'.repeat(32),
    };
    expect(readSettings(env)).toEqual(env);
  });

  it('takes an empty setting for none', () => {
    expect(readSettings({ FOLDWRIGHT_PORT: '' })).toEqual({});
  });

  it.each([
    ['FOLDWRIGHT_PORT', '70000', 'FOLDWRIGHT_PORT must be a whole number from 1 to 65535; it is "70000".'],
    ['FOLDWRIGHT_PORT', '80 ', 'FOLDWRIGHT_PORT must be a whole number from 1 to 65535; it is "80 ".'],
    ['FOLDWRIGHT_HOST', 'here', 'FOLDWRIGHT_HOST must be the number of a network address'],
    ['FOLDWRIGHT_PUBLIC_URL', 'parts.example.test', 'must be an address that begins with http:// or https://'],
    ['SMTP_URL', 'http://mail.example.test', 'SMTP_URL must begin with smtp:// or smtps://'],
    ['MAIL_FROM', 'nobody', 'MAIL_FROM must be a mail address'],
    ['LOG_LEVEL', 'loud', 'LOG_LEVEL must be one of fatal, error, warn, info, debug, silent'],
    ['FOLDWRIGHT_SEED_DEMO', 'maybe', 'FOLDWRIGHT_SEED_DEMO must be one of yes, no'],
    ['FOLDWRIGHT_PROT', '4400', 'FOLDWRIGHT_PROT is not a setting; there are FOLDWRIGHT_PORT,'],
    ['DATABASE_URL', 'postgres://a:b@db.example.test/x', 'DATABASE_URL is set, so DATABASE_OWNER_URL must be set too.'],
  ])('refuses %s=%s', (name, value, words) => {
    expect(() => readSettings({ [name]: value })).toThrow(words);
  });

  it('does not show a secret that is too short', () => {
    const refuse = () => readSettings({ SESSION_SECRET: 'correct horse' });
    expect(refuse).toThrow('SESSION_SECRET must have at least 32 characters.');
    expect(refuse).not.toThrow(/correct horse/);
  });

  it('names every fault at once', () => {
    expect(() => readSettings({ FOLDWRIGHT_PORT: 'x', SMTP_URL: 'y' })).toThrow(/FOLDWRIGHT_PORT[^]*\n[^]*SMTP_URL/);
  });
});

describe('a start', () => {
  it('with a setting it cannot use says so, starts nothing and fails', () => {
    const folder = path.join(os.tmpdir(), `never-made-${process.pid}`);
    const env = { ...process.env, FOLDWRIGHT_DATA_DIR: folder, FOLDWRIGHT_PORT: 'ninety' };
    const { status, stderr, stdout } = spawnSync(process.execPath, [START], { env, encoding: 'utf8', timeout: 20_000 });
    expect(stderr).toBe('FOLDWRIGHT_PORT must be a whole number from 1 to 65535; it is "ninety".\n');
    expect(stdout).toBe('');
    expect(status).toBe(1);
    expect(fs.existsSync(folder)).toBe(false);
  });
});

describe('keptSecrets', () => {
  let folder: string;
  beforeEach(() => {
    folder = fs.mkdtempSync(path.join(os.tmpdir(), 'secrets-'));
  });
  afterEach(() => fs.rmSync(folder, { recursive: true }));

  it('are made once, are long, differ, and are for nobody else to read', () => {
    const secrets: Record<string, string> = keptSecrets(folder);
    expect(keptSecrets(folder)).toEqual(secrets);
    expect(new Set(Object.values(secrets)).size).toBe(5);
    for (const secret of Object.values(secrets)) expect(secret.length).toBeGreaterThanOrEqual(64);
    expect(fs.statSync(path.join(folder, 'secrets.json')).mode & 0o777).toBe(0o600);
  });

  it('are completed when one is missing', () => {
    const { SESSION_SECRET, ...others } = keptSecrets(folder) as Record<string, string>;
    fs.writeFileSync(path.join(folder, 'secrets.json'), JSON.stringify(others));
    const completed: Record<string, string> = keptSecrets(folder);
    expect(completed).toMatchObject(others);
    expect(completed['SESSION_SECRET']).not.toBe(SESSION_SECRET);
  });
});
