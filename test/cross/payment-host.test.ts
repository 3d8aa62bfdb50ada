import fs from 'node:fs';
import http from 'node:http';
import type { AddressInfo } from 'node:net';
import os from 'node:os';
import path from 'node:path';
import Stripe from 'stripe';
import type { FakeSettings } from '@foldwright/server/fakes/fake-settings';
import type { ListeningServer } from '@foldwright/server/fakes/listening-server';
import { parseFormBody } from '@foldwright/server/fakes/payment-host/form-body';
import { startPaymentHost } from '@foldwright/server/fakes/payment-host/start-payment-host';
import { readTestCard } from '@foldwright/server/fakes/payment-host/test-cards';

const SECRET = 'whsec_test';
const CARD = { number: '4242 4242 4242 4242', expiry: '04 / 40', code: '123' };

describe('form bodies', () => {
  it('nests by brackets and keeps prototypes out of it', () => {
    const form = parseFormBody('a[0][b]=1&a[0][c]=x%20y&__proto__[polluted]=1&d=2');
    expect(JSON.parse(JSON.stringify(form))).toMatchObject({ a: { '0': { b: '1', c: 'x y' } }, d: '2' });
    expect(({} as Record<string, unknown>)['polluted']).toBeUndefined();
  });
});

describe('test cards', () => {
  const now = new Date('2026-04-30T23:59:59Z');
  it.each([
    [{ ...CARD }, 'pays'],
    [{ ...CARD, number: '4242-0000-0000-0000' }, 'pays'],
    [{ ...CARD, number: '4000 0000 0000 0002' }, 'declined'],
    [{ ...CARD, number: '5000 0000 0000 0000' }, 'declined'],
    [{ ...CARD, number: '4242' }, 'mistyped'],
    [{ ...CARD, expiry: '13 / 40' }, 'mistyped'],
    [{ ...CARD, expiry: '04 / 26' }, 'pays'],
    [{ ...CARD, expiry: '03 / 26' }, 'mistyped'],
    [{ ...CARD, code: '1' }, 'mistyped'],
  ] as const)('%o %s', (card, kind) => {
    expect(readTestCard(card, now).kind).toBe(kind);
  });
});

