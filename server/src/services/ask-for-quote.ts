import { computedPartSchema } from '@foldwright/shared/contracts/development-schema';
import type { Quote as QuoteContract } from '@foldwright/shared/contracts/orders';
import * as z from 'zod/mini';
import type { AppDependencies } from '../app-dependencies';
import type { CuttingService, PriceAnswer, PriceQuestion, PricedQuantity } from '../cutting/cutting-service';
import { CuttingServiceNonsense, CuttingServiceRefused, CuttingServiceUnreachable } from '../cutting/cutting-service';
import type { WorkshopScope } from '../database/workshop-scope';
import type { FileStore } from '../files/file-store';
import { Problem } from '../http/problem';
import type { Member } from '../http/visitor';
import type { Quote } from '../models/quote';
import type { Revision } from '../models/revision';
import { presentQuote } from '../presenters/orders';
import { cutFileOf } from './cut-package';
import { readStoredDocument } from './stored-document';

export interface QuoteWish {
  readonly revisionId: string;
  readonly stock: 'trial' | 'production';
  readonly quantities: readonly number[];
}

const CURRENCY = 'EUR';

/**
 * Ask the cutting service what a released revision costs. The question is kept before it is asked, so that a service that
 * is away loses nothing; no transaction waits for the service.
 * @param key made by the browser for this one question: asking again under it asks about the same row
 * @throws Problem `not-found`, `already-exists` for a key that was used for another question, `service-unreachable`,
 *   `service-refused` when the service won't even look at it
 */
export async function askForQuote(
  { database, files, cutting, now }: Pick<AppDependencies, 'database' | 'files' | 'cutting' | 'now'>,
  actor: Member,
  wish: QuoteWish,
  key: string,
): Promise<QuoteContract> {
  const quantities = [...new Set(wish.quantities)].sort((a, b) => a - b);
  const kept = await database.inWorkshop(actor.workshopId, (scope) =>
    keepQuestion(scope, actor, { ...wish, quantities }, key, now()),
  );
  const { quote } = kept;
  if (quote.state === 'priced' || quote.state === 'refused') return presentQuote(quote, now());

  const question = await writeQuestion(files, kept);
  const outcome = await ask(cutting, question);
  const presented = await database.inWorkshop(actor.workshopId, async ({ rows }) => {
    const row = await rows.quotes.get(quote.id, { lock: true });
    // Asked twice at once: the first answer counts.
    const isOpen = row.state === 'asked' || row.state === 'unreachable';
    return presentQuote(isOpen ? await rows.quotes.change(row, outcome.changes) : row, now());
  });
  if (outcome.problem !== null) throw outcome.problem;
  return presented;
}

interface Kept {
  readonly quote: Quote;
  readonly revision: Revision;
  readonly partName: string;
  readonly dxfStoredAs: string;
}

async function keepQuestion(
  scope: WorkshopScope,
  actor: Member,
  { revisionId, stock, quantities }: QuoteWish,
  key: string,
  now: Date,
): Promise<Kept> {
  const revision = await scope.rows.revisions.get(revisionId);
  const part = await scope.rows.parts.get(revision.partId);
  const dxfStoredAs = await cutFileOf(scope, revisionId, stock);
  const document = readStoredDocument(revision.document);
  // ON CONFLICT waits for a transaction that keeps the same question, and then finds its row.
  await scope.sql(
    `INSERT INTO quotes (id, workshop_id, revision_id, revision_letter, revision_hash, stock, stock_label, statement,
       quantities, state, asked_by, asked_at, idempotency_key)
     VALUES (gen_random_uuid(), $1, $2, $3, $4, $5, $6, $7, $8::jsonb, 'asked', $9, $10, $11) ON CONFLICT DO NOTHING`,
    [
      scope.workshopId,
      revision.id,
      revision.letter,
      revision.hash,
      stock,
      computedFor(revision, stock).stockLabel,
      document.making.statement,
      JSON.stringify(quantities),
      actor.userId,
      now,
      key,
    ],
  );
  const quote = await scope.rows.quotes.findOne({ askedBy: actor.userId, idempotencyKey: key });
  if (quote === null) throw new Error('a question that was kept has no row');
  if (
    quote.revisionId !== revisionId ||
    quote.stock !== stock ||
    JSON.stringify(quote.quantities) !== JSON.stringify(quantities)
  ) {
    throw new Problem('already-exists', {
      detail: 'This key was used for another question before.',
      next: 'Send a new Idempotency-Key.',
    });
  }
  return { quote, revision, partName: part.name, dxfStoredAs };
}

const computedFor = (revision: Revision, stock: QuoteWish['stock']) =>
  z.parse(computedPartSchema, stock === 'trial' ? revision.computedTrial : revision.computedProduction);

async function writeQuestion(files: FileStore, kept: Kept): Promise<PriceQuestion> {
  const { quote, revision, partName, dxfStoredAs } = kept;
  const { development } = computedFor(revision, quote.stock);
  if (development === null) throw new Error(`revision ${revision.id} was released without a flat pattern`);
  const { materialId, thicknessMm } = readStoredDocument(revision.document).stocks[quote.stock];
  return {
    reference: quote.id,
    partName: `${partName}, revision ${revision.letter}`,
    // DXF of this version is an 8-bit text.
    dxf: (await files.read(dxfStoredAs)).toString('latin1'),
    materialId,
    thicknessMm,
    quantities: quote.quantities,
    currency: CURRENCY,
    statement: quote.statement,
    bends: development.bendTable.map((row) => ({
      name: row.name,
      angleDeg: row.bendAngleDeg,
      direction: row.direction === 'towards' ? 'toward' : 'away',
      insideRadiusMm: row.insideRadiusMm,
      lengthMm: row.bendLengthMm,
    })),
  };
}

interface Outcome {
  /** What to write into the row of the question. */
  readonly changes: {
    readonly state: Quote['state'];
    readonly breaks?: readonly PricedQuantity[];
    readonly refusal?: string;
    readonly quoteReference?: string;
    readonly validUntil?: Date;
  };
  readonly problem: Problem | null;
}

async function ask(cutting: CuttingService, question: PriceQuestion): Promise<Outcome> {
  try {
    return { changes: changesOf(await cutting.askPrice(question)), problem: null };
  } catch (error) {
    // The service being away, unwilling or unclear is foreseen and told in words; anything else is a fault of ours.
    const kept = 'The revision is as it was, and the question is kept.';
    if (error instanceof CuttingServiceRefused) {
      const problem = new Problem('service-refused', { detail: `${cutting.name} says: ${error.message}`, kept });
      return { changes: { state: 'refused', refusal: error.message }, problem };
    }
    const isNonsense = error instanceof CuttingServiceNonsense;
    if (!isNonsense && !(error instanceof CuttingServiceUnreachable)) throw error;
    const problem = new Problem('service-unreachable', {
      detail: isNonsense
        ? `${cutting.name} answered something that can’t be understood, so there is no price.`
        : `${cutting.name} doesn’t answer at the moment. ${error.message}`,
      kept,
      next: 'Ask again in a few minutes.',
    });
    return { changes: { state: 'unreachable' }, problem };
  }
}

function changesOf(answer: PriceAnswer): Outcome['changes'] {
  const { quoteReference } = answer;
  if (answer.kind === 'refused') return { state: 'refused', refusal: answer.reasons.join('\n'), quoteReference };
  return { state: 'priced', breaks: answer.breaks, validUntil: answer.validUntil, quoteReference };
}
