import { type Clearance, loopClearance } from '../geometry/clearance';
import { loopBounds, pointInLoop } from '../geometry/loop';
import type { Loop } from '../geometry/path';
import type { Bounds, Point } from '../geometry/point';
import { moveLoop, shiftBy } from '../geometry/transform';
import { segmentBounds } from '../geometry/segment';
import { boundsMeet, magnitude, scale, subtract } from '../geometry/vector';
import { formatDecimal } from '../units/length';
import { type CutOpening, type CutSheet, cutSheet, isInsideOf } from './cut-openings';
import type { Finding, Mend } from './finding';
import { LAND, LIMIT_SLACK_MM } from './limits';
import { tried } from './mend-that-holds';
import { type RuleContext, layoutShift, nameOf, placeOfFlat } from './rule-context';

/**
 * Metal left between an opening and the sheet's edge, and between two openings, as cut: 1 T, and 1 mm at least. Openings
 * that touch or overlap, or that lie off the sheet, are blockers; a thin land is a caution.
 */
export function checkLandTooThin(context: RuleContext): readonly Finding[] {
  const sheet = cutSheet(context);
  const requiredMm = Math.max(LAND.overT * context.sheet.thicknessMm, LAND.smallestMm);
  const boxes = sheet.openings.map(({ loop }) => loopBounds(loop));
  const edges = sheet.outer.map((segment) => ({ segment, bounds: segmentBounds(segment) }));
  const findings: Finding[] = [];
  sheet.openings.forEach((opening, index) => {
    const box = boxes[index];
    // Most openings are far from most edges; only the near ones are measured.
    const near = edges.filter(({ bounds }) => couldMeet(box, bounds, requiredMm)).map(({ segment }) => segment);
    findings.push(...checkToEdge(context, sheet, opening, near, requiredMm));
    for (let other = index + 1; other < sheet.openings.length; other += 1) {
      const second = sheet.openings[other];
      if (second === undefined || !couldMeet(boxes[index], boxes[other], requiredMm)) continue;
      findings.push(...checkBetween(context, sheet, opening, second, requiredMm));
    }
  });
  return findings;
}

function couldMeet(a: Bounds | null | undefined, b: Bounds | null | undefined, marginMm: number): boolean {
  return a != null && b != null && boundsMeet(a, b, marginMm);
}

/**
 * Shortest land between an opening and the sheet's edge; 0 when it reaches over the edge or lies off the sheet.
 * @param near the pieces of the edge to measure to; null when there are none and the opening is on the sheet
 */
function landToEdge(outer: Loop, near: Loop, loop: Loop): Clearance | null {
  const start = loop[0]?.from;
  if (start === undefined) return null;
  const clearance = loopClearance(loop, near);
  if (pointInLoop(start, outer, 0) !== 'outside') return clearance;
  return { from: start, to: start, ...clearance, distanceMm: 0 };
}

function checkToEdge(
  context: RuleContext,
  sheet: CutSheet,
  opening: CutOpening,
  near: Loop,
  requiredMm: number,
): readonly Finding[] {
  const land = landToEdge(sheet.outer, near, opening.loop);
  if (land === null || land.distanceMm >= requiredMm - LIMIT_SLACK_MM) return [];
  const foundMm = land.distanceMm;
  const isBlocker = foundMm <= LIMIT_SLACK_MM;
  const subject = named(context, opening);
  const id = `landTooThin-${opening.id}-edge`;
  return [
    {
      id,
      rule: 'landTooThin',
      severity: isBlocker ? 'blocker' : 'caution',
      title: isBlocker
        ? `${subject} runs over the edge of the sheet`
        : `The land between ${subject} and the edge is thin`,
      detail: isBlocker
        ? 'An opening that meets the edge is a notch; it has to be part of the outline.'
        : `${formatDecimal(foundMm, 2)} mm of metal are left. The cut heats that much through; ` +
          `leave ${formatDecimal(requiredMm, 2)}.`,
      foundMm,
      requiredMm,
      why: LAND.why,
      ids: [opening.id],
      at: placeOf(context, sheet, land.to),
      advice: 'Move the opening in, make it smaller, or give the sheet more edge.',
      mend: isBlocker ? null : tried(context, id, moveIn(context, sheet, opening, land, requiredMm)),
    },
  ];
}

