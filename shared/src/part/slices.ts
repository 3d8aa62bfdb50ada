import type { Layout } from '../bending/layout';
import { isSameJson } from './canonical-json';
import { CommandRefusal } from './command-refusal';
import type { DocumentSlice, PartCommand, SliceChange } from './commands';
import type { PartDocument } from './part-document';
import { withAssembly, withMarks } from './with-optional';

/**
 * What differs between two documents, slice by slice: each change carries the slice before and after. Holes, slots,
 * cut-outs and bends are compared by id; a thing that is new in `after` brings its place in the list.
 * @returns changes that, applied in order to `before` by a revert, give `after`; empty when they are equal.
 */
export function diffDocuments(before: PartDocument, after: PartDocument): readonly SliceChange[] {
  const changes: SliceChange[] = [];
  const compare = (slice: (document: PartDocument) => DocumentSlice) => {
    const change = { before: slice(before), after: slice(after) };
    if (!isSameJson(change.before, change.after)) changes.push(change);
  };
  for (const role of ['trial', 'production'] as const) {
    compare((document) => ({ slice: 'stock', role, value: document.stocks[role] }));
  }
  compare((document) => ({ slice: 'template', value: document.template }));
  compare((document) => ({ slice: 'calibration', value: document.calibration }));
  compare((document) => ({ slice: 'outer', value: document.layout.outer }));
  changes.push(
    ...diffList(before.layout.cutouts, after.layout.cutouts, (id, value, place) => ({
      slice: 'cutout',
      id,
      value,
      ...place,
    })),
  );
  changes.push(
    ...diffList(before.layout.features, after.layout.features, (id, value, place) => ({
      slice: 'feature',
      id,
      value,
      ...place,
    })),
  );
  changes.push(
    ...diffList(before.layout.bends, after.layout.bends, (id, value, place) => ({
      slice: 'bend',
      id,
      value,
      ...place,
    })),
  );
  compare((document) => ({ slice: 'reliefs', value: document.layout.reliefs }));
  compare((document) => ({ slice: 'baseAnchor', value: document.layout.baseAnchor }));
  compare((document) => ({ slice: 'making', value: document.making }));
  compare((document) => ({ slice: 'declaredUses', value: document.declaredUses }));
  compare((document) => ({ slice: 'assembly', value: document.assembly ?? null }));
  compare((document) => ({ slice: 'marks', value: document.marks ?? [] }));
  return changes;
}

interface Identified {
  readonly id: string;
}

type Place = { readonly index: number } | Record<string, never>;
const ANYWHERE: Place = {};

/**
 * Removals first, then additions in rising order of place, so that each place holds when it is used. A thing that changed
 * its place among the others is taken out and put in again.
 */
function diffList<Item extends Identified>(
  before: readonly Item[],
  after: readonly Item[],
  slice: (id: string, value: Item | null, place: Place) => DocumentSlice,
): readonly SliceChange[] {
  const steady = steadyIds(before, after);
  const inAfter = new Map(after.map((item) => [item.id, item]));
  const removed: SliceChange[] = [];
  const changed: SliceChange[] = [];
  const added: SliceChange[] = [];
  before.forEach((item, index) => {
    const { id } = item;
    const other = steady.has(id) ? inAfter.get(id) : undefined;
    if (other === undefined) {
      removed.push({ before: slice(id, item, { index }), after: slice(id, null, ANYWHERE) });
    } else if (!isSameJson(item, other)) {
      changed.push({ before: slice(id, item, ANYWHERE), after: slice(id, other, ANYWHERE) });
    }
  });
  after.forEach((item, index) => {
    const { id } = item;
    if (!steady.has(id)) added.push({ before: slice(id, null, ANYWHERE), after: slice(id, item, { index }) });
  });
  return [...removed, ...changed, ...added];
}

/** Ids that both lists have in the same order among themselves: the longest such run. */
function steadyIds(before: readonly Identified[], after: readonly Identified[]): ReadonlySet<string> {
  const placeAfter = new Map(after.map(({ id }, index) => [id, index]));
  const common = before.flatMap(({ id }) => {
    const place = placeAfter.get(id);
    return place === undefined ? [] : [{ id, place }];
  });
  const runs: { readonly length: number; readonly from: number }[] = [];
  let best = -1;
  common.forEach(({ place }, index) => {
    let run = { length: 1, from: -1 };
    for (let earlier = 0; earlier < index; earlier += 1) {
      const candidate = runs[earlier];
      if (candidate === undefined || (common[earlier]?.place ?? place) >= place) continue;
      if (candidate.length + 1 > run.length) run = { length: candidate.length + 1, from: earlier };
    }
    runs.push(run);
    if (run.length > (runs[best]?.length ?? 0)) best = index;
  });
  const steady = new Set<string>();
  for (let index = best; index >= 0; index = runs[index]?.from ?? -1) steady.add(common[index]?.id ?? '');
  return steady;
}

