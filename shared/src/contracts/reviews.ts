import * as z from 'zod/mini';
import { partDocumentSchema } from './part-document-schema';
import { defineRoute } from './route';
import { oneLine, rowId, timestamp } from './scalars';
import { handSchema } from './stock';

/** A place on the part, in the coordinates of its layout, mm. */
export const placeSchema = z.strictObject({
  x: z.number().check(z.gte(-20_000), z.lte(20_000)),
  y: z.number().check(z.gte(-20_000), z.lte(20_000)),
});
export type Place = z.output<typeof placeSchema>;

export const commentSchema = z.object({
  id: rowId,
  /** Null for a comment on the draft. */
  revisionId: z.nullable(rowId),
  letter: z.string(),
  place: z.nullable(z.object({ x: z.number(), y: z.number() })),
  text: z.string(),
  by: z.string(),
  isGuest: z.boolean(),
  at: timestamp,
  isResolved: z.boolean(),
});
export type Comment = z.output<typeof commentSchema>;

/** What somebody says of a released revision. It says nothing about strength. */
export const opinionSchema = z.object({
  id: rowId,
  revisionId: rowId,
  letter: z.string(),
  hash: z.string(),
  verdict: z.enum(['agreed', 'changes-wanted']),
  note: z.string(),
  by: z.string(),
  isGuest: z.boolean(),
  at: timestamp,
});
export type Opinion = z.output<typeof opinionSchema>;

export const reviewLinkSchema = z.object({
  id: rowId,
  revisionId: rowId,
  letter: z.string(),
  guestName: z.string(),
  expiresAt: timestamp,
  madeBy: z.string(),
});
export type ReviewLink = z.output<typeof reviewLinkSchema>;

const commentText = z.string().check(z.trim(), z.minLength(1), z.maxLength(2000));
const commentInput = { place: z.nullable(placeSchema), text: commentText };
const opinionInput = z.strictObject({
  verdict: opinionSchema.shape.verdict,
  note: z.string().check(z.trim(), z.maxLength(1000)),
});
const crew = ['owner', 'fabricator', 'viewer'] as const;
const makers = ['owner', 'fabricator'] as const;
const linkParams = z.strictObject({ link: z.string().check(z.regex(/^[A-Za-z0-9_-]{20,80}$/)) });

export const listReviews = defineRoute({
  id: 'listReviews',
  method: 'GET',
  path: '/api/parts/:partId/reviews',
  tag: 'reviews',
  access: crew,
  summary: 'Comments on a part, what people say of its revisions, and private links that are open',
  params: z.strictObject({ partId: rowId }),
  answer: 'json',
  response: z.object({
    comments: z.array(commentSchema),
    opinions: z.array(opinionSchema),
    links: z.array(reviewLinkSchema),
  }),
  successStatus: 200,
});
export const addComment = defineRoute({
  id: 'addComment',
  method: 'POST',
  path: '/api/parts/:partId/comments',
  tag: 'reviews',
  access: crew,
  summary: 'Comment on a part, at a place of it or on the whole',
  params: z.strictObject({ partId: rowId }),
  body: z.strictObject({ revisionId: z.nullable(rowId), ...commentInput }),
  bodyKind: 'json',
  answer: 'json',
  response: commentSchema,
  successStatus: 201,
  idempotent: true,
});
export const resolveComment = defineRoute({
  id: 'resolveComment',
  method: 'PUT',
  path: '/api/comments/:commentId/resolution',
  tag: 'reviews',
  access: makers,
  summary: 'Say that a comment is dealt with, or open it again',
  params: z.strictObject({ commentId: rowId }),
  body: z.strictObject({ isResolved: z.boolean() }),
  bodyKind: 'json',
  answer: 'json',
  response: commentSchema,
  successStatus: 200,
});
export const giveOpinion = defineRoute({
  id: 'giveOpinion',
  method: 'POST',
  path: '/api/revisions/:revisionId/opinions',
  tag: 'reviews',
  access: crew,
  summary: 'Agree to a released revision, or ask for changes',
  params: z.strictObject({ revisionId: rowId }),
  body: opinionInput,
  bodyKind: 'json',
  answer: 'json',
  response: opinionSchema,
  successStatus: 201,
  idempotent: true,
});
export const makeReviewLink = defineRoute({
  id: 'makeReviewLink',
  method: 'POST',
  path: '/api/revisions/:revisionId/review-links',
  tag: 'reviews',
  access: makers,
  summary: 'A private link for somebody without an account; shown once, and mailed when there is an address',
  params: z.strictObject({ revisionId: rowId }),
  body: z.strictObject({
    guestName: oneLine(80),
    guestEmail: z.nullable(z.email()),
    days: z.int().check(z.gte(1), z.lte(90)),
  }),
  bodyKind: 'json',
  answer: 'json',
  response: z.object({ link: z.string(), expiresAt: timestamp }),
  successStatus: 201,
  idempotent: true,
});
export const withdrawReviewLink = defineRoute({
  id: 'withdrawReviewLink',
  method: 'DELETE',
  path: '/api/review-links/:reviewLinkId',
  tag: 'reviews',
  access: makers,
  summary: 'Withdraw a private link: it opens nothing any more',
  params: z.strictObject({ reviewLinkId: rowId }),
  answer: 'empty',
  successStatus: 204,
});
export const readReview = defineRoute({
  id: 'readReview',
  method: 'GET',
  path: '/api/reviews/:link',
  tag: 'reviews',
  access: 'public',
  summary: 'What a private link shows: one revision of one part, and nothing else of the workshop',
  params: linkParams,
  answer: 'json',
  response: z.object({
    workshopName: z.string(),
    partName: z.string(),
    partNumber: z.string(),
    letter: z.string(),
    hash: z.string(),
    hand: handSchema,
    materialLabel: z.string(),
    document: partDocumentSchema,
    guestName: z.string(),
    askedBy: z.string(),
    expiresAt: timestamp,
    comments: z.array(commentSchema),
    opinions: z.array(opinionSchema),
    cautions: z.array(z.string()),
  }),
  successStatus: 200,
});
export const commentByLink = defineRoute({
  id: 'commentByLink',
  method: 'POST',
  path: '/api/reviews/:link/comments',
  tag: 'reviews',
  access: 'public',
  summary: 'Comment as the guest of a private link',
  params: linkParams,
  body: z.strictObject(commentInput),
  bodyKind: 'json',
  answer: 'json',
  response: commentSchema,
  successStatus: 201,
  idempotent: true,
  problems: ['too-many-requests'],
});
export const opinionByLink = defineRoute({
  id: 'opinionByLink',
  method: 'POST',
  path: '/api/reviews/:link/opinions',
  tag: 'reviews',
  access: 'public',
  summary: 'Agree, or ask for changes, as the guest of a private link; the workshop gets a mail',
  params: linkParams,
  body: opinionInput,
  bodyKind: 'json',
  answer: 'json',
  response: opinionSchema,
  successStatus: 201,
  idempotent: true,
  problems: ['too-many-requests'],
});
