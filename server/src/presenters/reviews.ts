import type { Comment as CommentContract, Opinion as OpinionContract } from '@foldwright/shared/contracts/reviews';
import type { Comment } from '../models/comment';
import type { Opinion } from '../models/opinion';

export function presentComment(row: Comment): CommentContract {
  const { id, revisionId, letter, placeX, placeY, text, byName, reviewLinkId, at, resolvedAt } = row;
  return {
    ...{ id, revisionId, letter, text, by: byName },
    place: placeX === null || placeY === null ? null : { x: placeX, y: placeY },
    isGuest: reviewLinkId !== null,
    at: at.toISOString(),
    isResolved: resolvedAt !== null,
  };
}

export function presentOpinion(row: Opinion): OpinionContract {
  const { id, revisionId, letter, hash, verdict, note, byName, reviewLinkId, at } = row;
  return {
    ...{ id, revisionId, letter, hash, verdict, note, by: byName },
    isGuest: reviewLinkId !== null,
    at: at.toISOString(),
  };
}
