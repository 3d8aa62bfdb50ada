import { createHash, randomUUID } from 'node:crypto';
import { partDocumentSchema } from '@foldwright/shared/contracts/part-document-schema';
import type { Hand } from '@foldwright/shared/contracts/stock';
import type { PartDocument } from '@foldwright/shared/part/part-document';
import { Client } from 'pg';
import * as z from 'zod/mini';
import type { FileStore } from '../files/file-store';
import type { Member } from '../http/visitor';
import { computeBothStocks } from '../services/computed-part';
import { addPart } from '../services/create-part';
import { hashPassword } from '../services/password-hash';
import { releaseDraft } from '../services/release-draft';
import peopleFile from '../setup/demo/people.json';
import batteryStrapAnchor from '../setup/demo/parts/battery-strap-anchor.json';
import grinderCradle from '../setup/demo/parts/grinder-cradle.json';
import pumpTray from '../setup/demo/parts/pump-tray.json';
import regulatorBracket from '../setup/demo/parts/regulator-bracket.json';
import signBracket from '../setup/demo/parts/sign-bracket.json';
import { writeSolids } from '../services/write-solids';
import type { Database } from './database';
import { seedShop } from './seed-shop';

const peopleSchema = z.object({
  workshop: z.string(),
  people: z.array(
    z.object({
      name: z.string(),
      email: z.email(),
      password: z.string(),
      role: z.enum(['owner', 'fabricator', 'viewer', 'customer', 'operator']),
    }),
  ),
});

interface DemoPart {
  readonly number: string;
  readonly name: string;
  readonly file: unknown;
  readonly hand?: Hand;
  /** Note of its release; null for a part that stays in draft. */
  readonly releaseNote: string | null;
}

const LARKFIELD_PARTS: readonly DemoPart[] = [
  { number: 'LC-02', name: 'Pump tray', file: pumpTray, releaseNote: 'Fits both pump sizes.' },
  {
    number: 'LC-03',
    name: 'Regulator bracket',
    file: regulatorBracket,
    hand: 'left',
    releaseNote: 'Hose clears by 6 mm.',
  },
  { number: 'LC-04', name: 'Battery strap anchor', file: batteryStrapAnchor, releaseNote: 'As tried in steel.' },
  { number: 'LC-07', name: 'Grinder cradle', file: grinderCradle, releaseNote: null },
  { number: 'LC-11', name: 'Sign bracket', file: signBracket, releaseNote: null },
];

/** A second workshop, so that the first one's walls can be seen to hold. Its owner has a password nobody knows. */
const NEIGHBOUR = { workshop: 'Orchard Street Welding', owner: 'Petra Lowe', email: 'petra@orchard.example.test' };
const NEIGHBOUR_PARTS: readonly DemoPart[] = [
  { number: 'OS-01', name: 'Gate stop', file: regulatorBracket, releaseNote: null },
];

export interface SeedOptions {
  /** Address for the role that owns the tables: it makes workshops and accounts, which the application never does. */
  readonly ownerUrl: string;
  /** The application's own way, which everything else goes. */
  readonly database: Database;
  readonly files: FileStore;
  readonly now: () => Date;
}

interface Account {
  readonly name: string;
  readonly email: string;
  readonly passwordHash: string;
  readonly role: string;
}

async function addAccounts(
  client: Client,
  workshopId: string,
  accounts: readonly Account[],
): Promise<Map<string, string>> {
  const ids = new Map<string, string>();
  for (const { name, email, passwordHash, role } of accounts) {
    const id = randomUUID();
    ids.set(role, id);
    await client.query('INSERT INTO users (id, email, name, password_hash, is_operator) VALUES ($1, $2, $3, $4, $5)', [
      id,
      email,
      name,
      passwordHash,
      role === 'operator',
    ]);
    if (role === 'operator') continue;
    await client.query('INSERT INTO memberships (id, workshop_id, user_id, role) VALUES ($1, $2, $3, $4)', [
      randomUUID(),
      workshopId,
      id,
      role,
    ]);
  }
  return ids;
}

const memberSchema = z.object({
  userId: z.uuid(),
  userName: z.string(),
  workshopId: z.uuid(),
  workshopName: z.string(),
  role: z.literal('owner'),
});
const progressSchema = z.object({ state: z.enum(['begun', 'done']), owner: memberSchema, neighbour: memberSchema });
type Progress = z.output<typeof progressSchema>;

async function addWorkshop(client: Client, name: string, prefix: string): Promise<string> {
  const id = randomUUID();
  const zone = 'Europe/Berlin';
  await client.query('INSERT INTO workshops (id, name, number_prefix, time_zone) VALUES ($1, $2, $3, $4)', [
    id,
    name,
    prefix,
    zone,
  ]);
  return id;
}

