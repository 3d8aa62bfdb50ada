import http from 'node:http';
import type { AddressInfo } from 'node:net';
import type { PriceQuestion } from './cutting-service';
import { CuttingServiceNonsense, CuttingServiceRefused, CuttingServiceUnreachable } from './cutting-service';
import { HttpCuttingService } from './http-cutting-service';

const QUESTION: PriceQuestion = {
  reference: 'question-1',
  partName: 'Plate',
  dxf: '0\nEOF\n',
  materialId: 'dc01',
  thicknessMm: 1.5,
  quantities: [1],
  currency: 'EUR',
  statement: 'formed-sizes-rule',
  bends: [],
};
const PRICED = {
  id: 'Q-1',
  state: 'priced',
  currency: 'EUR',
  validUntil: '2026-04-01T00:00:00.000Z',
  breaks: [
    {
      quantity: 1,
      eachMinor: 1200,
      totalMinor: 1200,
      leadTimeDays: 5,
      lines: [
        { label: 'Set-up', amountMinor: 1000 },
        { label: 'Cutting', amountMinor: 200 },
      ],
    },
  ],
};

/** What the other side does with each request in turn; the last one goes on. */
type Behaviour = (response: http.ServerResponse) => void;
const answers =
  (status: number, body: unknown): Behaviour =>
  (response) =>
    void response.writeHead(status).end(typeof body === 'string' ? body : JSON.stringify(body));

describe('HttpCuttingService', () => {
  let server: http.Server;
  let behaviours: Behaviour[] = [];
  let bodies: string[] = [];

  beforeAll(async () => {
    server = http.createServer((request, response) => {
      const chunks: Buffer[] = [];
      request.on('data', (chunk: Buffer) => chunks.push(chunk));
      request.on('end', () => {
        bodies.push(Buffer.concat(chunks).toString());
        const behaviour = behaviours.length > 1 ? behaviours.shift() : behaviours[0];
        behaviour?.(response);
      });
    });
    await new Promise<void>((done) => server.listen(0, '127.0.0.1', done));
  });
  beforeEach(() => {
    bodies = [];
  });
  afterAll(async () => {
    server.closeAllConnections();
    await new Promise((done) => server.close(done));
  });

  const service = (port = (server.address() as AddressInfo).port, timeoutMs = 5000) =>
    new HttpCuttingService({
      url: `http://127.0.0.1:${port}`,
      key: 'key',
      callbackSecret: 'secret',
      now: () => new Date(),
      timeoutMs,
      retries: 1,
    });
  const ask = (...next: Behaviour[]) => {
    behaviours = next;
    return service().askPrice(QUESTION);
  };

  it('reads prices and speaks the codes of the other side', async () => {
    const answer = await ask(answers(201, PRICED));
    expect(answer).toMatchObject({
      kind: 'priced',
      quoteReference: 'Q-1',
      breaks: [{ quantity: 1, total: { amountMinor: 1200, currency: 'EUR' } }],
    });
    expect(JSON.parse(bodies[0] ?? '')).toMatchObject({ material: 'DC01', reference: 'question-1' });
  });

  it('reads an opinion against the part', async () => {
    const refused = { id: 'Q-2', state: 'refused', reasons: [{ code: 'x', text: 'Too long.' }] };
    expect(await ask(answers(201, refused))).toEqual({
      kind: 'refused',
      quoteReference: 'Q-2',
      reasons: ['Too long.'],
    });
  });

  it('tries again after a fault on the other side', async () => {
    expect((await ask(answers(503, ''), answers(201, PRICED))).kind).toBe('priced');
    expect(bodies).toHaveLength(2);
  });

  it('gives up after the second fault', async () => {
    await expect(ask(answers(500, ''))).rejects.toBeInstanceOf(CuttingServiceUnreachable);
    expect(bodies).toHaveLength(2);
  });

  it('does not wait for ever', async () => {
    const begun = Date.now();
    behaviours = [() => undefined];
    await expect(service(undefined, 250).askPrice(QUESTION)).rejects.toThrow('did not answer in time');
    expect(bodies).toHaveLength(1);
    expect(Date.now() - begun).toBeLessThan(4000);
  });

  it('says when nobody is there', async () => {
    await expect(service(1).askPrice(QUESTION)).rejects.toBeInstanceOf(CuttingServiceUnreachable);
  });

  it('passes on why a request was turned down', async () => {
    const turnedDown = ask(answers(422, { error: { code: 'malformed', message: 'No drawing.' } }));
    await expect(turnedDown).rejects.toMatchObject({ code: 'malformed', message: 'No drawing.' });
    await expect(turnedDown).rejects.toBeInstanceOf(CuttingServiceRefused);
  });

  const [row] = PRICED.breaks;
  it.each([
    ['something that is no JSON', 'see you on Monday'],
    ['another shape', { quote: 'ask Bert' }],
    ['lines that do not add up', { ...PRICED, breaks: [{ ...row, totalMinor: 1201 }] }],
    ['a price for another quantity', { ...PRICED, breaks: [{ ...row, quantity: 2 }] }],
    ['a price in another currency', { ...PRICED, currency: 'USD' }],
    ['fractions of a cent', { ...PRICED, breaks: [{ ...row, totalMinor: 1200.5 }] }],
  ])('does not believe %s', async (_name, body) => {
    await expect(ask(answers(201, body))).rejects.toBeInstanceOf(CuttingServiceNonsense);
  });

  it('does not take the answer to another order for its own', async () => {
    behaviours = [answers(201, { id: 'A-1', reference: 'somebody else' })];
    const order = { reference: 'o-1', quoteReference: 'Q-1', quantity: 1, dxf: 'x', drawingPdf: Buffer.from('%PDF-') };
    await expect(service().placeOrder(order)).rejects.toBeInstanceOf(CuttingServiceNonsense);
  });
});
