import type { Point } from '../geometry/point';
import { along, directionDeg, subtract, turn, unit } from '../geometry/vector';
import { chanceFrom, emptyFit, fillFit } from './bolt-chance';
import type { Chance, FormedParts, SlotInstead } from './bolt-chance';
import { inFlat, inPlane } from './bolt-pattern';
import { findPlacement } from './find-placement';
import type { BoltFit } from './find-placement';

/** A hole made a slot. Lengths mm. */
export interface ProposedSlot {
  readonly featureId: string;
  /** Distance of the end centres; the slot keeps the hole's width and middle. */
  readonly lengthMm: number;
  readonly widthMm: number;
  /** Direction in the layout, whole degrees from +x, 0 to 179. */
  readonly directionDeg: number;
  /** End centres in the layout: what a slot feature stores. */
  readonly from: Point;
  readonly to: Point;
  readonly chance: Chance;
}

/**
 * The slot; or that the holes do without; or the best that one slot of the largest length could do; or that there is no hole to
 * make a slot of, because all are slots or there is but one.
 */
export type SlotProposal =
  | { readonly kind: 'noHole'; readonly chance: Chance }
  | { readonly kind: 'notNeeded'; readonly chance: Chance }
  | { readonly kind: 'slot'; readonly slot: ProposedSlot }
  | { readonly kind: 'notEnough'; readonly best: ProposedSlot };

/** Lengths are proposed in steps of a tenth of a millimetre. */
const STEPS_PER_MM = 10;

/**
 * The shortest slot in one hole that raises the chance above a wanted level, on the coated parts: every hole is tried, along the line
 * that it strays most on against the others and along the line to their middle; lengths by halving, since a longer slot loses no
 * part that a shorter one takes. The wanted level is exceeded by two standard errors, so that other parts reach it too.
 * @param wanted above 0 and below 1
 * @param longestMm largest distance of the end centres; a hole's own diameter when null
 * @throws RangeError for a level outside 0 < wanted < 1
 */
export function proposeSlot(parts: FormedParts, wanted: number, longestMm: number | null = null): SlotProposal {
  if (!(wanted > 0 && wanted < 1))
    throw new RangeError(`Wanted is a chance above 0 and below 1, got ${String(wanted)}`);
  const { count } = parts;
  const enough = Math.min(count, Math.ceil((wanted + 2 * Math.sqrt((wanted * (1 - wanted)) / count)) * count));
  const size = parts.model.openings.length;
  const fit = emptyFit(size);
  const failing: number[] = [];
  let touching = 0;
  for (let part = 0; part < count; part += 1) {
    fillFit(fit, parts, part, true, null);
    const { answer } = findPlacement(fit);
    if (answer !== 'enters') failing.push(part);
    if (answer === 'touching') touching += 1;
  }
  const asDrilled = count - failing.length;
  if (asDrilled >= enough) return { kind: 'notNeeded', chance: chanceFrom(asDrilled, count, touching) };

  const tried = (slot: SlotInstead): Trial => {
    const { entering, close } = enteringOf(parts, failing, fit, slot);
    return { slot, chance: chanceFrom(asDrilled + entering, count, close), isEnough: asDrilled + entering >= enough };
  };
  let best: Trial | null = null;
  for (let at = 0; at < size; at += 1) {
    const opening = parts.model.openings[at];
    if (opening === undefined || opening.lengthMm > 0) continue;
    const most = Math.floor((longestMm ?? opening.widthMm) * STEPS_PER_MM);
    for (const direction of directionsFor(parts, at)) {
      // Once a slot is long enough, another one is only worth trying shorter.
      const limit: number = best?.isEnough === true ? stepsOf(best.slot) - 1 : most;
      if (limit < 1) continue;
      const found = shortestOn({ at, direction }, Math.min(limit, most), tried);
      if (best === null || found.isEnough || (!best.isEnough && found.chance.chance > best.chance.chance)) best = found;
    }
  }
  if (best === null) return { kind: 'noHole', chance: chanceFrom(asDrilled, count, touching) };
  const slot = proposal(parts, best.slot, best.chance);
  return best.isEnough ? { kind: 'slot', slot } : { kind: 'notEnough', best: slot };
}

interface Trial {
  readonly slot: SlotInstead;
  readonly chance: Chance;
  readonly isEnough: boolean;
}

