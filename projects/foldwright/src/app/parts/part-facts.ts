import { type PART_STEPS, type PartSummary } from '@foldwright/shared/contracts/parts';
import type { SheetStock } from '@foldwright/shared/part/part-document';
import type { Severity } from '@foldwright/shared/rules/finding';
import { findMaterial } from '@foldwright/shared/stock/materials';
import { dayWords } from '@foldwright/ui/date-text/date-words';
import type { PictogramName } from '@foldwright/ui/pictogram/pictogram-paths';

/** Ways to sift the list. A part may fall under several. */
export const PART_FILTERS = ['all', 'mock-up', 'in-draft', 'released'] as const;
export type PartFilter = (typeof PART_FILTERS)[number];

const FILTER_WORDS: Readonly<Record<PartFilter, string>> = {
  all: 'All',
  'mock-up': 'Mock-up',
  'in-draft': 'In draft',
  released: 'Released',
};

const STEP_WORDS: Readonly<Record<(typeof PART_STEPS)[number], string>> = {
  'mock-up': 'Mock-up',
  outline: 'Outline',
  bends: 'Bends',
  checks: 'Checks',
  'full-size-print': 'Full-size print',
  release: 'Release',
};

/** One line of a part's card. */
export interface PartLine {
  readonly icon: PictogramName;
  readonly strong: string;
  readonly soft: string;
}

/** What a card says of a part, in a fixed order: revision and step, what the checks found, the release before, the sheets. */
export interface PartFacts {
  readonly revision: PartLine;
  readonly finding: { readonly severity: Severity; readonly text: string } | null;
  readonly before: PartLine;
  readonly sheets: string | null;
}

export function filterWords(filter: PartFilter): string {
  return FILTER_WORDS[filter];
}

/** Whether a part is still card: a mock-up that no outline was accepted from. */
export function isMockUp(part: PartSummary): boolean {
  return part.state === 'card';
}

export function fallsUnder(part: PartSummary, filter: PartFilter): boolean {
  switch (filter) {
    case 'all':
      return true;
    case 'mock-up':
      return isMockUp(part);
    case 'in-draft':
      return part.draft !== null && !isMockUp(part);
    case 'released':
      return part.latestRevision !== null;
  }
}

/** Whether name or number holds what was typed, letter case aside. */
export function matchesSearch(part: PartSummary, typed: string): boolean {
  const wanted = typed.trim().toLocaleLowerCase();
  return wanted === '' || `${part.number} ${part.name}`.toLocaleLowerCase().includes(wanted);
}

/** What the card of a part says. `now` decides whether a year is named. */
export function factsOf(part: PartSummary, now: Date): PartFacts {
  return {
    revision: revisionLine(part, now),
    finding: findingOf(part),
    before: beforeLine(part, now),
    sheets: part.document === null || isMockUp(part) ? null : sheetsOf(part.document.stocks),
  };
}

/** Where a part's card leads: to the step its draft is at, or to its release. */
export function partLink(part: PartSummary): readonly string[] {
  return ['/parts', part.id, part.draft?.furthestStep ?? 'release'];
}

function revisionLine(part: PartSummary, now: Date): PartLine {
  if (isMockUp(part)) return { icon: 'mock-up', strong: 'Mock-up', soft: `since ${dayWords(part.updatedAt, now)}` };
  if (part.draft !== null) {
    return {
      icon: 'scribe',
      strong: `${part.draft.letter} in draft`,
      soft: `at ${STEP_WORDS[part.draft.furthestStep]}`,
    };
  }
  if (part.latestRevision !== null) {
    const { letter, releasedAt } = part.latestRevision;
    return { icon: 'punched', strong: `${letter} released`, soft: dayWords(releasedAt, now) };
  }
  return { icon: 'to-come', strong: 'Nothing drawn yet', soft: '' };
}

function beforeLine(part: PartSummary, now: Date): PartLine {
  const { draft, latestRevision } = part;
  if (latestRevision === null) return { icon: 'to-come', strong: '', soft: 'Not released yet' };
  if (draft === null) return { icon: 'person', strong: '', soft: `by ${latestRevision.releasedBy}` };
  return {
    icon: 'punched',
    strong: `${latestRevision.letter} released`,
    soft: dayWords(latestRevision.releasedAt, now),
  };
}

function findingOf(part: PartSummary): PartFacts['finding'] {
  if (part.openQuestion !== null) return { severity: 'hint', text: '1 question open' };
  const { draft } = part;
  if (draft === null) return null;
  if (draft.blockers > 0) return { severity: 'blocker', text: `${draft.blockers} can’t be made` };
  if (draft.cautions > 0) return { severity: 'caution', text: `${draft.cautions} to check` };
  return null;
}

function sheetsOf(stocks: { readonly trial: SheetStock; readonly production: SheetStock }): string {
  return `${sheetWords(stocks.trial)}, then ${sheetWords(stocks.production)}`;
}

/** "Mild steel 1.5". */
function sheetWords(stock: SheetStock): string {
  const name = findMaterial(stock.materialId)?.shortName ?? stock.materialId;
  return `${name} ${stock.thicknessMm.toFixed(Number.isInteger(stock.thicknessMm * 10) ? 1 : 2)}`;
}
