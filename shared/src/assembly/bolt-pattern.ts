import type { Development } from '../bending/development';
import type { Point } from '../geometry/point';
import { distance, dot, subtract, unit } from '../geometry/vector';
import { dot3 } from '../geometry/vector3';
import type { SpreadPlan } from '../spread/causes';
import { formerOf } from '../spread/formed-state';
import type { FormedState, Former } from '../spread/formed-state';
import { openingIn, openingsOnPanels } from '../spread/measures';
import type { PlacedOpening } from '../spread/measures';
import { keyOf, readVariables } from '../spread/variables';
import type { Variable } from '../spread/variables';

/** A bolt and the hole or slot of the part it goes through. */
export interface PatternBolt {
  readonly featureId: string;
  /** Largest diameter of the bolt's shank or thread, mm. */
  readonly boltMm: number;
  /** Middle of the bolt, mm, seen with face A of the first bolt's panel towards the viewer; null = where the part's hole is planned. */
  readonly at: Point | null;
}

/** Bolts that must all enter, at least one; `placeHalfWidthMm` is how far each may sit off its place, two standard deviations. */
export interface BoltPattern {
  readonly bolts: readonly PatternBolt[];
  readonly placeHalfWidthMm: number;
}

/** One opening of a pattern, in the plane of the pattern. */
export interface PatternOpening {
  readonly opening: PlacedOpening;
  readonly widthMm: number;
  /** Distance of a slot's end centres, mm; 0 for a hole. */
  readonly lengthMm: number;
  /** Direction of the slot in the plane of the pattern. */
  readonly direction: Point;
  readonly boltMm: number;
  readonly bolt: Point;
  /** Axes of the opening's panel in the plane of the pattern: flat pattern's x and y. */
  readonly flatX: Point;
  readonly flatY: Point;
}

/** A part over its bolts, ready to be formed many times. */
export interface PatternModel {
  readonly development: Development;
  readonly variables: readonly Variable[];
  /** Place of the coat among the variables. */
  readonly atCoat: number;
  readonly form: Former;
  readonly openings: readonly PatternOpening[];
  readonly placeDeviationMm: number;
  /** Where an opening's middle comes to in a formed part, in the plane of the pattern. */
  readonly middleIn: (state: FormedState, opening: PlacedOpening) => Point;
}

/** Why a part can't be held against a pattern; `ids` are the holes at fault. */
export class PatternError extends RangeError {
  constructor(
    message: string,
    readonly ids: readonly string[],
  ) {
    super(message);
  }
}

/** Faces whose directions differ by more can't take bolts of one pattern: cosine of 1 degree. */
const ONE_PLANE_COSINE = 0.99985;

/**
 * Holds a part against its bolts: the plane of the pattern is that of the first bolt's panel, the part's openings are seen along the
 * bolts. Openings may lie on several panels as long as these face the same way or opposite ways. A hole that leans by its panel's
 * angle error counts as upright: at 1 degree the bolt loses T / 60 of its play.
 * @throws PatternError for a bolt without an opening on a panel, or on a panel that faces another way
 * @throws GaugingError as `readVariables`
 */
export function patternModel(development: Development, plan: SpreadPlan, pattern: BoltPattern): PatternModel {
  const model = readVariables(development, plan);
  const form = formerOf(development, model);
  const nominal = form(new Float64Array(model.variables.length));
  const placed = openingsOnPanels(development, model);
  const findOpening = (featureId: string): PlacedOpening => {
    const opening = placed.find((one) => one.featureId === featureId);
    if (opening !== undefined) return opening;
    throw new PatternError(`No hole or slot ${featureId} lies on a panel of the part.`, [featureId]);
  };
  const [first] = pattern.bolts;
  if (first === undefined) throw new PatternError('A pattern without bolts has no plane.', []);
  const plane = nominal.poses[findOpening(first.featureId).panelIndex];
  if (plane === undefined) throw new PatternError('The part has no such panel.', [first.featureId]);
  const middleIn = (state: FormedState, opening: PlacedOpening): Point => {
    const at = openingIn(state, opening);
    return at === null ? { x: NaN, y: NaN } : { x: dot3(at, plane.ux), y: dot3(at, plane.uy) };
  };
  const openings = pattern.bolts.map((bolt): PatternOpening => {
    const opening = findOpening(bolt.featureId);
    const pose = nominal.poses[opening.panelIndex];
    if (pose === undefined || Math.abs(dot3(pose.uz, plane.uz)) < ONE_PLANE_COSINE) {
      const message = `${bolt.featureId} lies on a panel that faces another way than that of ${first.featureId}.`;
      throw new PatternError(message, [first.featureId, bolt.featureId]);
    }
    const flatX = { x: dot3(pose.ux, plane.ux), y: dot3(pose.ux, plane.uy) };
    const flatY = { x: dot3(pose.uy, plane.ux), y: dot3(pose.uy, plane.uy) };
    const slot = development.flat.slots.find(({ featureId }) => featureId === bolt.featureId);
    const hole = development.flat.holes.find(({ featureId }) => featureId === bolt.featureId);
    const run = slot === undefined ? { x: 0, y: 0 } : subtract(slot.to, slot.from);
    const lengthMm = slot === undefined ? 0 : distance(slot.from, slot.to);
    return {
      opening,
      widthMm: slot?.widthMm ?? hole?.diameterMm ?? 0,
      lengthMm,
      direction: lengthMm > 0 ? unit(inPlane({ flatX, flatY }, run)) : { x: 1, y: 0 },
      boltMm: bolt.boltMm,
      bolt: bolt.at ?? middleIn(nominal, opening),
      flatX,
      flatY,
    };
  });
  return {
    development,
    variables: model.variables,
    atCoat: model.indexOf(keyOf.coat),
    form,
    openings,
    placeDeviationMm: pattern.placeHalfWidthMm / 2,
    middleIn,
  };
}

/** A direction in the plane of the pattern as it runs in the flat pattern of the opening's panel. */
export function inFlat({ flatX, flatY }: PatternOpening, direction: Point): Point {
  return { x: dot(direction, flatX), y: dot(direction, flatY) };
}

/** A direction of the flat pattern as it runs in the plane of the pattern. */
export function inPlane({ flatX, flatY }: Pick<PatternOpening, 'flatX' | 'flatY'>, direction: Point): Point {
  return { x: flatX.x * direction.x + flatY.x * direction.y, y: flatX.y * direction.x + flatY.y * direction.y };
}