describe('the payment host, spoken to by the SDK', () => {
  let host: ListeningServer;
  let settings: FakeSettings;
  let stripe: Stripe;
  let receiver: http.Server;
  let refusals = 0;
  const events: Stripe.Event[] = [];

  const connect = () => {
    stripe = new Stripe('sk_test_key', {
      host: '127.0.0.1',
      port: host.port,
      protocol: 'http',
      telemetry: false,
      maxNetworkRetries: 0,
    });
  };
  const open = (idempotencyKey?: string, amount = 1620) =>
    stripe.checkout.sessions.create(
      {
        mode: 'payment',
        success_url: 'http://127.0.0.1:9/orders/1?session={CHECKOUT_SESSION_ID}',
        cancel_url: 'http://127.0.0.1:9/orders/1',
        client_reference_id: 'order-1',
        metadata: { orderId: 'order-1' },
        payment_intent_data: { metadata: { orderId: 'order-1' } },
        line_items: [
          { quantity: 1, price_data: { currency: 'eur', unit_amount: amount, product_data: { name: 'Bracket' } } },
        ],
      },
      idempotencyKey === undefined ? {} : { idempotencyKey },
    );
  const pay = (sessionId: string, card = CARD) =>
    fetch(`${host.url}/pay/${sessionId}`, { method: 'POST', body: new URLSearchParams(card), redirect: 'manual' });
  const eventually = async (isTrue: () => boolean) => {
    for (let tries = 0; tries < 200 && !isTrue(); tries += 1) await new Promise((done) => setTimeout(done, 20));
    expect(isTrue()).toBe(true);
  };

  beforeAll(async () => {
    receiver = http.createServer((request, response) => {
      const chunks: Buffer[] = [];
      request.on('data', (chunk: Buffer) => chunks.push(chunk));
      request.on('end', () => {
        const signature = request.headers['stripe-signature'] ?? '';
        if (refusals > 0) {
          refusals -= 1;
          response.writeHead(500).end();
          return;
        }
        events.push(stripe.webhooks.constructEvent(Buffer.concat(chunks), signature, SECRET));
        response.writeHead(204).end();
      });
    });
    await new Promise<void>((done) => receiver.listen(0, '127.0.0.1', done));
    settings = {
      port: 0,
      httpPort: 0,
      stateDirectory: fs.mkdtempSync(path.join(os.tmpdir(), 'payment-host-')),
      callbackUrl: `http://127.0.0.1:${(receiver.address() as AddressInfo).port}/`,
      apiKey: 'sk_test_key',
      secret: SECRET,
      paceMs: 10,
    };
    host = await startPaymentHost(settings);
    connect();
  });
  afterAll(async () => {
    await host.close();
    await new Promise((done) => receiver.close(done));
    fs.rmSync(settings.stateDirectory, { recursive: true });
  });

  it('opens a session, takes a card, sends a signed event, and answers the same on asking', async () => {
    const session = await open();
    expect(session.amount_total).toBe(1620);
    const page = await fetch(session.url ?? '');
    expect(page.headers.get('content-security-policy')).toContain("form-action 'self' http://127.0.0.1:9");
    expect(await page.text()).toContain('<label for="number">');
    const paid = await pay(session.id);
    expect(paid.status).toBe(303);
    expect(paid.headers.get('location')).toBe(`http://127.0.0.1:9/orders/1?session=${session.id}`);
    await eventually(() => events.some((event) => event.type === 'checkout.session.completed'));
    const again = await stripe.checkout.sessions.retrieve(session.id);
    expect(again).toMatchObject({ status: 'complete', payment_status: 'paid' });
    const intent = await stripe.paymentIntents.retrieve(String(again.payment_intent));
    expect(intent).toMatchObject({ status: 'succeeded', metadata: { orderId: 'order-1' } });
  });

  it('declines in words and lets the person try again', async () => {
    const session = await open();
    const declined = await pay(session.id, { ...CARD, number: '4000000000000002' });
    expect(declined.status).toBe(402);
    expect(await declined.text()).toContain('role="alert">The card was declined');
    await eventually(() => events.some((event) => event.type === 'payment_intent.payment_failed'));
    expect((await pay(session.id)).status).toBe(303);
  });

  it('charges once however often the form is sent', async () => {
    const session = await open();
    await Promise.all([pay(session.id), pay(session.id), pay(session.id)]);
    const state = JSON.parse(fs.readFileSync(path.join(settings.stateDirectory, 'state.json'), 'utf8'));
    const intent = state.sessions[session.id].payment_intent;
    const charges = Object.values<{ payment_intent: string }>(state.charges).filter(
      (charge) => charge.payment_intent === intent,
    );
    expect(charges).toHaveLength(1);
  });

  it('answers a repeated key with the first answer and refuses the key for another body', async () => {
    const first = await open('key-1');
    expect((await open('key-1')).id).toBe(first.id);
    await expect(open('key-1', 999)).rejects.toMatchObject({ statusCode: 400, type: 'StripeIdempotencyError' });
  });

  it('expires a session, after which it can not be paid', async () => {
    const session = await open();
    await stripe.checkout.sessions.expire(session.id);
    expect((await pay(session.id)).status).toBe(410);
    await expect(stripe.checkout.sessions.expire(session.id)).rejects.toMatchObject({ statusCode: 400 });
    await eventually(() => events.some((event) => event.type === 'checkout.session.expired'));
  });

  it('refunds no more than was paid', async () => {
    const session = await open();
    await pay(session.id);
    const paymentIntent = String((await stripe.checkout.sessions.retrieve(session.id)).payment_intent);
    await stripe.refunds.create({ payment_intent: paymentIntent, amount: 620 });
    await expect(stripe.refunds.create({ payment_intent: paymentIntent, amount: 1001 })).rejects.toMatchObject({
      statusCode: 400,
    });
    await stripe.refunds.create({ payment_intent: paymentIntent });
    await expect(stripe.refunds.create({ payment_intent: paymentIntent })).rejects.toMatchObject({
      code: 'charge_already_refunded',
    });
  });

  it('refuses an unknown key and an unknown address', async () => {
    const stranger = new Stripe('sk_other', {
      host: '127.0.0.1',
      port: host.port,
      protocol: 'http',
      telemetry: false,
      maxNetworkRetries: 0,
    });
    await expect(stranger.paymentIntents.retrieve('pi_1')).rejects.toMatchObject({ statusCode: 401 });
    await expect(stripe.customers.list()).rejects.toMatchObject({ statusCode: 404 });
  });

  it('keeps trying until it is heard, across a restart', async () => {
    const session = await open();
    const before = events.length;
    refusals = 1_000_000;
    await pay(session.id);
    await host.close();
    host = await startPaymentHost(settings);
    connect();
    refusals = 2;
    await eventually(() =>
      events
        .slice(before)
        .some((event) => event.type === 'checkout.session.completed' && event.data.object.id === session.id),
    );
    expect((await stripe.checkout.sessions.retrieve(session.id)).status).toBe('complete');
  });
});