/** Straight in from the edge by what is missing, offered only when that leaves enough land all round. */
function moveIn(
  context: RuleContext,
  sheet: CutSheet,
  opening: CutOpening,
  land: Clearance,
  requiredMm: number,
): Mend | null {
  if (opening.kind === 'cutout') return null;
  const inward = subtract(land.from, land.to);
  const missingMm = requiredMm - land.distanceMm;
  const by: Point = scale(inward, missingMm / magnitude(inward));
  const moved = moveLoop(shiftBy(by), opening.loop);
  const toEdge = landToEdge(sheet.outer, sheet.outer, moved);
  const isClear =
    toEdge !== null &&
    toEdge.distanceMm >= requiredMm - LIMIT_SLACK_MM &&
    sheet.openings.every(
      (other) =>
        other === opening || (loopClearance(moved, other.loop)?.distanceMm ?? Infinity) >= requiredMm - LIMIT_SLACK_MM,
    );
  if (!isClear) return null;
  const { development } = context;
  const layoutBy = development === null ? by : layoutShift(development, opening.centre, by);
  return {
    label: `Move it ${formatDecimal(missingMm, 2)} mm in`,
    commands: [{ kind: 'moveFeature', featureId: opening.id, by: layoutBy }],
  };
}

function checkBetween(
  context: RuleContext,
  sheet: CutSheet,
  first: CutOpening,
  second: CutOpening,
  requiredMm: number,
): readonly Finding[] {
  const land = loopClearance(first.loop, second.loop);
  if (land === null) return [];
  const foundMm = land.distanceMm;
  // An opening inside another has no land beside it; that it drops out is told by a rule of its own.
  if (foundMm > LIMIT_SLACK_MM && (isInsideOf(first, second) || isInsideOf(second, first))) return [];
  if (foundMm >= requiredMm - LIMIT_SLACK_MM) return [];
  const isBlocker = foundMm <= LIMIT_SLACK_MM;
  const names = `${named(context, first)} and ${lower(named(context, second))}`;
  return [
    {
      id: `landTooThin-${first.id}-${second.id}`,
      rule: 'landTooThin',
      severity: isBlocker ? 'blocker' : 'caution',
      title: isBlocker ? `${names} run into each other` : `The land between ${lower(names)} is thin`,
      detail: isBlocker
        ? 'Two openings that meet are one; draw them as one cut-out.'
        : `${formatDecimal(foundMm, 2)} mm of metal are left between them; leave ${formatDecimal(requiredMm, 2)}.`,
      foundMm,
      requiredMm,
      why: LAND.why,
      ids: [first.id, second.id],
      at: placeOf(context, sheet, { x: (land.from.x + land.to.x) / 2, y: (land.from.y + land.to.y) / 2 }),
      advice: 'Set them further apart, make one smaller, or join them.',
      // Which of two holes may move is for the person to say; either may be given by what bolts on.
      mend: null,
    },
  ];
}

function named(context: RuleContext, opening: CutOpening): string {
  const kind = { hole: 'Hole', slot: 'Slot', cutout: 'Cut-out' }[opening.kind];
  return `${kind} ${nameOf(context, opening.id)}`;
}

function lower(text: string): string {
  return text.charAt(0).toLowerCase() + text.slice(1);
}

function placeOf(context: RuleContext, sheet: CutSheet, point: Point): Finding['at'] {
  return sheet.frame === 'layout' || context.development === null
    ? { layout: point, flat: point }
    : placeOfFlat(context.development, point);
}