/** Both workshops with their people. */
async function addWorkshops(client: Client): Promise<Progress> {
  const { workshop, people } = peopleSchema.parse(peopleFile);
  const owner = people.find(({ role }) => role === 'owner');
  if (owner === undefined) throw new Error('The demo’s workshop has no owner.');
  const first = await addWorkshop(client, workshop, 'LC');
  const second = await addWorkshop(client, NEIGHBOUR.workshop, 'OS');
  const accounts = await Promise.all(
    people.map(async ({ password, ...person }) => ({ ...person, passwordHash: await hashPassword(password) })),
  );
  const stranger = { name: NEIGHBOUR.owner, email: NEIGHBOUR.email, role: 'owner' };
  const secret = await hashPassword(randomUUID() + randomUUID());
  const ownerId = (await addAccounts(client, first, accounts)).get('owner');
  const strangerId = (await addAccounts(client, second, [{ ...stranger, passwordHash: secret }])).get('owner');
  return progressSchema.parse({
    state: 'begun',
    owner: { userId: ownerId, userName: owner.name, workshopId: first, workshopName: workshop, role: 'owner' },
    neighbour: {
      userId: strangerId,
      userName: NEIGHBOUR.owner,
      workshopId: second,
      workshopName: NEIGHBOUR.workshop,
      role: 'owner',
    },
  });
}

const FACT = 'demo';

/** How far the demo got; begins it in an installation without any workshop. Null when workshops are there that aren't ours. */
async function beginOrResume(client: Client): Promise<Progress | null> {
  const { rows } = await client.query<{ value: unknown }>('SELECT value FROM installation_facts WHERE name = $1', [
    FACT,
  ]);
  const [known] = rows;
  if (known !== undefined) return progressSchema.parse(known.value);
  const { rowCount } = await client.query('SELECT 1 FROM workshops LIMIT 1');
  if (rowCount) return null;
  await client.query('BEGIN');
  try {
    const progress = await addWorkshops(client);
    await client.query('INSERT INTO installation_facts (name, value) VALUES ($1, $2)', [
      FACT,
      JSON.stringify(progress),
    ]);
    await client.query('COMMIT');
    return progress;
  } catch (error) {
    await client.query('ROLLBACK');
    throw error;
  }
}

/** The part's open draft, made now unless an earlier run got that far; null when it was released already. */
async function demoDraft({ database, now }: SeedOptions, member: Member, part: DemoPart): Promise<string | null> {
  const document: PartDocument = partDocumentSchema.parse(part.file);
  return database.inWorkshop(member.workshopId, async (scope) => {
    const known = await scope.rows.parts.findOne({ number: part.number });
    if (known !== null) return (await scope.rows.drafts.findOne({ partId: known.id, closedAt: null }))?.id ?? null;
    const { name, number, hand } = part;
    const { partId, draftId } = await addPart(scope, member, { name, number, document, hasOutline: true }, now());
    if (hand !== undefined) await scope.rows.parts.changeWhere({ id: partId }, { hand });
    return draftId;
  });
}

async function addDemoPart(options: SeedOptions, member: Member, part: DemoPart): Promise<void> {
  const { database, files, now } = options;
  const draftId = await demoDraft(options, member, part);
  if (draftId === null || part.releaseNote === null) return;
  const { trial, production } = computeBothStocks(partDocumentSchema.parse(part.file));
  const cautions = [...trial.findings, ...production.findings].filter(({ severity }) => severity === 'caution');
  const key = createHash('sha256').update(`demo ${part.number}`).digest('hex');
  const acceptedCautionIds = [...new Set(cautions.map(({ id }) => id))];
  const input = { baseRevision: 0, note: part.releaseNote, acceptedCautionIds };
  let released = '';
  await releaseDraft(database, files, member, draftId, input, key, now(), (_, revisionId) => {
    released = revisionId;
    return Promise.resolve();
  });
  // No worker runs yet.
  if (released !== '') await writeSolids(database, files, { workshopId: member.workshopId, revisionId: released });
}

/**
 * The demo: Larkfield Cartworks with its people and parts, and a neighbour. Done once for an installation that has no
 * workshop; a run that was broken off is taken up again. Parts and releases go through the same services as everybody's.
 * Answers whether it was done now.
 */
export async function seedDemo(options: SeedOptions): Promise<boolean> {
  const client = new Client({ connectionString: options.ownerUrl, application_name: 'foldwright-seed' });
  await client.connect();
  try {
    await client.query("SELECT pg_advisory_lock(hashtext('foldwright-seed'))");
    const progress = await beginOrResume(client);
    if (progress === null || progress.state === 'done') return false;
    for (const part of LARKFIELD_PARTS) await addDemoPart(options, progress.owner, part);
    await seedShop(options.database, progress.owner, options.now());
    for (const part of NEIGHBOUR_PARTS) await addDemoPart(options, progress.neighbour, part);
    const done = JSON.stringify({ ...progress, state: 'done' });
    await client.query('UPDATE installation_facts SET value = $2 WHERE name = $1', [FACT, done]);
    return true;
  } finally {
    await client.end();
  }
}
