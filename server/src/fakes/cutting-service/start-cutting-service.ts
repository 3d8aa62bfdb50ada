import express from 'express';
import type { NextFunction, Request, Response } from 'express';
import { z } from 'zod';
import { CallbackSender } from '../callback-sender';
import type { FakeSettings } from '../fake-settings';
import { sendHtml } from '../html';
import type { ListeningServer } from '../listening-server';
import { listenOnLoopback } from '../listening-server';
import { StateFile } from '../state-file';
import { CounterRefusal, OrderDesk } from './order-desk';
import { signCallback } from './sign-callback';
import { SHOP_STYLE, statusPage } from './status-page';
import { EMPTY_SHOP_STATE, moodSchema, orderRequestSchema, quoteRequestSchema, shopStateSchema } from './wire';

const LONGEST_RETRY_START_MS = 500;

/** Start the invented cutting shop. Its state outlives it in the folder of the settings. */
export async function startCuttingService(settings: FakeSettings): Promise<ListeningServer> {
  const file = new StateFile(settings.stateDirectory, shopStateSchema, EMPTY_SHOP_STATE);
  const state = file.load();
  const save = () => file.save(state);
  const now = () => new Date();
  const timers = new Set<NodeJS.Timeout>();
  const sender = new CallbackSender(state.deliveries, {
    url: settings.callbackUrl,
    retryMs: Math.min(settings.paceMs, LONGEST_RETRY_START_MS),
    headersFor: (body) => signCallback(body, settings.secret, now()),
    onChange: save,
  });
  const desk = new OrderDesk(state, {
    now,
    paceMs: settings.paceMs,
    save,
    after: (delayMs, run) => {
      const timer = setTimeout(() => {
        timers.delete(timer);
        run();
      }, delayMs);
      timers.add(timer);
    },
    announce: (body, id, copiesLeft, delayMs) => sender.send({ id, body, copiesLeft, attempts: 0 }, delayMs),
  });

  const app = express();
  app.disable('x-powered-by');
  app.use(express.json({ limit: '25mb' }));
  app.get('/style.css', (_request, response) => void response.type('css').send(SHOP_STYLE));
  app.get('/', (_request, response) => sendHtml(response, statusPage(state)));

  const holdKey = (request: Request, _response: Response, next: NextFunction) => {
    if (request.get('authorization') !== `Bearer ${settings.apiKey}`) {
      throw new CounterRefusal(401, 'unknown-key', 'We do not know this key.');
    }
    next();
  };
  /** For whoever tries the customer's side: make the shop slow, down, wrong or unwilling. */
  app.put('/mood', holdKey, (request, response) => {
    state.mood = moodSchema.parse(request.body);
    save();
    response.json(state.mood);
  });
  app.use('/v1', holdKey, (_request, response, next) => {
    const { answerDelayMs, answerNonsense, failEveryRequest } = state.mood;
    if (failEveryRequest) throw new CounterRefusal(503, 'out-of-order', 'The order desk is closed at the moment.');
    if (answerNonsense) {
      response.status(200).type('json').send('{"quote":"ask Bert, he knows"}');
      return;
    }
    if (answerDelayMs > 0) setTimeout(next, answerDelayMs);
    else next();
  });
  app.post('/v1/quotes', (request, response) => {
    response.status(201).json(desk.quote(quoteRequestSchema.parse(request.body)));
  });
  app.get('/v1/quotes/:id', (request, response) => void response.json(desk.findQuote(request.params.id)));
  app.post('/v1/orders', (request, response) => {
    const { order, isNew } = desk.order(orderRequestSchema.parse(request.body));
    response.status(isNew ? 201 : 200).json(order);
  });
  app.get('/v1/orders/:id', (request, response) => void response.json(desk.findOrder(request.params.id)));
  app.delete('/v1/orders/:id', (request, response) => void response.json(desk.cancel(request.params.id)));

  app.use((error: unknown, _request: Request, response: Response, next: NextFunction) => {
    if (response.headersSent) return next(error);
    if (error instanceof CounterRefusal) {
      const { code, message } = error;
      response.status(error.status).json({ error: { code, message } });
    } else if (error instanceof z.ZodError) {
      const message = error.issues.map((issue) => `${issue.path.join('.')}: ${issue.message}`).join('; ');
      response.status(400).json({ error: { code: 'malformed', message } });
    } else next(error);
  });

  const server = await listenOnLoopback(app, settings.port);
  sender.resume();
  desk.resume();
  return {
    ...server,
    close: () => {
      sender.close();
      for (const timer of timers) clearTimeout(timer);
      return server.close();
    },
  };
}
