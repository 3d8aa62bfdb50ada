import type { PartDetail, PartSummary } from '@foldwright/shared/contracts/parts';
import type { Draft } from '../models/draft';
import type { Job } from '../models/job';
import type { Part } from '../models/part';
import type { Photo } from '../models/photo';
import type { NameOf } from '../services/names-of-people';
import { readStoredDocument } from '../services/stored-document';
import { presentDraftSummary, readStep } from './drafts';
import { presentPhoto } from './photos';
import type { RevisionHead } from './revisions';
import { presentRevisionSummary } from './revisions';

/** A part with what its place in the list is made from. */
export interface PartInList {
  readonly part: Part;
  readonly draft: Draft | null;
  readonly latest: { readonly head: RevisionHead; readonly document: unknown } | null;
  readonly photo: { readonly photo: Photo; readonly job: Job | null } | null;
}

/** What the part is made of today: card before its outline, blued while it is laid out, steel for the trial, then alloy. */
function materialOf({ draft, latest }: PartInList): PartSummary['state'] {
  if (draft === null) return latest === null ? 'card' : 'alloy';
  if (!draft.hasOutline) return 'card';
  const step = readStep(draft.furthestStep);
  return step === 'full-size-print' || step === 'release' ? 'trial-steel' : 'blued';
}

/** What waits for a person before the part can go on. */
function questionOf({ draft, photo }: PartInList): string | null {
  if (draft === null || draft.hasOutline) return null;
  if (photo === null) return 'No photo of the mock-up yet';
  if (photo.job?.state === 'failed' || photo.job?.state === 'stopped') return 'The photo could not be read';
  return photo.photo.trace === null ? null : 'The trace waits to be accepted';
}

function documentOf({ draft, latest }: PartInList): PartSummary['document'] {
  if (draft?.hasOutline) return readStoredDocument(draft.document);
  return latest === null ? null : readStoredDocument(latest.document);
}

export function presentPartSummary(row: PartInList, nameOf: NameOf): PartSummary {
  const { part, draft, latest } = row;
  return {
    id: part.id,
    number: part.number,
    name: part.name,
    revision: part.revision,
    draft: draft === null ? null : presentDraftSummary(draft, nameOf),
    latestRevision: latest === null ? null : presentRevisionSummary(latest.head, nameOf),
    document: documentOf(row),
    state: materialOf(row),
    openQuestion: questionOf(row),
    updatedAt: part.updatedAt.toISOString(),
  };
}

export interface PartWithAll {
  readonly part: Part;
  readonly draft: Draft | null;
  /** Newest first. */
  readonly revisions: readonly RevisionHead[];
  /** Newest first. */
  readonly photos: readonly { readonly photo: Photo; readonly job: Job | null }[];
  readonly otherHandPartId: string | null;
}

export function presentPart(row: PartWithAll, canEdit: boolean, nameOf: NameOf): PartDetail {
  const { part, draft } = row;
  return {
    id: part.id,
    number: part.number,
    name: part.name,
    revision: part.revision,
    draft: draft === null ? null : presentDraftSummary(draft, nameOf),
    revisions: row.revisions.map((revision) => presentRevisionSummary(revision, nameOf)),
    photos: row.photos.map(({ photo, job }) => presentPhoto(photo, job, nameOf)),
    hand: part.hand,
    otherHandPartId: row.otherHandPartId,
    canEdit,
  };
}
