import { createHash, randomBytes } from 'node:crypto';
import { computedPartSchema } from '@foldwright/shared/contracts/development-schema';
import type {
  Comment as CommentContract,
  Opinion as OpinionContract,
  Place,
  readReview as readContract,
} from '@foldwright/shared/contracts/reviews';
import { makeReviewLink as makeContract } from '@foldwright/shared/contracts/reviews';
import type { RouteResponse } from '@foldwright/shared/contracts/route';
import * as z from 'zod/mini';
import type { AppDependencies } from '../../app-dependencies';
import type { Database } from '../../database/database';
import type { WorkshopScope } from '../../database/workshop-scope';
import { cautionsForBuyers } from '../../documents/cautions';
import { notFound } from '../../http/problem';
import type { Member } from '../../http/visitor';
import type { ReviewLink } from '../../models/review-link';
import { presentComment, presentOpinion } from '../../presenters/reviews';
import { once } from '../once';
import { recordAudit } from '../record-audit';
import { readStoredDocument } from '../stored-document';
import { writeMail } from '../write-mail';
import { say, sayOpinion } from './say';

type Tools = Pick<AppDependencies, 'database' | 'queue' | 'publicUrl' | 'now'>;

const DAY_MS = 24 * 3600 * 1000;
const hashOf = (link: string): string => createHash('sha256').update(link).digest('hex');
const workshopRow = z.object({ workshop_id: z.uuid() });

export interface NewReviewLink {
  readonly guestName: string;
  readonly guestEmail: string | null;
  readonly days: number;
}

/**
 * Make a private link to a revision, once under the caller's key; it is shown here and never again.
 * @throws Problem `not-found`
 */
export function makeReviewLink(
  { database, queue, publicUrl, now }: Tools,
  actor: Member,
  revisionId: string,
  { guestName, guestEmail, days }: NewReviewLink,
  key: string,
): Promise<{ link: string; expiresAt: string }> {
  const { workshopId, userId, userName, workshopName } = actor;
  const request = { revisionId, guestName, guestEmail, days };
  return database.inWorkshop(workshopId, (scope) =>
    once(scope, { userId, route: makeContract.id, key, request }, makeContract.response, async () => {
      const revision = await scope.rows.revisions.get(revisionId);
      const part = await scope.rows.parts.get(revision.partId);
      const user = await scope.models.users.findByPk(userId, { transaction: scope.transaction, rejectOnEmpty: true });
      const at = now();
      const token = randomBytes(32).toString('base64url');
      const link = `${publicUrl}/review/${token}`;
      const row = await scope.rows.reviewLinks.add({
        ...{ revisionId, linkHash: hashOf(token), guestName, madeBy: userId, madeByName: userName, madeAt: at },
        madeByEmail: user.email,
        expiresAt: new Date(at.getTime() + days * DAY_MS),
      });
      const about = `${part.number} ${part.name}, revision ${revision.letter}`;
      await recordAudit(scope, actor, `Made a private link for ${guestName}`, about);
      if (guestEmail !== null) {
        const body = [
          `Hello ${guestName},`,
          `${userName} of ${workshopName} asks you to look at ${about}.`,
          `This link is yours alone and works for ${days} days: ${link}`,
        ];
        const mail = { key: `review-link:${row.id}`, orderId: null, recipient: guestEmail };
        const letter = { subject: `${workshopName}: please look at ${about}`, body: `${body.join('\n\n')}\n` };
        await writeMail(scope, queue, { ...mail, ...letter }, at);
      }
      return { link, expiresAt: row.expiresAt.toISOString() };
    }),
  );
}

/** Withdraw a private link; once is as good as twice. @throws Problem `not-found` */
export function withdrawReviewLink({ database, now }: Tools, actor: Member, reviewLinkId: string): Promise<void> {
  return database.inWorkshop(actor.workshopId, async (scope) => {
    const link = await scope.rows.reviewLinks.get(reviewLinkId, { lock: true });
    if (link.withdrawnAt !== null) return;
    await scope.rows.reviewLinks.change(link, { withdrawnAt: now() });
    await recordAudit(scope, actor, `Withdrew the private link for ${link.guestName}`, null);
  });
}

