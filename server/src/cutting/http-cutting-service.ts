import { eachMinor, sumOfLines } from '@foldwright/shared/pricing/price-lines';
import * as z from 'zod/mini';
import type { CutOrder, CuttingProgress, CuttingService, PriceAnswer, PriceQuestion } from './cutting-service';
import {
  CUTTING_STEPS,
  CuttingServiceNonsense,
  CuttingServiceRefused,
  CuttingServiceUnreachable,
  UnprovenCallback,
} from './cutting-service';
import { sheetCodeOf } from './sheet-codes';
import { verifyCallback } from './verify-callback';

export interface HttpCuttingServiceOptions {
  readonly url: string;
  readonly key: string;
  readonly callbackSecret: string;
  readonly now: () => Date;
  /** How long one try may take, ms. */
  readonly timeoutMs?: number;
  /** Tries after the first when nobody answers or the service has a fault. */
  readonly retries?: number;
}

const minor = z.int();
const currency = z.enum(['EUR', 'USD']);
const quoteAnswer = z.discriminatedUnion('state', [
  z.object({
    state: z.literal('priced'),
    id: z.string(),
    currency,
    validUntil: z.iso.datetime(),
    breaks: z.array(
      z.object({
        quantity: z.int(),
        totalMinor: minor,
        leadTimeDays: z.int(),
        lines: z.array(z.object({ label: z.string(), amountMinor: minor })),
      }),
    ),
  }),
  z.object({ state: z.literal('refused'), id: z.string(), reasons: z.array(z.object({ text: z.string() })) }),
]);
const orderAnswer = z.object({ id: z.string(), reference: z.string() });
const refusalAnswer = z.object({ error: z.object({ code: z.string(), message: z.string() }) });
const callbackBody = z.object({
  id: z.string().check(z.minLength(1)),
  at: z.iso.datetime(),
  order: z.object({
    reference: z.string(),
    state: z.string(),
    trackingCode: z.nullable(z.string()),
    reason: z.nullable(z.string()),
  }),
});

const PAUSE_BETWEEN_TRIES_MS = 200;

/** The cutting service over HTTP and JSON, with signed callbacks. Answers are parsed, never believed. */
export class HttpCuttingService implements CuttingService {
  readonly name = 'Ashmarrow Sheet Cutting';

  constructor(private readonly options: HttpCuttingServiceOptions) {}

  async askPrice(question: PriceQuestion): Promise<PriceAnswer> {
    const { materialId, ...rest } = question;
    const answer = await this.post('/v1/quotes', { ...rest, material: sheetCodeOf(materialId) }, quoteAnswer);
    if (answer.state === 'refused') {
      return { kind: 'refused', quoteReference: answer.id, reasons: answer.reasons.map((reason) => reason.text) };
    }
    const money = (amountMinor: number) => ({ amountMinor, currency: answer.currency });
    const breaks = question.quantities.map((quantity) => {
      const row = answer.breaks.find((candidate) => candidate.quantity === quantity);
      const lines = row?.lines.map((line) => ({ label: line.label, amount: money(line.amountMinor) })) ?? [];
      const sum = lines.length === 0 ? 0 : sumOfLines(lines).amountMinor;
      if (row === undefined || answer.currency !== question.currency || sum !== row.totalMinor || sum <= 0) {
        throw new CuttingServiceNonsense(`The prices for ${quantity} do not add up or are missing.`);
      }
      const total = money(row.totalMinor);
      return { quantity, each: money(eachMinor({ quantity, total })), total, lines, leadTimeDays: row.leadTimeDays };
    });
    return { kind: 'priced', quoteReference: answer.id, validUntil: new Date(answer.validUntil), breaks };
  }

  async placeOrder(order: CutOrder): Promise<string> {
    const { quoteReference, drawingPdf, ...rest } = order;
    const body = { ...rest, quoteId: quoteReference, drawing: drawingPdf.toString('base64') };
    const answer = await this.post('/v1/orders', body, orderAnswer);
    if (answer.reference !== order.reference) throw new CuttingServiceNonsense('The answer is about another order.');
    return answer.id;
  }

  readCallback(body: Buffer, header: (name: string) => string | undefined): CuttingProgress | null {
    const message = { time: header('x-ashmarrow-time'), signature: header('x-ashmarrow-signature') };
    verifyCallback(body, message, this.options.callbackSecret, this.options.now());
    const parsed = callbackBody.safeParse(parseJson(body.toString('utf8')));
    if (!parsed.success) throw new UnprovenCallback('The message is signed but can’t be read.');
    const { id, at, order } = parsed.data;
    // An order that the shop calls off is one that it hands back.
    const state = order.state === 'cancelled' ? 'refused' : order.state;
    const step = CUTTING_STEPS.find((known) => known === state);
    if (step === undefined) return null;
    const { reference, trackingCode, reason } = order;
    return { id, at: new Date(at), orderReference: reference, step, trackingCode, reason };
  }

  private async post<S extends z.ZodMiniType>(path: string, body: unknown, schema: S): Promise<z.output<S>> {
    const { status, text } = await this.request(path, JSON.stringify(body));
    const json = parseJson(text);
    if (status >= 400) {
      const refusal = refusalAnswer.safeParse(json);
      if (!refusal.success) throw new CuttingServiceNonsense(`The service answered ${status} without saying why.`);
      throw new CuttingServiceRefused(refusal.data.error.code, refusal.data.error.message);
    }
    const parsed = z.safeParse(schema, json);
    if (!parsed.success) throw new CuttingServiceNonsense('The service answered something that can’t be read.');
    return parsed.data;
  }

  /** One request, repeated while nobody answers or the other side has a fault; every request here may be repeated. */
  private async request(path: string, body: string): Promise<{ status: number; text: string }> {
    const { url, key, retries = 1 } = this.options;
    for (let attempt = 0; ; attempt += 1) {
      const isLast = attempt >= retries;
      try {
        const answer = await fetch(new URL(path, url), {
          method: 'POST',
          headers: { 'content-type': 'application/json', authorization: `Bearer ${key}` },
          body,
          signal: AbortSignal.timeout(this.options.timeoutMs ?? 8000),
        });
        const text = await answer.text();
        if (answer.status < 500) return { status: answer.status, text };
        if (isLast) throw new CuttingServiceUnreachable(`The service answered ${answer.status}.`);
      } catch (error) {
        if (error instanceof CuttingServiceUnreachable) throw error;
        // fetch tells a refused connection and a passed deadline by different errors; both mean that nobody answered.
        const isTimeout = error instanceof DOMException && error.name === 'TimeoutError';
        // A passed deadline is not tried again: the person has waited long enough.
        if (isLast || isTimeout) {
          const words = isTimeout ? 'The service did not answer in time.' : 'The service can’t be reached.';
          throw new CuttingServiceUnreachable(words, { cause: error });
        }
      }
      await new Promise((resolve) => setTimeout(resolve, PAUSE_BETWEEN_TRIES_MS));
    }
  }
}

function parseJson(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    // Not JSON: the schema that looks at the answer next says so in words.
    return undefined;
  }
}
