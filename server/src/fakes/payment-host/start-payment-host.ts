import { createHash, randomBytes } from 'node:crypto';
import express from 'express';
import type { NextFunction, Request, Response } from 'express';
import { CallbackSender } from '../callback-sender';
import type { FakeSettings } from '../fake-settings';
import { sendHtml } from '../html';
import type { ListeningServer } from '../listening-server';
import { listenOnLoopback } from '../listening-server';
import { StateFile } from '../state-file';
import { checkoutPage, closedPage, DESK_STYLE } from './checkout-page';
import { parseFormBody, textAt } from './form-body';
import type { RefundMood } from './objects';
import { EMPTY_PAYMENT_STATE, paymentStateSchema, refundMoodSchema } from './objects';
import { HostRefusal, PaymentLedger } from './payment-ledger';
import { signEvent } from './sign-event';

const LONGEST_RETRY_START_MS = 500;
const SWEEP_MS = 60_000;

/** Start the local payment host. Its state outlives it in the folder of the settings. */
export async function startPaymentHost(settings: FakeSettings): Promise<ListeningServer> {
  const file = new StateFile(settings.stateDirectory, paymentStateSchema, EMPTY_PAYMENT_STATE);
  const state = file.load();
  const save = () => file.save(state);
  const now = () => new Date();
  const sender = new CallbackSender(state.deliveries, {
    url: settings.callbackUrl,
    retryMs: Math.min(settings.paceMs, LONGEST_RETRY_START_MS),
    headersFor: (body) => ({ 'stripe-signature': signEvent(body, settings.secret, now()) }),
    onChange: save,
  });
  let baseUrl = '';
  const ledger = new PaymentLedger(state, {
    baseUrl: () => baseUrl,
    now,
    announce: (type, object) => {
      state.eventCount += 1;
      const id = `evt_${randomBytes(12).toString('hex')}`;
      const created = Math.floor(now().getTime() / 1000);
      const rest = { api_version: '2026-10-28.endive', livemode: false, pending_webhooks: 1, request: null };
      const body = JSON.stringify({ id, object: 'event', type, created, data: { object }, ...rest });
      // Every other event comes twice, as delivery "at least once" allows.
      sender.send({ id, body, copiesLeft: state.eventCount % 2 === 0 ? 2 : 1, attempts: 0 });
    },
  });

  const app = express();
  app.disable('x-powered-by');
  app.use(express.text({ type: 'application/x-www-form-urlencoded', limit: '100kb' }));
  const form = (request: Request) => parseFormBody(typeof request.body === 'string' ? request.body : '');

  app.get('/style.css', (_request, response) => void response.type('css').send(DESK_STYLE));
  app.get('/', (_request, response) => void response.type('text').send('Paydesk is open.\n'));

  app.get('/pay/:id', (request, response) => {
    const session = ledger.session(request.params.id);
    save();
    if (session.status !== 'open') sendHtml(response, closedPage(session), 410);
    else
      sendHtml(response, checkoutPage(session, ledger.linesOf(session.id), null), 200, [originOf(session.success_url)]);
  });
  app.post('/pay/:id', (request, response) => {
    const body = form(request);
    const problem = ledger.payWithCard(request.params.id, {
      number: textAt(body, 'number') ?? '',
      expiry: textAt(body, 'expiry') ?? '',
      code: textAt(body, 'code') ?? '',
    });
    save();
    const session = ledger.session(request.params.id);
    if (problem === null) response.redirect(303, session.success_url.replaceAll('{CHECKOUT_SESSION_ID}', session.id));
    else if (session.status !== 'open') sendHtml(response, closedPage(session), 410);
    else {
      const page = checkoutPage(session, ledger.linesOf(session.id), problem);
      sendHtml(response, page, 402, [originOf(session.success_url)]);
    }
  });

  app.use('/v1', (request, _response, next) => {
    if (request.get('authorization') !== `Bearer ${settings.apiKey}`) {
      throw new HostRefusal(401, 'invalid_api_key', 'This API key is not known here.', 'authentication_error');
    }
    next();
  });
  // Kept answers: a key that was seen answers as it did, without doing anything again.
  app.use('/v1', (request, response, next) => {
    const key = request.get('idempotency-key');
    if (request.method !== 'POST' || key === undefined) return next();
    const fingerprint = createHash('sha256')
      .update(`${request.originalUrl}\n${String(request.body)}`)
      .digest('hex');
    const kept = state.answers[key];
    if (kept !== undefined && kept.fingerprint !== fingerprint) {
      const words = `Keys for idempotent requests can only be used with the parameters they were first used with (${key}).`;
      throw new HostRefusal(400, 'idempotency_key_in_use', words, 'idempotency_error');
    }
    if (kept !== undefined) {
      response.set('idempotent-replayed', 'true').status(kept.status).type('json').send(kept.body);
      return;
    }
    response.locals['keep'] = { key, fingerprint };
    next();
  });
  const keepAnswer = (response: Response, body: string) => {
    const keep: unknown = response.locals['keep'];
    if (isKeep(keep)) state.answers[keep.key] = { fingerprint: keep.fingerprint, status: 200, body };
  };
  const answer = (response: Response, object: object) => {
    const body = JSON.stringify(object);
    keepAnswer(response, body);
    save();
    response
      .set('request-id', `req_${randomBytes(7).toString('hex')}`)
      .type('json')
      .send(body);
  };
  app.post('/v1/checkout/sessions', (request, response) => answer(response, ledger.createSession(form(request))));
  app.get('/v1/checkout/sessions/:id', (request, response) => answer(response, ledger.session(request.params.id)));
  app.post('/v1/checkout/sessions/:id/expire', (request, response) =>
    answer(response, ledger.expireSession(request.params.id)),
  );
  app.get('/v1/payment_intents/:id', (request, response) => answer(response, ledger.intent(request.params.id)));
  // How the desk behaves towards refunds, for whoever tries what happens then: refuse them, or do them and hang up.
  let mood: RefundMood = {};
  app.put('/v1/mood', express.json(), (request, response) => {
    mood = refundMoodSchema.parse(request.body);
    response.json(mood);
  });
  app.post('/v1/refunds', (request, response) => {
    if (mood.refunds === 'refused') {
      throw new HostRefusal(400, 'balance_insufficient', 'There is not enough money in the balance of this account.');
    }
    const refund = ledger.refund(form(request));
    if (mood.refunds !== 'lost') return answer(response, refund);
    keepAnswer(response, JSON.stringify(refund));
    save();
    request.socket.destroy();
  });

  app.use((request) => {
    throw new HostRefusal(404, 'url_invalid', `Unrecognized request URL (${request.method} ${request.path}).`);
  });
  app.use((error: unknown, _request: Request, response: Response, next: NextFunction) => {
    if (response.headersSent) return next(error);
    if (!(error instanceof HostRefusal)) return next(error);
    const { type, code, message } = error;
    response.status(error.status).json({ error: { type, code, message } });
  });

  const server = await listenOnLoopback(app, settings.port);
  baseUrl = server.url;
  sender.resume();
  const sweep = setInterval(() => ledger.expireOverdueSessions(), SWEEP_MS);
  return {
    ...server,
    close: () => {
      clearInterval(sweep);
      sender.close();
      return server.close();
    },
  };
}

function originOf(url: string): string {
  return new URL(url.replaceAll('{CHECKOUT_SESSION_ID}', 'id')).origin;
}

function isKeep(value: unknown): value is { key: string; fingerprint: string } {
  return typeof value === 'object' && value !== null && 'key' in value && 'fingerprint' in value;
}