/**
 * The command that leads from `after` back to `before`, to be applied to whatever the document is by then.
 * @param label what is undone, as `describeCommand` says it
 * @returns a revert of the slices that differ, or null when nothing does
 */
export function undoCommand(before: PartDocument, after: PartDocument, label: string): PartCommand | null {
  return revertCommand(after, before, label, 'undo');
}

/** The command that does again what an undo took back: from `before` to `after` once more. */
export function redoCommand(before: PartDocument, after: PartDocument, label: string): PartCommand | null {
  return revertCommand(before, after, label, 'redo');
}

function revertCommand(
  from: PartDocument,
  to: PartDocument,
  label: string,
  reason: 'undo' | 'redo',
): PartCommand | null {
  const changes = diffDocuments(from, to);
  return changes.length === 0 ? null : { kind: 'revert', reason, of: label, changes };
}

/**
 * Puts slices back, each only if it still is what the command thinks it is.
 * @throws CommandRefusal `changedSince` naming what somebody else changed in between
 */
export function applyRevert(document: PartDocument, changes: readonly SliceChange[]): PartDocument {
  return changes.reduce((current, { before, after }) => {
    assertSameSlice(before, after);
    if (!isSameJson(readSlice(current, before), before.value)) {
      throw new CommandRefusal(
        'changedSince',
        `${SLICE_WORDS[before.slice]} changed in the meantime; that edit stands.`,
        'id' in before ? [before.id] : [],
      );
    }
    return writeSlice(current, after);
  }, document);
}

const SLICE_WORDS: Readonly<Record<DocumentSlice['slice'], string>> = {
  stock: 'The sheet',
  template: 'The template’s answers',
  calibration: 'The calibration',
  outer: 'The outline',
  cutout: 'The cut-out',
  feature: 'The hole or slot',
  bend: 'The bend',
  reliefs: 'The reliefs',
  baseAnchor: 'The base panel',
  making: 'The way of making',
  declaredUses: 'The declared uses',
  assembly: 'What it is put on',
  marks: 'The etched text',
};

function assertSameSlice(before: DocumentSlice, after: DocumentSlice): void {
  const key = (slice: DocumentSlice) =>
    `${slice.slice} ${'id' in slice ? slice.id : slice.slice === 'stock' ? slice.role : ''}`;
  if (key(before) !== key(after)) {
    throw new CommandRefusal('unknownEntity', 'An undo has to put back the thing it took.', []);
  }
}

function readSlice(document: PartDocument, slice: DocumentSlice): unknown {
  switch (slice.slice) {
    case 'stock':
      return document.stocks[slice.role];
    case 'template':
    case 'calibration':
    case 'making':
    case 'declaredUses':
      return document[slice.slice];
    case 'assembly':
      return document.assembly ?? null;
    case 'marks':
      return document.marks ?? [];
    case 'outer':
    case 'reliefs':
    case 'baseAnchor':
      return document.layout[slice.slice];
    case 'cutout':
      return document.layout.cutouts.find((loop) => loop.id === slice.id) ?? null;
    case 'feature':
      return document.layout.features.find((feature) => feature.id === slice.id) ?? null;
    case 'bend':
      return document.layout.bends.find((bend) => bend.id === slice.id) ?? null;
  }
}

function writeSlice(document: PartDocument, slice: DocumentSlice): PartDocument {
  const layout = (part: Partial<Layout>): PartDocument => ({ ...document, layout: { ...document.layout, ...part } });
  switch (slice.slice) {
    case 'stock':
      return { ...document, stocks: { ...document.stocks, [slice.role]: slice.value } };
    case 'template':
      return { ...document, template: slice.value };
    case 'calibration':
      return { ...document, calibration: slice.value };
    case 'making':
      return { ...document, making: slice.value };
    case 'declaredUses':
      return { ...document, declaredUses: slice.value };
    case 'assembly':
      return withAssembly(document, slice.value);
    case 'marks':
      return withMarks(document, slice.value);
    case 'outer':
      return layout({ outer: slice.value });
    case 'reliefs':
      return layout({ reliefs: slice.value });
    case 'baseAnchor':
      return layout({ baseAnchor: slice.value });
    case 'cutout':
      return layout({ cutouts: placed(document.layout.cutouts, slice) });
    case 'feature':
      return layout({ features: placed(document.layout.features, slice) });
    case 'bend':
      return layout({ bends: placed(document.layout.bends, slice) });
  }
}

function placed<Item extends Identified>(
  items: readonly Item[],
  slice: { readonly id: string; readonly value: Item | null; readonly index?: number },
): readonly Item[] {
  const { id, value } = slice;
  if (value !== null && value.id !== id) {
    throw new CommandRefusal('duplicateId', 'A thing is put back under its own id.', [id, value.id]);
  }
  const at = items.findIndex((item) => item.id === id);
  if (value === null) return items.filter((item) => item.id !== id);
  if (at >= 0) return items.with(at, value);
  const index = Math.min(Math.max(0, slice.index ?? items.length), items.length);
  return items.toSpliced(index, 0, value);
}
