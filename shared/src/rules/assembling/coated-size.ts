import type { Feature, HoleFeature, SlotFeature } from '../../bending/layout';
import type { PartCommand } from '../../part/commands';
import { distance } from '../../geometry/vector';
import { type Finish, coatedHoleMm } from '../../stock/finishes';
import { findHoleDiameterMm } from '../../stock/hole-diameter';
import { threadDiameterMm, threadPitchMm } from '../../stock/thread-size';
import type { Provenance } from '../../bending/development';
import { formatDecimal } from '../../units/length';
import type { Finding } from '../finding';
import { LIMIT_SLACK_MM } from '../limits';
import { mendThatHolds } from '../mend-that-holds';
import { type RuleContext, placeOfLayout } from '../rule-context';
import { boltThread, called, finishOf, flatPlaces, middleOf } from './assembled-part';
import { panelIndexAt, panelsInsideU } from './inside-u';
import { BOLT_PLAY, INSIDE_U, RIVET_NUT_HOLE, TAB_PLAY, THREAD_COAT } from './limits';

/** An opening that the coat makes too small. Sizes mm; `detail` says what they are. */
interface Shortfall {
  readonly title: string;
  readonly detail: string;
  readonly foundMm: number;
  readonly requiredMm: number;
  readonly why: Provenance;
  readonly advice: string;
  readonly mend: { readonly label: string; readonly commands: readonly PartCommand[] } | null;
}

/**
 * Openings once the thickest coat is on: bolts still drop through holes and slots, rivet nuts set afterwards still enter, tabs still go
 * into their slots; a plated thread still takes its bolt, the coat counting four times. Inside a U the coat counts double.
 */
export function checkCoatedSize(context: RuleContext): readonly Finding[] {
  const finish = finishOf(context);
  if (finish === null) return [];
  return context.document.layout.features.flatMap((feature) => {
    const times = coatTimes(context, feature);
    const shortfall =
      feature.kind === 'slot' ? slotShort(context, feature, finish, times) : holeShort(context, feature, finish, times);
    if (shortfall === null || shortfall.foundMm >= shortfall.requiredMm - LIMIT_SLACK_MM) return [];
    const id = `coatedTooSmall-${feature.id}`;
    const { mend, detail, ...said } = shortfall;
    return [
      {
        ...said,
        id,
        rule: 'coatedTooSmall',
        severity: 'caution',
        detail: detail + (times > 1 ? ' Inside a U the coat is counted double.' : ''),
        ids: [feature.id],
        at: placeOfLayout(context, middleOf(feature)),
        mend: mend === null ? null : mendThatHolds(context, id, mend.label, mend.commands),
      },
    ];
  });
}

/** How often the coat counts where an opening lies. */
function coatTimes({ development }: RuleContext, feature: Feature): number {
  if (development === null) return 1;
  const [at] = flatPlaces(development, feature);
  const panel = at === undefined ? null : panelIndexAt(development, at);
  return panel !== null && panelsInsideU(development).has(panel) ? INSIDE_U.timesThickness : 1;
}

function mm(valueMm: number): string {
  return formatDecimal(valueMm, 2);
}

/** What is left of a width under the thickest coat, which may count more than once. */
function coatedMm(widthMm: number, finish: Finish, times: number): number {
  return widthMm - times * (widthMm - coatedHoleMm(widthMm, finish));
}

function holeShort(context: RuleContext, hole: HoleFeature, finish: Finish, times: number): Shortfall | null {
  const { purpose } = hole;
  if (purpose.kind === 'tapped') return threadShort(context, hole, finish, times);
  const diameterMm = findHoleDiameterMm(purpose);
  if (diameterMm === null) return null;
  const foundMm = coatedMm(diameterMm, finish, times);
  if (purpose.kind === 'rivet-nut') {
    if (context.document.assembly?.hardwareSet !== 'after-coating') return null;
    return {
      title: `${called(context, hole)} grows shut for its rivet nut`,
      detail: `It is cut ${mm(diameterMm)} mm and is ${mm(foundMm)} under the thickest ${finish.name.toLowerCase()}.`,
      foundMm,
      requiredMm: diameterMm - RIVET_NUT_HOLE.narrowerMm,
      why: RIVET_NUT_HOLE.why,
      advice: 'Have the hole masked, or drill it out after coating.',
      mend: null,
    };
  }
  const thread = purpose.kind === 'clearance' || purpose.kind === 'countersunk' ? purpose.thread : null;
  const boltMm = thread === null ? null : threadDiameterMm(thread);
  if (thread === null || boltMm === null) return null;
  const requiredMm = boltMm + BOLT_PLAY.mm;
  return {
    title: `${called(context, hole)} is tight for ${thread} once coated`,
    detail: `It is cut ${mm(diameterMm)} mm and is ${mm(foundMm)} under the thickest ${finish.name.toLowerCase()}; the bolt wants ${mm(requiredMm)}.`,
    foundMm,
    requiredMm,
    why: BOLT_PLAY.why,
    advice: 'Take a coarser fit, have the hole masked, or drill it out after coating.',
    mend: coarserFit(hole, finish, times, requiredMm),
  };
}

