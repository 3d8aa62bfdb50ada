import { randomUUID } from 'node:crypto';
import { mkdtemp, rm } from 'node:fs/promises';
import http from 'node:http';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { HttpCuttingService } from '@foldwright/server/cutting/http-cutting-service';
import { startCuttingService } from '@foldwright/server/fakes/cutting-service/start-cutting-service';
import type { FakeSettings } from '@foldwright/server/fakes/fake-settings';
import type { ListeningServer } from '@foldwright/server/fakes/listening-server';
import type { LocalMailServer } from '@foldwright/server/fakes/mail-server/start-mail-server';
import { startMailServer } from '@foldwright/server/fakes/mail-server/start-mail-server';
import { startPaymentHost } from '@foldwright/server/fakes/payment-host/start-payment-host';
import { commerceWork } from '@foldwright/server/jobs/commerce-work';
import { SmtpMailer } from '@foldwright/server/mail/smtp-mailer';
import { StripePaymentHost } from '@foldwright/server/payments/stripe-payment-host';
import type { Order, Quote } from '@foldwright/shared/contracts/orders';
import { orderSchema, quoteSchema } from '@foldwright/shared/contracts/orders';
import { partDetailSchema } from '@foldwright/shared/contracts/parts';
import { revisionSummarySchema } from '@foldwright/shared/contracts/revisions';
import type { TestBrowser } from './people';
import { asOwner } from './people';
import type { TestApp } from './test-app';
import { startTestApp } from './test-app';

export const PAYMENT_KEY = 'sk_test_commerce';
export const PAYMENT_SECRET = 'whsec_commerce';
export const CUTTING_KEY = 'cutting-key';
export const CUTTING_SECRET = 'cutting-secret';

/** The web application with the three outside parties running beside it, each on a loopback port of its own. */
export interface Commerce extends TestApp {
  readonly publicUrl: string;
  readonly payments: ListeningServer;
  readonly cutting: ListeningServer;
  readonly mail: LocalMailServer;
  stopPayments(): Promise<void>;
  startPayments(): Promise<void>;
  stopCutting(): Promise<void>;
  startCutting(): Promise<void>;
  stopMail(): Promise<void>;
  startMail(): Promise<void>;
  /** Make the cutting shop slow, closed, unclear or unwilling; nothing given means well-behaved. */
  setMood(mood: object): Promise<void>;
  /** Make the payment host refuse refunds, or do them and hang up; nothing given means well-behaved. */
  setPaymentMood(mood: { readonly refunds?: 'refused' | 'lost' }): Promise<void>;
  /** Do the work that is due, as the worker would; answers how many pieces of it failed. */
  runWork(): Promise<number>;
  /** Let work that waits for its next try be due now. */
  forgetPauses(): Promise<void>;
  pay(checkoutUrl: string, number?: string): Promise<Response>;
  closeAll(): Promise<void>;
}

export interface CommerceOptions {
  /** Whether the outside parties tell the application anything by themselves. */
  readonly isTold?: boolean;
  readonly cuttingTimeoutMs?: number;
  readonly paceMs?: number;
  /** Connections for transactions; one makes a statement outside of its transaction wait for ever. */
  readonly poolSize?: number;
}

