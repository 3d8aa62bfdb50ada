import { randomUUID } from 'node:crypto';
import type request from 'supertest';
import type { TestPerson } from './people';
import { TestBrowser, addPerson, addWorkshop } from './people';
import type { TestApp } from './test-app';
import { startTestApp } from './test-app';

export const NEW_PASSWORD = 'a long enough secret';

export interface ListedMember {
  readonly userId: string;
  readonly name: string;
  readonly role: string;
  readonly revision: number;
}

/** A workshop with one owner, and what is done there about members. */
export class TestCrew {
  private constructor(
    readonly test: TestApp,
    readonly workshop: string,
    readonly imogen: TestPerson,
    readonly owner: TestBrowser,
  ) {}

  static async start(options: Parameters<typeof startTestApp>[0] = {}): Promise<TestCrew> {
    const test = await startTestApp(options);
    const workshop = await addWorkshop(test.ownerUrl, 'Larkfield Cartworks');
    const imogen = await addPerson(test.ownerUrl, 'Imogen Harrow', { [workshop]: 'owner' });
    return new TestCrew(test, workshop, imogen, await new TestBrowser(test.app).signIn(imogen));
  }

  stranger(): Promise<TestBrowser> {
    return new TestBrowser(this.test.app).open();
  }

  signIn(person: Pick<TestPerson, 'email'>): Promise<TestBrowser> {
    return new TestBrowser(this.test.app).signIn(person);
  }

  /** A person of the crew, and their browser. */
  async add(name: string, role: 'owner' | 'fabricator' | 'viewer' | 'customer') {
    const person = await addPerson(this.test.ownerUrl, name, { [this.workshop]: role });
    return { person, browser: await this.signIn(person) };
  }

  invite(email: string, role = 'viewer', key: string = randomUUID()): request.Test {
    return this.owner.post('/api/office/invitations').set('idempotency-key', key).send({ email, role });
  }

  accept(browser: TestBrowser, link: string, account: object | null = null): request.Test {
    return browser.post(`/api/invitation-links/${link}/acceptance`).send({ account });
  }

  change(browser: TestBrowser, memberId: string, revision: number, role = 'viewer'): request.Test {
    return browser.put(`/api/office/members/${memberId}/role`).set('if-match', `"${revision}"`).send({ role });
  }

  remove(browser: TestBrowser, memberId: string, revision = 1): request.Test {
    return browser.delete(`/api/office/members/${memberId}`).set('if-match', `"${revision}"`);
  }

  async members(browser = this.owner): Promise<ListedMember[]> {
    return (await browser.get('/api/office/members').expect(200)).body.members;
  }

  async mails(browser = this.owner): Promise<{ to: string; subject: string; text: string }[]> {
    return (await browser.get('/api/office/mails').expect(200)).body.mails;
  }

  /** The link in the newest mail to an address, as the person finds it there. */
  async linkTo(email: string): Promise<string> {
    const mail = (await this.mails()).find(({ to }) => to === email);
    return /\/invitation\/(\S+)/.exec(mail?.text ?? '')?.[1] ?? '';
  }
}