const FITS = ['close', 'medium', 'coarse'] as const;

/** The next fit that leaves enough. */
function coarserFit(hole: HoleFeature, finish: Finish, times: number, requiredMm: number): Shortfall['mend'] {
  const { purpose } = hole;
  if (purpose.kind !== 'clearance') return null;
  const fit = FITS.slice(FITS.indexOf(purpose.fit) + 1).find((coarser) => {
    const diameterMm = findHoleDiameterMm({ ...purpose, fit: coarser });
    return diameterMm !== null && coatedMm(diameterMm, finish, times) >= requiredMm - LIMIT_SLACK_MM;
  });
  if (fit === undefined) return null;
  return {
    label: `Take the ${fit} fit`,
    commands: [{ kind: 'setHolePurpose', featureId: hole.id, purpose: { ...purpose, fit } }],
  };
}

/** Powder is masked off threads; what plates them is thin, but counts four times. Threads tapped afterwards stay bare. */
function threadShort(context: RuleContext, hole: HoleFeature, finish: Finish, times: number): Shortfall | null {
  const { assembly } = context.document;
  const thread = hole.purpose.kind === 'tapped' ? hole.purpose.thread : null;
  const pitchMm = thread === null ? null : threadPitchMm(thread);
  if (assembly?.hardwareSet !== 'before-coating' || finish.process === 'powder') return null;
  if (thread === null || pitchMm === null) return null;
  const roomMm = THREAD_COAT.baseMm + THREAD_COAT.perPitch * pitchMm;
  const takenMm = THREAD_COAT.timesThickness * times * finish.buildUpPerSideMm.high;
  const um = (valueMm: number) => formatDecimal(valueMm * 1000, 0);
  return {
    title: `Thread ${called(context, hole).replace('Hole ', '')} may be tight once finished`,
    detail: `${finish.name} takes up to ${um(takenMm)} µm off the pitch diameter; ${thread} and its bolt leave ${um(roomMm)} µm.`,
    foundMm: roomMm - takenMm,
    requiredMm: 0,
    why: THREAD_COAT.why,
    advice: 'Tap after finishing, have the thread masked, or tap it oversize.',
    mend: {
      label: 'Tap after finishing',
      commands: [{ kind: 'setAssembly', assembly: { ...assembly, hardwareSet: 'after-coating' } }],
    },
  };
}

function slotShort(context: RuleContext, slot: SlotFeature, finish: Finish, times: number): Shortfall | null {
  const foundMm = coatedMm(slot.widthMm, finish, times);
  const isForBolt = context.document.assembly?.bolts?.featureIds.includes(slot.id) === true;
  const { thicknessMm } = context.sheet;
  const overSheetMm = slot.widthMm - thicknessMm;
  const isForTab = !isForBolt && overSheetMm >= 0 && overSheetMm <= TAB_PLAY.slotUpToMm;
  const thread = isForTab ? null : boltThread(slot);
  const boltMm = thread === null ? null : threadDiameterMm(thread);
  const tabMm = 2 * thicknessMm - coatedHoleMm(thicknessMm, finish);
  const throughMm = isForTab ? tabMm + TAB_PLAY.mm : boltMm === null ? null : boltMm + BOLT_PLAY.mm;
  if (throughMm === null) return null;
  const what = isForTab ? 'a coated tab' : (thread ?? 'its bolt');
  const widthMm = Math.ceil((throughMm + slot.widthMm - foundMm) * 10 - LIMIT_SLACK_MM) / 10;
  const lengthMm = distance(slot.from, slot.to) + widthMm;
  return {
    title: `${called(context, slot)} is tight for ${what} once coated`,
    detail: `It is cut ${mm(slot.widthMm)} mm wide and is ${mm(foundMm)} under the thickest ${finish.name.toLowerCase()}; ${what} wants ${mm(throughMm)}.`,
    foundMm,
    requiredMm: throughMm,
    why: isForTab ? TAB_PLAY.why : BOLT_PLAY.why,
    advice: 'Widen it, have it masked, or file it after coating.',
    mend: {
      label: `Widen it to ${formatDecimal(widthMm, 1)} mm`,
      commands: [{ kind: 'setSlotSize', featureId: slot.id, lengthMm, widthMm }],
    },
  };
}
