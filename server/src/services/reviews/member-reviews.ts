import type {
  Comment as CommentContract,
  listReviews as listContract,
  Opinion as OpinionContract,
  Place,
} from '@foldwright/shared/contracts/reviews';
import type { RouteResponse } from '@foldwright/shared/contracts/route';
import type { Database } from '../../database/database';
import { recordEvent } from '../../events/record-event';
import { notFound } from '../../http/problem';
import type { Member } from '../../http/visitor';
import { presentComment, presentOpinion } from '../../presenters/reviews';
import { recordAudit } from '../record-audit';
import { revisionLetter } from '../revision-letter';
import { say, sayOpinion } from './say';

type Reviews = RouteResponse<typeof listContract>;

const speakerOf = ({ userId, userName }: Member) => ({ kind: 'member', userId, name: userName }) as const;

/** Comments on a part, what people said of its revisions, and links that are open to makers. @throws Problem `not-found` */
export function listReviews(database: Database, member: Member, partId: string, now: Date): Promise<Reviews> {
  return database.viewWorkshop(member.workshopId, async ({ rows }) => {
    const part = await rows.parts.get(partId);
    const revisions = await rows.revisions.list({ where: { partId: part.id }, attributes: ['id', 'letter'] });
    const ids = revisions.map(({ id }) => id);
    const comments = await rows.comments.list({ where: { partId }, order: [['at', 'ASC']] });
    const opinions = await rows.opinions.list({ where: { revisionId: ids }, order: [['at', 'DESC']] });
    const isMaker = member.role === 'owner' || member.role === 'fabricator';
    const links = isMaker
      ? await rows.reviewLinks.list({ where: { revisionId: ids, withdrawnAt: null }, order: [['madeAt', 'DESC']] })
      : [];
    return {
      comments: comments.map(presentComment),
      opinions: opinions.map(presentOpinion),
      links: links
        .filter(({ expiresAt }) => expiresAt > now)
        .map(({ id, revisionId, guestName, expiresAt, madeByName }) => ({
          ...{ id, revisionId, guestName, madeBy: madeByName },
          letter: revisions.find((revision) => revision.id === revisionId)?.letter ?? '',
          expiresAt: expiresAt.toISOString(),
        })),
    };
  });
}

/** Comment on a draft or a revision of a part, once under the caller's key. @throws Problem `not-found` */
export function addComment(
  database: Database,
  member: Member,
  partId: string,
  {
    revisionId,
    place,
    text,
  }: { readonly revisionId: string | null; readonly place: Place | null; readonly text: string },
  key: string,
  now: Date,
): Promise<CommentContract> {
  return database.inWorkshop(member.workshopId, async (scope) => {
    const part = await scope.rows.parts.get(partId);
    const revision = revisionId === null ? null : await scope.rows.revisions.get(revisionId);
    if (revision !== null && revision.partId !== part.id) throw notFound();
    const draft = await scope.rows.drafts.findOne({ partId, closedAt: null });
    const letter = revision?.letter ?? draft?.letter ?? revisionLetter(0);
    const comment = { partId, revisionId, letter, place, text };
    return presentComment(await say(scope, speakerOf(member), comment, key, now));
  });
}

/** Say that a comment is dealt with, or open it again. @throws Problem `not-found` */
export function resolveComment(
  database: Database,
  member: Member,
  commentId: string,
  isResolved: boolean,
  now: Date,
): Promise<CommentContract> {
  return database.inWorkshop(member.workshopId, async (scope) => {
    const comment = await scope.rows.comments.get(commentId, { lock: true });
    if ((comment.resolvedAt !== null) !== isResolved) {
      await scope.rows.comments.change(comment, { resolvedAt: isResolved ? now : null });
      await recordEvent(scope, { kind: 'part-changed', partId: comment.partId });
    }
    return presentComment(comment);
  });
}

/** Agree to a released revision, or ask for changes, once under the caller's key. @throws Problem `not-found` */
export function giveOpinion(
  database: Database,
  member: Member,
  revisionId: string,
  wish: { readonly verdict: OpinionContract['verdict']; readonly note: string },
  key: string,
  now: Date,
): Promise<OpinionContract> {
  return database.inWorkshop(member.workshopId, async (scope) => {
    const revision = await scope.rows.revisions.get(revisionId);
    const { opinion, isNew } = await sayOpinion(scope, speakerOf(member), revision, wish, key, now);
    if (isNew) {
      const words = wish.verdict === 'agreed' ? 'Agreed to revision' : 'Asked for changes of revision';
      await recordAudit(scope, member, `${words} ${revision.letter}`, null);
    }
    return presentOpinion(opinion);
  });
}
