import { randomBytes } from 'node:crypto';
import type { Question as QuestionContract } from '@foldwright/shared/contracts/questions';
import type { AppDependencies } from '../../app-dependencies';
import type { Database } from '../../database/database';
import type { WorkshopScope } from '../../database/workshop-scope';
import { recordEvent } from '../../events/record-event';
import { Problem } from '../../http/problem';
import type { Member } from '../../http/visitor';
import type { Question } from '../../models/question';
import type { QuestionMessage } from '../../models/question-message';
import type { Sale } from '../../models/sale';
import { findQuestionByLink, findShop } from '../sales/find-by-link';
import { orderPageUrl } from '../sales/sale-letters';
import { writeMail } from '../write-mail';
import { shopOf } from './settings';

type Tools = Pick<AppDependencies, 'database' | 'queue' | 'publicUrl' | 'now'>;

/** Address of the page of a thread that began before buying. */
const threadUrl = (publicUrl: string, link: string) => `${publicUrl}/shop/question/${link}`;

/** Threads about fit with their messages, those without an answer first. */
export async function presentQuestions(
  scope: WorkshopScope,
  where: { readonly saleId?: string; readonly id?: string },
): Promise<QuestionContract[]> {
  const rows = await scope.rows.questions.list({
    where,
    order: [
      ['isAnswered', 'ASC'],
      ['askedAt', 'DESC'],
    ],
  });
  const messages = await scope.rows.questionMessages.list({
    where: { questionId: rows.map(({ id }) => id) },
    order: [
      ['at', 'ASC'],
      ['id', 'ASC'],
    ],
  });
  const sales = await scope.rows.sales.list({ where: { id: rows.flatMap(({ saleId }) => saleId ?? []) } });
  const listings = await scope.rows.listings.list({ where: { id: rows.flatMap(({ listingId }) => listingId ?? []) } });
  return rows.map((row) => {
    const sale = sales.find(({ id }) => id === row.saleId);
    const listing = listings.find(({ id }) => id === row.listingId);
    return {
      id: row.id,
      about: sale === undefined ? (listing?.title ?? 'the shop') : `order ${sale.number}`,
      saleId: row.saleId,
      saleNumber: sale?.number ?? null,
      listingSlug: listing?.slug ?? null,
      askedBy: row.askerName,
      messages: messages
        .filter(({ questionId }) => questionId === row.id)
        .map(({ id, at, byName, side, text }) => ({ id, at: at.toISOString(), by: byName, side, text })),
      isAnswered: row.isAnswered,
    };
  });
}

async function presentOne(scope: WorkshopScope, question: Question): Promise<QuestionContract> {
  const [only] = await presentQuestions(scope, { id: question.id });
  if (only === undefined) throw new Error(`question ${question.id} was not presented`);
  return only;
}

const usedOtherwise = (): Problem =>
  new Problem('already-exists', {
    detail: 'This key was used for something else before.',
    kept: 'Nothing was sent.',
    next: 'Send a new Idempotency-Key.',
  });

/** @throws Problem `already-exists` when the key of a message comes with other words */
function refuseOtherText(known: QuestionMessage, text: string): void {
  if (known.text !== text) throw usedOtherwise();
}

/** A message of the customer: kept once under its key, and mailed to the workshop. */
async function addQuestion(
  scope: WorkshopScope,
  question: Question,
  { text, key, about }: { readonly text: string; readonly key: string; readonly about: string },
  { queue, publicUrl, now }: Tools,
): Promise<void> {
  const known = await scope.rows.questionMessages.findOne({ questionId: question.id, key });
  if (known !== null) {
    refuseOtherText(known, text);
    return;
  }
  const at = now();
  const byName = question.askerName;
  await scope.rows.questionMessages.add({ questionId: question.id, key, side: 'customer', byName, text, at });
  await scope.rows.questions.change(question, { isAnswered: false });
  const { questionsTo } = await shopOf(scope);
  const body = [`${byName} asks about ${about}:`, text, `Answer it here: ${publicUrl}/shop-desk/questions`].join(
    '\n\n',
  );
  await writeMail(
    scope,
    queue,
    {
      key: `question:${question.id}:${key}`,
      orderId: null,
      saleId: question.saleId,
      recipient: questionsTo,
      subject: `A question about fit: ${about}`,
      body: `${body}\n`,
    },
    at,
  );
  recordEvent(scope, { kind: 'question-changed', questionId: question.id });
}

export interface QuestionBefore {
  readonly name: string;
  readonly email: string;
  readonly listingSlug: string | null;
  readonly text: string;
}

/**
 * Ask before buying, once under the caller's key.
 * @returns private link of the thread
 * @throws Problem `not-found`
 */
