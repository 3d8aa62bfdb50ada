import type { Opinion as OpinionContract, Place } from '@foldwright/shared/contracts/reviews';
import type { WorkshopScope } from '../../database/workshop-scope';
import { recordEvent } from '../../events/record-event';
import type { Comment } from '../../models/comment';
import type { Opinion } from '../../models/opinion';
import type { Revision } from '../../models/revision';

/** Who says something: somebody of the workshop, or the guest of a private link. */
export type Speaker =
  | { readonly kind: 'member'; readonly userId: string; readonly name: string }
  | { readonly kind: 'guest'; readonly reviewLinkId: string; readonly name: string };

const bySpeaker = (speaker: Speaker) => ({
  byName: speaker.name,
  byUser: speaker.kind === 'member' ? speaker.userId : null,
  reviewLinkId: speaker.kind === 'guest' ? speaker.reviewLinkId : null,
});
/** A key counts for one speaker: two people may have made the same. */
const keyOf = (speaker: Speaker, key: string): string =>
  `${speaker.kind === 'member' ? speaker.userId : speaker.reviewLinkId}:${key}`;

export interface NewComment {
  readonly partId: string;
  readonly revisionId: string | null;
  readonly letter: string;
  readonly place: Place | null;
  readonly text: string;
}

/** Add a comment, once under the speaker's key. */
export async function say(
  scope: WorkshopScope,
  speaker: Speaker,
  { partId, revisionId, letter, place, text }: NewComment,
  key: string,
  now: Date,
): Promise<Comment> {
  const once = keyOf(speaker, key);
  const known = await scope.rows.comments.findOne({ key: once });
  if (known !== null) return known;
  const comment = await scope.rows.comments.add({
    ...{ key: once, partId, revisionId, letter, text, at: now },
    ...{ placeX: place?.x ?? null, placeY: place?.y ?? null },
    ...bySpeaker(speaker),
  });
  await recordEvent(scope, { kind: 'part-changed', partId });
  return comment;
}

/** Say what one thinks of a released revision, once under the speaker's key. It refers to the revision's hash. */
export async function sayOpinion(
  scope: WorkshopScope,
  speaker: Speaker,
  revision: Revision,
  { verdict, note }: { readonly verdict: OpinionContract['verdict']; readonly note: string },
  key: string,
  now: Date,
): Promise<{ readonly opinion: Opinion; readonly isNew: boolean }> {
  const once = keyOf(speaker, key);
  const known = await scope.rows.opinions.findOne({ key: once });
  if (known !== null) return { opinion: known, isNew: false };
  const { id: revisionId, letter, hash, partId } = revision;
  const opinion = await scope.rows.opinions.add({
    ...{ key: once, revisionId, letter, hash, verdict, note, at: now },
    ...bySpeaker(speaker),
  });
  await recordEvent(scope, { kind: 'part-changed', partId });
  return { opinion, isNew: true };
}
