import * as z from 'zod/mini';
import { defineRoute } from './route';
import { oneLine, rowId, timestamp } from './scalars';
import { slug } from './shop';
import { shopFrontSchema } from './storefront';

export const questionSchema = z.object({
  id: rowId,
  about: z.string(),
  saleId: z.nullable(rowId),
  saleNumber: z.nullable(z.int()),
  listingSlug: z.nullable(slug),
  askedBy: z.string(),
  messages: z.array(
    z.object({ id: rowId, at: timestamp, by: z.string(), side: z.enum(['customer', 'workshop']), text: z.string() }),
  ),
  isAnswered: z.boolean(),
});
export type Question = z.output<typeof questionSchema>;
const messageText = z.string().check(z.trim(), z.minLength(1), z.maxLength(3000));

const sellers = ['owner', 'fabricator'] as const;
const crew = ['owner', 'fabricator', 'viewer'] as const;

export const askShop = defineRoute({
  id: 'askShop',
  method: 'POST',
  path: '/api/shops/:shop/questions',
  tag: 'storefront',
  access: 'public',
  summary: 'Ask the workshop about fit before buying; the answer comes by mail, with a link to the thread',
  params: z.strictObject({ shop: slug }),
  body: z.strictObject({ name: oneLine(80), email: z.email(), listingSlug: z.nullable(slug), text: messageText }),
  bodyKind: 'json',
  answer: 'json',
  response: z.object({ link: z.string() }),
  successStatus: 201,
  idempotent: true,
  problems: ['already-exists', 'too-many-requests'],
});

const linkParams = z.strictObject({ link: z.string().check(z.regex(/^[A-Za-z0-9_-]{20,80}$/)) });
export const readQuestionByLink = defineRoute({
  id: 'readQuestionByLink',
  method: 'GET',
  path: '/api/question-links/:link',
  tag: 'storefront',
  access: 'public',
  summary: 'A thread about fit by its private link',
  params: linkParams,
  answer: 'json',
  response: z.object({ shop: shopFrontSchema, question: questionSchema }),
  successStatus: 200,
});
export const askMoreByLink = defineRoute({
  id: 'askMoreByLink',
  method: 'POST',
  path: '/api/question-links/:link/messages',
  tag: 'storefront',
  access: 'public',
  summary: 'Ask something more',
  params: linkParams,
  body: z.strictObject({ text: messageText }),
  bodyKind: 'json',
  answer: 'json',
  response: questionSchema,
  successStatus: 201,
  idempotent: true,
  problems: ['already-exists', 'too-many-requests'],
});
export const listQuestions = defineRoute({
  id: 'listQuestions',
  method: 'GET',
  path: '/api/questions',
  tag: 'shop',
  access: crew,
  summary: 'Questions about fit, those without an answer first',
  answer: 'json',
  response: z.object({ questions: z.array(questionSchema) }),
  successStatus: 200,
});
export const answerQuestion = defineRoute({
  id: 'answerQuestion',
  method: 'POST',
  path: '/api/questions/:questionId/messages',
  tag: 'shop',
  access: sellers,
  summary: 'Answer a question about fit; the customer gets it by mail',
  params: z.strictObject({ questionId: rowId }),
  body: z.strictObject({ text: messageText }),
  bodyKind: 'json',
  answer: 'json',
  response: questionSchema,
  successStatus: 201,
  idempotent: true,
  problems: ['already-exists'],
});