export async function startCommerce({
  isTold = true,
  cuttingTimeoutMs = 2000,
  paceMs = 20,
  poolSize,
}: CommerceOptions = {}): Promise<Commerce> {
  const stateDirectory = await mkdtemp(path.join(tmpdir(), 'foldwright-outside-'));
  // The outside parties have to know where to call before the application is made, which has to know where they are.
  let answer: http.RequestListener = (_request, response) => void response.writeHead(503).end();
  const web = http.createServer((request, response) => answer(request, response));
  await new Promise<void>((done) => web.listen(0, '127.0.0.1', done));
  const publicUrl = `http://127.0.0.1:${(web.address() as AddressInfo).port}`;

  const settings = (name: string, port: number, changes: Partial<FakeSettings>): FakeSettings => ({
    port,
    httpPort: 0,
    stateDirectory: path.join(stateDirectory, name),
    callbackUrl: isTold && name !== 'mail' ? `${publicUrl}/api/webhooks/${name}` : null,
    apiKey: '',
    secret: '',
    paceMs,
    ...changes,
  });
  const openPayments = (port: number) =>
    startPaymentHost(settings('payments', port, { apiKey: PAYMENT_KEY, secret: PAYMENT_SECRET }));
  const openCutting = (port: number) =>
    startCuttingService(settings('cutting', port, { apiKey: CUTTING_KEY, secret: CUTTING_SECRET }));
  const openMail = (port: number) => startMailServer(settings('mail', port, {}));

  let payments = await openPayments(0);
  let cutting = await openCutting(0);
  let mail = await openMail(0);
  const host = new StripePaymentHost({
    apiKey: PAYMENT_KEY,
    hostUrl: payments.url,
    webhookSecret: PAYMENT_SECRET,
    timeoutMs: 2000,
    retries: 0,
  });
  const shop = new HttpCuttingService({
    url: cutting.url,
    key: CUTTING_KEY,
    callbackSecret: CUTTING_SECRET,
    now: () => new Date(),
    timeoutMs: cuttingTimeoutMs,
    retries: 0,
  });
  const mailer = new SmtpMailer({
    smtpUrl: `smtp://127.0.0.1:${mail.smtpPort}`,
    from: 'Foldwright <no-reply@foldwright.example.test>',
    timeoutMs: 2000,
  });
  const test = await startTestApp({
    publicUrl,
    payments: host,
    cutting: shop,
    ...(poolSize === undefined ? {} : { poolSize }),
  });
  answer = test.app;
  const { database, queue, files } = test;
  const now = () => new Date();
  const handlers = commerceWork({ database, queue, files, mailer, payments: host, cutting: shop, publicUrl, now });

  return {
    ...test,
    publicUrl,
    get payments() {
      return payments;
    },
    get cutting() {
      return cutting;
    },
    get mail() {
      return mail;
    },
    stopPayments: () => payments.close(),
    startPayments: async () => void (payments = await openPayments(payments.port)),
    stopCutting: () => cutting.close(),
    startCutting: async () => void (cutting = await openCutting(cutting.port)),
    stopMail: () => mail.close(),
    startMail: async () => void (mail = await openMail(mail.smtpPort)),
    async setMood(mood) {
      const headers = { authorization: `Bearer ${CUTTING_KEY}`, 'content-type': 'application/json' };
      await fetch(`${cutting.url}/mood`, { method: 'PUT', headers, body: JSON.stringify(mood) });
    },
    async setPaymentMood(mood) {
      const headers = { authorization: `Bearer ${PAYMENT_KEY}`, 'content-type': 'application/json' };
      await fetch(`${payments.url}/v1/mood`, { method: 'PUT', headers, body: JSON.stringify(mood) });
    },
    async runWork() {
      let failures = 0;
      for (let isIdle = false; !isIdle;) {
        isIdle = true;
        for (const name of ['mail', 'cutting-order', 'payment', 'sale'] as const) {
          for (const job of await queue.boss.fetch(name)) {
            isIdle = false;
            try {
              await handlers[name](job.data);
              await queue.boss.complete(name, job.id);
            } catch (error) {
              failures += 1;
              await queue.boss.fail(name, job.id, { message: error instanceof Error ? error.message : String(error) });
            }
          }
        }
      }
      return failures;
    },
    async forgetPauses() {
      await asOwner(test.ownerUrl, (client) =>
        client.query("UPDATE pgboss.job SET start_after = now() WHERE state IN ('created', 'retry')"),
      );
    },
    pay: (checkoutUrl, number = '4242 4242 4242 4242') =>
      fetch(checkoutUrl, {
        method: 'POST',
        body: new URLSearchParams({ number, expiry: '04 / 40', code: '123' }),
        redirect: 'manual',
      }),
    async closeAll() {
      mailer.close();
      await Promise.allSettled([payments.close(), cutting.close(), mail.close()]);
      web.closeAllConnections();
      await new Promise((done) => web.close(done));
      await test.close();
      await rm(stateDirectory, { recursive: true, force: true });
    },
  };
}

/** A released L-bracket, made the way a person makes it. */
export async function releaseBracket(
  browser: TestBrowser,
  name = 'Regulator bracket',
): Promise<{ partId: string; revisionId: string }> {
  const starter = { shape: 'l-bracket', baseMm: 80, flangeMm: 40, widthMm: 60, bendAngleDeg: 90 };
  const created = await browser.post('/api/parts').set('idempotency-key', randomUUID()).send({ name, starter });
  if (created.status !== 201) throw new Error(JSON.stringify(created.body));
  const part = partDetailSchema.parse(created.body);
  const released = await browser
    .post(`/api/drafts/${part.draft?.id}/release`)
    .set('idempotency-key', randomUUID())
    .send({ baseRevision: part.draft?.revision ?? 0, note: 'First', acceptedCautionIds: [] });
  if (released.status !== 201) throw new Error(JSON.stringify(released.body));
  return { partId: part.id, revisionId: revisionSummarySchema.parse(released.body).id };
}

export async function quoteFor(browser: TestBrowser, revisionId: string, quantities = [1, 10, 50]): Promise<Quote> {
  const answer = await browser
    .post(`/api/revisions/${revisionId}/quotes`)
    .set('idempotency-key', randomUUID())
    .send({ stock: 'production', quantities });
  if (answer.status !== 201) throw new Error(JSON.stringify(answer.body));
  return quoteSchema.parse(answer.body);
}

export async function orderFor(browser: TestBrowser, quoteId: string, quantity = 10): Promise<Order> {
  const answer = await browser.post('/api/orders').set('idempotency-key', randomUUID()).send({ quoteId, quantity });
  if (answer.status !== 201) throw new Error(JSON.stringify(answer.body));
  return orderSchema.parse(answer.body);
}

export async function checkoutFor(browser: TestBrowser, orderId: string): Promise<string> {
  const answer = await browser.post(`/api/orders/${orderId}/checkout`).set('idempotency-key', randomUUID());
  if (answer.status !== 201) throw new Error(JSON.stringify(answer.body));
  return String(answer.body.url);
}

export async function readOrder(browser: TestBrowser, orderId: string): Promise<Order> {
  return orderSchema.parse((await browser.get(`/api/orders/${orderId}`).expect(200)).body);
}

/** Wait until something is so; twenty seconds at most. */
export async function eventually(what: string, isSo: () => Promise<boolean> | boolean): Promise<void> {
  const deadline = Date.now() + 20_000;
  while (!(await isSo())) {
    if (Date.now() > deadline) throw new Error(`it never came to this: ${what}`);
    await new Promise((done) => setTimeout(done, 25));
  }
}
