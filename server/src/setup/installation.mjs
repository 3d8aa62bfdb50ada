// What each process of one installation is told: addresses, secrets and folders.
import path from 'node:path';
import { readJson, writeJson } from './places.mjs';
import { isPortFree, portNear } from './ports.mjs';
import { DEFAULT_PORT, keptSecrets, SettingsError } from './settings.mjs';

/** The name of the product's database. */
export const DATABASE = 'foldwright';

const portsFile = ({ dataDir }) => path.join(dataDir, 'ports.json');

/** The ports of the last start, by name; none before the first. */
export const portsOfLastStart = (where) => readJson(portsFile(where)) ?? {};

/**
 * Choose the ports. Those of the last start are taken again where free, so that addresses stored by the local services
 * stay good.
 * @throws {SettingsError} when the port that was asked for is taken
 */
export async function choosePorts(given, where) {
  const last = portsOfLastStart(where);
  const wish = given.FOLDWRIGHT_PORT;
  if (wish !== undefined && !(await isPortFree(Number(wish)))) {
    throw new SettingsError([`FOLDWRIGHT_PORT is ${wish}, but something else listens on that port.`]);
  }
  const ports = { web: wish === undefined ? await portNear(DEFAULT_PORT, last.web) : Number(wish) };
  const taken = new Set([ports.web]);
  for (const name of ['database', 'payments', 'cutting', 'mail', 'mailList']) {
    let port = await portNear(taken.has(last[name]) ? undefined : last[name]);
    while (taken.has(port)) port = await portNear();
    taken.add(port);
    ports[name] = port;
  }
  writeJson(portsFile(where), ports);
  return ports;
}

/** Where the web process answers on this machine, whatever name the world knows it by. */
export function ownAddress(given, ports) {
  const host = given.FOLDWRIGHT_HOST ?? '127.0.0.1';
  const here = { '0.0.0.0': '127.0.0.1', '::': '[::1]' }[host] ?? (host.includes(':') ? `[${host}]` : host);
  return `http://${here}:${ports.web}`;
}

/**
 * The environment of the product's own processes.
 * @param {Record<string, string>} given settings from outside, which win
 * @param {{ owner: string, application: string }} database addresses
 */
export function productEnvironment(given, places, ports, database) {
  const { DATABASE_OWNER_URL: _, ...others } = given;
  const loopback = (port) => `http://127.0.0.1:${port}`;
  return {
    ...keptSecrets(places.dataDir),
    FOLDWRIGHT_PORT: String(ports.web),
    FOLDWRIGHT_PUBLIC_URL: ownAddress(given, ports),
    DATABASE_URL: database.application,
    PAYMENT_HOST_URL: loopback(ports.payments),
    CUTTING_SERVICE_URL: loopback(ports.cutting),
    SMTP_URL: `smtp://127.0.0.1:${ports.mail}`,
    MAIL_FROM: 'Foldwright <no-reply@foldwright.example.test>',
    NODE_ENV: 'production',
    ...others,
    FILES_DIR: places.files,
    WEB_DIST: places.webDist,
  };
}

/**
 * The local stand-ins to start: one for each outside service that no setting names.
 * @returns {{ program: string, env: Record<string, string> }[]}
 */
export function standIns(given, places, ports, product) {
  const own = ownAddress(given, ports);
  const services = [
    {
      program: 'payment-host',
      replacedBy: 'PAYMENT_HOST_URL',
      env: {
        FAKE_PORT: String(ports.payments),
        FAKE_API_KEY: product.PAYMENT_API_KEY,
        FAKE_SECRET: product.PAYMENT_WEBHOOK_SECRET,
        FAKE_CALLBACK_URL: `${own}/api/webhooks/payments`,
      },
    },
    {
      program: 'cutting-service',
      replacedBy: 'CUTTING_SERVICE_URL',
      env: {
        FAKE_PORT: String(ports.cutting),
        FAKE_API_KEY: product.CUTTING_SERVICE_KEY,
        FAKE_SECRET: product.CUTTING_SERVICE_CALLBACK_SECRET,
        FAKE_CALLBACK_URL: `${own}/api/webhooks/cutting`,
      },
    },
    {
      program: 'mail-server',
      replacedBy: 'SMTP_URL',
      env: { FAKE_PORT: String(ports.mail), FAKE_HTTP_PORT: String(ports.mailList) },
    },
  ];
  return services
    .filter(({ replacedBy }) => given[replacedBy] === undefined)
    .map(({ program, env }) => ({ program, env: { ...env, FAKE_STATE_DIR: path.join(places.fakes, program) } }));
}