function stepsOf({ lengthMm }: SlotInstead): number {
  return Math.round(lengthMm * STEPS_PER_MM);
}

/** Shortest slot along one line that is enough, or the longest there may be. */
function shortestOn(
  line: Pick<SlotInstead, 'at' | 'direction'>,
  most: number,
  tried: (slot: SlotInstead) => Trial,
): Trial {
  const trial = (steps: number): Trial => tried({ ...line, lengthMm: steps / STEPS_PER_MM });
  let found = trial(most);
  if (!found.isEnough) return found;
  let low = 0;
  while (stepsOf(found.slot) - low > 1) {
    const middle = Math.floor((low + stepsOf(found.slot)) / 2);
    const half = trial(middle);
    if (half.isEnough) found = half;
    else low = middle;
  }
  return found;
}

function enteringOf(
  parts: FormedParts,
  among: readonly number[],
  fit: BoltFit,
  slot: SlotInstead,
): { readonly entering: number; readonly close: number } {
  let [entering, close] = [0, 0];
  for (const part of among) {
    fillFit(fit, parts, part, true, slot);
    const { answer } = findPlacement(fit);
    if (answer === 'enters') entering += 1;
    if (answer === 'touching') close += 1;
  }
  return { entering, close };
}

/**
 * Lines worth a slot through one opening, as unit vectors in the plane: the one it strays most on against the others' middle, and
 * the one that leads there. In whole degrees of the layout: a slot of some millimetres isn't drawn finer.
 */
function directionsFor(parts: FormedParts, at: number): readonly Point[] {
  const size = parts.model.openings.length;
  const opening = parts.model.openings[at];
  if (size < 2 || opening === undefined) return [];
  let [xx, xy, yy] = [0, 0, 0];
  const bolts = parts.model.openings.map(({ bolt }) => bolt);
  const own = bolts[at] ?? { x: 0, y: 0 };
  const others = bolts.filter((_, index) => index !== at);
  const middle = {
    x: others.reduce((sum, { x }) => sum + x, 0) / others.length,
    y: others.reduce((sum, { y }) => sum + y, 0) / others.length,
  };
  for (let part = 0; part < parts.count; part += 1) {
    let [x, y] = [0, 0];
    for (let index = 0; index < size; index += 1) {
      const from = part * size + index;
      const weight = index === at ? 1 : -1 / others.length;
      x += weight * ((parts.holeX[from] ?? 0) - (parts.boltX[from] ?? 0));
      y += weight * ((parts.holeY[from] ?? 0) - (parts.boltY[from] ?? 0));
    }
    xx += x * x;
    xy += x * y;
    yy += y * y;
  }
  const turnRad = Math.atan2(2 * xy, xx - yy) / 2;
  const straying = { x: Math.cos(turnRad), y: Math.sin(turnRad) };
  const inwards = subtract(middle, own);
  const lines = Math.hypot(inwards.x, inwards.y) > 0 ? [straying, unit(inwards)] : [straying];
  return lines.map((line) => inPlane(opening, slotDirection(Math.round(directionDeg(inFlat(opening, line))))));
}

/** A slot has no front and back: its direction is told as 0 <= degrees < 180. */
function slotDirection(angleDeg: number): Point {
  return turn({ x: 1, y: 0 }, ((angleDeg % 180) + 180) % 180);
}

function proposal(parts: FormedParts, slot: SlotInstead, chance: Chance): ProposedSlot {
  const { development, openings } = parts.model;
  const opening = openings[slot.at];
  if (opening === undefined) throw new RangeError(`There is no opening ${String(slot.at)}`);
  const { featureId, middle, panelIndex } = opening.opening;
  const shift = development.panels[panelIndex]?.placement.shift ?? { x: 0, y: 0 };
  const angleDeg = Math.round(directionDeg(inFlat(opening, slot.direction)));
  const run = slotDirection(angleDeg);
  const centre = subtract(middle, shift);
  return {
    featureId,
    lengthMm: slot.lengthMm,
    widthMm: opening.widthMm,
    directionDeg: ((angleDeg % 180) + 180) % 180,
    from: along(centre, run, -slot.lengthMm / 2),
    to: along(centre, run, slot.lengthMm / 2),
    chance,
  };
}
