import { Injectable, inject } from '@angular/core';
import {
  type Comment,
  type Opinion,
  type Place,
  addComment,
  commentByLink,
  giveOpinion,
  listReviews,
  makeReviewLink,
  opinionByLink,
  readReview,
  resolveComment,
  withdrawReviewLink,
} from '@foldwright/shared/contracts/reviews';
import type { RouteBody, RouteResponse } from '@foldwright/shared/contracts/route';
import { ApiClient, type ApiRead } from './api-client';

/** Comments on parts, what people say of revisions, and private links to them. */
@Injectable({ providedIn: 'root' })
export class ReviewsApi {
  private readonly client = inject(ApiClient);

  ofPart(partId: () => string | undefined): ApiRead<RouteResponse<typeof listReviews>> {
    return this.client.read(listReviews, () => {
      const id = partId();
      return id === undefined ? undefined : { params: { partId: id } };
    });
  }

  comment(
    partId: string,
    revisionId: string | null,
    place: Place | null,
    text: string,
    idempotencyKey: string,
  ): Promise<Comment> {
    return this.client.call(addComment, { params: { partId }, body: { revisionId, place, text }, idempotencyKey });
  }

  resolve(commentId: string, isResolved: boolean): Promise<Comment> {
    return this.client.call(resolveComment, { params: { commentId }, body: { isResolved } });
  }

  giveOpinion(revisionId: string, verdict: Opinion['verdict'], note: string, idempotencyKey: string): Promise<Opinion> {
    return this.client.call(giveOpinion, { params: { revisionId }, body: { verdict, note }, idempotencyKey });
  }

  makeLink(
    revisionId: string,
    body: RouteBody<typeof makeReviewLink>,
    idempotencyKey: string,
  ): Promise<RouteResponse<typeof makeReviewLink>> {
    return this.client.call(makeReviewLink, { params: { revisionId }, body, idempotencyKey });
  }

  async withdrawLink(reviewLinkId: string): Promise<void> {
    await this.client.call(withdrawReviewLink, { params: { reviewLinkId } });
  }

  review(link: () => string): ApiRead<RouteResponse<typeof readReview>> {
    return this.client.read(readReview, () => ({ params: { link: link() } }));
  }

  commentByLink(link: string, place: Place | null, text: string, idempotencyKey: string): Promise<Comment> {
    return this.client.call(commentByLink, { params: { link }, body: { place, text }, idempotencyKey });
  }

  opinionByLink(link: string, verdict: Opinion['verdict'], note: string, idempotencyKey: string): Promise<Opinion> {
    return this.client.call(opinionByLink, { params: { link }, body: { verdict, note }, idempotencyKey });
  }
}