/** Work with what a link opens. @throws Problem `not-found` for one that is unknown, withdrawn or too old, all alike */
async function throughLink<T>(
  { database, now }: { readonly database: Database; readonly now: () => Date },
  token: string,
  work: (scope: WorkshopScope, link: ReviewLink) => Promise<T>,
): Promise<T> {
  const found = await database.asSystem('find the revision behind a review link', async ({ select }) =>
    select('SELECT workshop_id FROM review_links WHERE link_hash = $1', [hashOf(token)]),
  );
  const [row] = found.map((one) => workshopRow.parse(one));
  if (row === undefined) throw notFound();
  return database.inWorkshop(row.workshop_id, async (scope) => {
    const link = await scope.rows.reviewLinks.findOne({ linkHash: hashOf(token) });
    if (link === null || link.withdrawnAt !== null || link.expiresAt <= now()) throw notFound();
    return work(scope, link);
  });
}

/** What a private link shows: one revision, with what was said of it. @throws Problem `not-found` */
export function readReview(
  tools: Pick<Tools, 'database' | 'now'>,
  token: string,
): Promise<RouteResponse<typeof readContract>> {
  return throughLink(tools, token, async (scope, link) => {
    const revision = await scope.rows.revisions.get(link.revisionId);
    const part = await scope.rows.parts.get(revision.partId);
    const document = readStoredDocument(revision.document);
    const where = { revisionId: revision.id };
    const comments = await scope.rows.comments.list({ where, order: [['at', 'ASC']] });
    const opinions = await scope.rows.opinions.list({ where, order: [['at', 'DESC']] });
    const { letter, hash, hand } = revision;
    return {
      ...{ letter, hash, hand, document, guestName: link.guestName, askedBy: link.madeByName },
      ...{ partName: part.name, partNumber: part.number },
      workshopName: (await scope.workshop()).name,
      materialLabel: z.parse(computedPartSchema, revision.computedProduction).stockLabel,
      expiresAt: link.expiresAt.toISOString(),
      comments: comments.map(presentComment),
      opinions: opinions.map(presentOpinion),
      cautions: [...cautionsForBuyers(document.declaredUses)],
    };
  });
}

const guestOf = (link: ReviewLink) => ({ kind: 'guest', reviewLinkId: link.id, name: link.guestName }) as const;

/** Comment as the guest, once under the caller's key. @throws Problem `not-found` */
export function commentByLink(
  tools: Pick<Tools, 'database' | 'now'>,
  token: string,
  { place, text }: { readonly place: Place | null; readonly text: string },
  key: string,
): Promise<CommentContract> {
  return throughLink(tools, token, async (scope, link) => {
    const { id: revisionId, partId, letter } = await scope.rows.revisions.get(link.revisionId);
    const comment = { partId, revisionId, letter, place, text };
    return presentComment(await say(scope, guestOf(link), comment, key, tools.now()));
  });
}

/** Agree, or ask for changes, as the guest; whoever made the link gets a mail, once. @throws Problem `not-found` */
export function opinionByLink(
  tools: Tools,
  token: string,
  wish: { readonly verdict: OpinionContract['verdict']; readonly note: string },
  key: string,
): Promise<OpinionContract> {
  const { queue, publicUrl, now } = tools;
  return throughLink(tools, token, async (scope, link) => {
    const revision = await scope.rows.revisions.get(link.revisionId);
    const part = await scope.rows.parts.get(revision.partId);
    const { opinion, isNew } = await sayOpinion(scope, guestOf(link), revision, wish, key, now());
    if (!isNew) return presentOpinion(opinion);
    const about = `${part.number} ${part.name}, revision ${revision.letter}`;
    const words = wish.verdict === 'agreed' ? `agrees to ${about}` : `asks for changes of ${about}`;
    await recordAudit(scope, null, `${link.guestName} ${words}`, null);
    const body = [`${link.guestName} ${words}.`, wish.note, `${publicUrl}/parts/${part.id}/release`].filter(Boolean);
    await writeMail(
      scope,
      queue,
      {
        key: `opinion:${opinion.id}`,
        orderId: null,
        recipient: link.madeByEmail,
        subject: `${link.guestName} ${words}`,
        body: `${body.join('\n\n')}\n`,
      },
      now(),
    );
    return presentOpinion(opinion);
  });
}
