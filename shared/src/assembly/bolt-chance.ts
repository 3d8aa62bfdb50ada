import type { Point } from '../geometry/point';
import type { CoatSpread } from '../spread/causes';
import { valueAt } from '../spread/formed-state';
import { seededNumbers } from '../spread/seeded-normal';
import { drawValues } from '../spread/spread';
import type { PatternModel } from './bolt-pattern';
import { findPlacement } from './find-placement';
import type { BoltFit } from './find-placement';

/** Share of parts whose bolts all enter, with what the number of parts leaves open. */
export interface Chance {
  readonly chance: number;
  /** Standard error of the chance. */
  readonly standardError: number;
  /** Parts that were closer than a tenth of a micrometre; counted as not entering. */
  readonly touching: number;
}

/** Chance that every bolt starts, bare and coated. */
export interface BoltChance {
  readonly bare: Chance;
  readonly coated: Chance;
}

/** How an opening is to be in place of how it is: a slot with end centres so far apart along a direction of the plane. */
export interface SlotInstead {
  readonly at: number;
  readonly lengthMm: number;
  readonly direction: Point;
}

/** Parts formed once, so that openings can be tried out on the same ones. Lengths mm. */
export interface FormedParts {
  readonly model: PatternModel;
  readonly count: number;
  /** Part by part, opening by opening. */
  readonly holeX: Float64Array;
  readonly holeY: Float64Array;
  readonly boltX: Float64Array;
  readonly boltY: Float64Array;
  /** Of each part, on each side. */
  readonly coatMm: Float64Array;
}

/**
 * Forms seeded parts and notes where their openings came to, and each part's bolts.
 * @param count parts, at least 1
 */
export function formParts(model: PatternModel, coat: CoatSpread, seed: number, count: number): FormedParts {
  const { openings, variables, atCoat, form, middleIn, placeDeviationMm } = model;
  const size = openings.length;
  const parts = {
    model,
    count,
    holeX: new Float64Array(count * size),
    holeY: new Float64Array(count * size),
    boltX: new Float64Array(count * size),
    boltY: new Float64Array(count * size),
    coatMm: new Float64Array(count),
  };
  const numbers = seededNumbers(seed);
  const values = new Float64Array(variables.length);
  for (let part = 0; part < count; part += 1) {
    drawValues(variables, numbers, values);
    const state = form(values);
    parts.coatMm[part] = Math.max(0, (coat.lowMm + coat.highMm) / 2 + valueAt(state, atCoat));
    openings.forEach(({ opening, bolt }, index) => {
      const at = middleIn(state, opening);
      const slot = part * size + index;
      parts.holeX[slot] = at.x;
      parts.holeY[slot] = at.y;
      parts.boltX[slot] = bolt.x + numbers.normal() * placeDeviationMm;
      parts.boltY[slot] = bolt.y + numbers.normal() * placeDeviationMm;
    });
  }
  return parts;
}

/** Room for one part's bolts, filled by `fillFit`. */
export function emptyFit(count: number): BoltFit {
  const room = (): Float64Array => new Float64Array(count);
  return {
    count,
    boltX: room(),
    boltY: room(),
    holeX: room(),
    holeY: room(),
    ux: room(),
    uy: room(),
    half: room(),
    play: room(),
  };
}

/** Puts one part into a fit. A coat takes its thickness off the play of every opening: both sides of the hole, half a diameter each. */
export function fillFit(
  fit: BoltFit,
  parts: FormedParts,
  part: number,
  isCoated: boolean,
  slot: SlotInstead | null,
): void {
  const { openings } = parts.model;
  const coatMm = isCoated ? (parts.coatMm[part] ?? 0) : 0;
  openings.forEach(({ widthMm, lengthMm, direction, boltMm }, index) => {
    const from = part * openings.length + index;
    fit.holeX[index] = parts.holeX[from] ?? 0;
    fit.holeY[index] = parts.holeY[from] ?? 0;
    fit.boltX[index] = parts.boltX[from] ?? 0;
    fit.boltY[index] = parts.boltY[from] ?? 0;
    const isInstead = slot !== null && slot.at === index;
    fit.ux[index] = isInstead ? slot.direction.x : direction.x;
    fit.uy[index] = isInstead ? slot.direction.y : direction.y;
    fit.half[index] = (isInstead ? slot.lengthMm : lengthMm) / 2;
    fit.play[index] = (widthMm - boltMm) / 2 - coatMm;
  });
}

/** Share of the formed parts whose bolts all enter. */
export function chanceOf(parts: FormedParts, isCoated: boolean): Chance {
  const fit = emptyFit(parts.model.openings.length);
  let [entering, touching] = [0, 0];
  for (let part = 0; part < parts.count; part += 1) {
    fillFit(fit, parts, part, isCoated, null);
    const { answer } = findPlacement(fit);
    if (answer === 'enters') entering += 1;
    if (answer === 'touching') touching += 1;
  }
  return chanceFrom(entering, parts.count, touching);
}

/** A share of so many parts with its standard error. */
export function chanceFrom(entering: number, count: number, touching: number): Chance {
  const chance = entering / count;
  return { chance, standardError: Math.sqrt((chance * (1 - chance)) / count), touching };
}

/**
 * Will every bolt start? The chance that all bolts of a pattern enter their openings, the part put where it fits best, before and
 * after coating.
 * @param count parts to form; with 2,000 the chance is good to about 1 % (standard error)
 */
export function boltChance(model: PatternModel, coat: CoatSpread, seed: number, count: number): BoltChance {
  const parts = formParts(model, coat, seed, count);
  return { bare: chanceOf(parts, false), coated: chanceOf(parts, true) };
}
