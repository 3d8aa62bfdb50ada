import { randomUUID } from 'node:crypto';
import type { Role } from '@foldwright/shared/contracts/route';
import { sessionSchema } from '@foldwright/shared/contracts/session';
import type { Express } from 'express';
import { Client } from 'pg';
import request from 'supertest';
import { hashPassword } from '@foldwright/server/services/password-hash';

export const TEST_PASSWORD = 'cardboard first';

export interface TestPerson {
  readonly id: string;
  readonly email: string;
  readonly name: string;
}

let passwordHash: Promise<string> | undefined;

/** Run statements as the owner of the tables: what no user of the application may do. */
export async function asOwner<T>(ownerUrl: string, work: (client: Client) => Promise<T>): Promise<T> {
  const client = new Client({ connectionString: ownerUrl });
  await client.connect();
  try {
    return await work(client);
  } finally {
    await client.end();
  }
}

export async function addWorkshop(ownerUrl: string, name: string, prefix = 'LC'): Promise<string> {
  const id = randomUUID();
  await asOwner(ownerUrl, (client) =>
    client.query('INSERT INTO workshops (id, name, number_prefix) VALUES ($1, $2, $3)', [id, name, prefix]),
  );
  return id;
}

/** A person with a role in each of these workshops; all have the same password. */
export async function addPerson(
  ownerUrl: string,
  name: string,
  roles: Readonly<Record<string, Exclude<Role, 'operator'>>>,
  options: { isOperator?: boolean } = {},
): Promise<TestPerson> {
  passwordHash ??= hashPassword(TEST_PASSWORD);
  const hash = await passwordHash;
  const id = randomUUID();
  const email = `${name.toLowerCase().replaceAll(' ', '.')}.${id.slice(0, 6)}@example.test`;
  await asOwner(ownerUrl, async (client) => {
    await client.query('INSERT INTO users (id, email, name, password_hash, is_operator) VALUES ($1, $2, $3, $4, $5)', [
      id,
      email,
      name,
      hash,
      options.isOperator ?? false,
    ]);
    for (const [workshopId, role] of Object.entries(roles)) {
      await client.query('INSERT INTO memberships (id, workshop_id, user_id, role) VALUES ($1, $2, $3, $4)', [
        randomUUID(),
        workshopId,
        id,
        role,
      ]);
    }
  });
  return { id, email, name };
}

type Agent = ReturnType<typeof request.agent>;

/** A browser as the API sees it: keeps its cookies and sends the token for changes. */
export class TestBrowser {
  private readonly agent: Agent;
  csrfToken = '';
  /** Header that carries the session, for requests made without this browser. */
  cookie = '';

  constructor(app: Express) {
    this.agent = request.agent(app);
  }

  /** Open the application: gets a session and its token. */
  async open(): Promise<this> {
    const { body } = await this.agent.get('/api/session').expect(200);
    this.csrfToken = sessionSchema.parse(body).csrfToken;
    return this;
  }

  async signIn(person: Pick<TestPerson, 'email'>): Promise<this> {
    await this.open();
    const answer = await this.post('/api/session').send({ email: person.email, password: TEST_PASSWORD }).expect(200);
    this.csrfToken = sessionSchema.parse(answer.body).csrfToken;
    this.cookie = String(answer.headers['set-cookie']).split(';')[0] ?? '';
    return this;
  }

  get(path: string): request.Test {
    return this.agent.get(path);
  }

  post(path: string): request.Test {
    return this.agent.post(path).set('x-csrf-token', this.csrfToken);
  }

  put(path: string): request.Test {
    return this.agent.put(path).set('x-csrf-token', this.csrfToken);
  }

  patch(path: string): request.Test {
    return this.agent.patch(path).set('x-csrf-token', this.csrfToken);
  }

  delete(path: string): request.Test {
    return this.agent.delete(path).set('x-csrf-token', this.csrfToken);
  }
}