export async function askShop(
  tools: Tools,
  shopSlug: string,
  { name, email, listingSlug, text }: QuestionBefore,
  key: string,
): Promise<string> {
  const workshopId = await findShop(tools.database, shopSlug);
  const askerEmail = email.trim().toLowerCase();
  return tools.database.inWorkshop(workshopId, async (scope) => {
    await scope.sql("SELECT pg_advisory_xact_lock(hashtextextended('question:' || $1, 0))", [key]);
    const known = await scope.rows.questionMessages.findOne({ key });
    if (known !== null) {
      const question = await scope.rows.questions.get(known.questionId);
      // Whoever chances on somebody else's key must not get the link of their thread.
      if (question.askerEmail !== askerEmail || question.saleId !== null) throw usedOtherwise();
      refuseOtherText(known, text);
      return question.link;
    }
    const listing =
      listingSlug === null ? null : await scope.rows.listings.findOne({ slug: listingSlug, state: 'published' });
    const question = await scope.rows.questions.add({
      listingId: listing?.id ?? null,
      askerName: name,
      askerEmail,
      link: randomBytes(32).toString('base64url'),
      askedAt: tools.now(),
    });
    await addQuestion(scope, question, { text, key, about: listing?.title ?? 'the shop' }, tools);
    return question.link;
  });
}

/** Ask about fit on an order: one thread for each order, however often somebody asks. */
export async function askOnSale(
  scope: WorkshopScope,
  sale: Sale,
  text: string,
  key: string,
  tools: Tools,
): Promise<void> {
  const known = await scope.rows.questions.findOne({ saleId: sale.id });
  const question =
    known ??
    (await scope.rows.questions.add({
      saleId: sale.id,
      askerName: sale.customerName,
      askerEmail: sale.customerEmail,
      link: randomBytes(32).toString('base64url'),
      askedAt: tools.now(),
    }));
  await addQuestion(scope, question, { text, key, about: `order ${sale.number}` }, tools);
}

/** A thread by its private link. @throws Problem `not-found` */
export async function readQuestion(
  database: Database,
  link: string,
): Promise<{ readonly workshopId: string; readonly question: QuestionContract }> {
  const { workshopId, questionId } = await findQuestionByLink(database, link);
  const question = await database.viewWorkshop(workshopId, async (scope) =>
    presentOne(scope, await scope.rows.questions.get(questionId)),
  );
  return { workshopId, question };
}

/** Ask something more in a thread, once under the caller's key. @throws Problem `not-found` */
export async function askMore(tools: Tools, link: string, text: string, key: string): Promise<QuestionContract> {
  const { workshopId, questionId } = await findQuestionByLink(tools.database, link);
  return tools.database.inWorkshop(workshopId, async (scope) => {
    const question = await scope.rows.questions.get(questionId, { lock: true });
    const listing = question.listingId === null ? null : await scope.rows.listings.find(question.listingId);
    await addQuestion(scope, question, { text, key, about: listing?.title ?? 'the shop' }, tools);
    return presentOne(scope, question);
  });
}

/** Threads of the workshop, those without an answer first. */
export function listQuestions(database: Database, { workshopId }: Member): Promise<QuestionContract[]> {
  return database.viewWorkshop(workshopId, (scope) => presentQuestions(scope, {}));
}

/** Answer a thread, once under the caller's key; the customer gets it by mail. @throws Problem `not-found` */
export function answerQuestion(
  tools: Tools,
  actor: Member,
  questionId: string,
  text: string,
  key: string,
): Promise<QuestionContract> {
  const { database, queue, publicUrl, now } = tools;
  return database.inWorkshop(actor.workshopId, async (scope) => {
    const question = await scope.rows.questions.get(questionId, { lock: true });
    const known = await scope.rows.questionMessages.findOne({ questionId, key });
    if (known !== null) {
      refuseOtherText(known, text);
      return presentOne(scope, question);
    }
    const at = now();
    await scope.rows.questionMessages.add({ questionId, key, side: 'workshop', byName: actor.userName, text, at });
    await scope.rows.questions.change(question, { isAnswered: true });
    const sale = question.saleId === null ? null : await scope.rows.sales.get(question.saleId);
    const page = sale === null ? threadUrl(publicUrl, question.link) : orderPageUrl(publicUrl, sale.link);
    const body = [`Hello ${question.askerName},`, `${actor.userName} of ${actor.workshopName} answers:`, text, page];
    await writeMail(
      scope,
      queue,
      {
        key: `question:${questionId}:${key}`,
        orderId: null,
        saleId: question.saleId,
        recipient: question.askerEmail,
        subject: `${actor.workshopName} answers your question about fit`,
        body: `${body.join('\n\n')}\n`,
      },
      at,
    );
    recordEvent(scope, { kind: 'question-changed', questionId });
    if (sale !== null) recordEvent(scope, { kind: 'sale-changed', saleId: sale.id });
    return presentOne(scope, question);
  });
}
