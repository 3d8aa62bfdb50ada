import * as contracts from '@foldwright/shared/contracts/reviews';
import type { AppDependencies } from '../app-dependencies';
import type { BoundRoute } from '../http/route-call';
import { bind } from '../http/route-call';
import { addComment, giveOpinion, listReviews, resolveComment } from '../services/reviews/member-reviews';
import {
  commentByLink,
  makeReviewLink,
  opinionByLink,
  readReview,
  withdrawReviewLink,
} from '../services/reviews/review-links';

export function reviewRoutes(dependencies: AppDependencies): BoundRoute[] {
  const { database, limits, now } = dependencies;
  return [
    bind(contracts.listReviews, ({ actor, params }) => listReviews(database, actor, params.partId, now())),
    bind(contracts.addComment, ({ actor, params, body, idempotencyKey }) =>
      addComment(database, actor, params.partId, body, idempotencyKey, now()),
    ),
    bind(contracts.resolveComment, ({ actor, params, body }) =>
      resolveComment(database, actor, params.commentId, body.isResolved, now()),
    ),
    bind(contracts.giveOpinion, ({ actor, params, body, idempotencyKey }) =>
      giveOpinion(database, actor, params.revisionId, body, idempotencyKey, now()),
    ),
    bind(contracts.makeReviewLink, ({ actor, params, body, idempotencyKey }) =>
      makeReviewLink(dependencies, actor, params.revisionId, body, idempotencyKey),
    ),
    bind(contracts.withdrawReviewLink, ({ actor, params }) =>
      withdrawReviewLink(dependencies, actor, params.reviewLinkId),
    ),
    bind(contracts.readReview, ({ params }) => readReview(dependencies, params.link)),
    bind(contracts.commentByLink, async ({ params, body, idempotencyKey, request }) => {
      await limits.countVisitorPost(request);
      return commentByLink(dependencies, params.link, body, idempotencyKey);
    }),
    bind(contracts.opinionByLink, async ({ params, body, idempotencyKey, request }) => {
      await limits.countVisitorPost(request);
      return opinionByLink(dependencies, params.link, body, idempotencyKey);
    }),
  ];
}
