import { halfTangent } from '../bending/allowance';
import type { BendZone, Development } from '../bending/development';
import { panelPoses } from '../bending/fold';
import type { Pose } from '../bending/fold';
import { outsideReference } from '../bending/leg-gains';
import { keyOf } from './variables';
import type { VariableModel } from './variables';

/** A part as it came out once: how far everything lies off nominal. Lengths mm. */
export interface FormedState {
  readonly thicknessMm: number;
  /** Pose of each panel; the base panel's blank stays where it is. */
  readonly poses: readonly Pose[];
  /** By place in the model's bends: how far the middle of the zone moved across the bend, positive towards the child. */
  readonly shiftMm: Float64Array;
  /** By place in the model's bends: how much longer a leg is than planned for its blank, to the outside of the bend. */
  readonly legGainMm: Float64Array;
  /** What the variables are at, in the order of the model: mm, degrees or shares. */
  readonly values: Float64Array;
}

/** Makes formed states of one part from values of its variables, in the order of the model. */
export type Former = (values: Float64Array) => FormedState;

/** What callipers find outside a bend, from the tangent line, for angles a little off nominal too. */
function reachMm(isToApex: boolean, angleDeg: number, outsideRadiusMm: number): number {
  return isToApex ? outsideRadiusMm * halfTangent(angleDeg) : outsideRadiusMm;
}

/** What a state has at a place of the model; 0 for a variable that the part doesn't have. */
export function valueAt(state: FormedState, index: number): number {
  return state.values[index] ?? 0;
}

/**
 * A part formed with everything a little off: the blank as cut, each bend where its gauge puts it, its middle on the punch, with
 * the allowance that the actual angle, radius, K and thickness use up, half from each side.
 */
export function formerOf(development: Development, model: VariableModel): Former {
  const nominalT = development.stock.thicknessMm;
  const { indexOf, bendIndexOf } = model;
  const [atT, atRadius, atK] = [indexOf(keyOf.thickness), indexOf(keyOf.radius), indexOf(keyOf.neutral)];
  // Keys are looked up once: parts are formed by the hundred thousand.
  const bends = model.bends.map(({ bendId, zone, gauge }) => {
    // The reference is the nominal bend's: a square bend that opens a little is still measured to its apex.
    const isToApex = outsideReference(zone.bendAngleDeg) === 'outsideApex';
    return {
      zone,
      isToApex,
      plannedReachMm: reachMm(isToApex, zone.bendAngleDeg, zone.insideRadiusMm + nominalT),
      atAngle: indexOf(keyOf.angle(bendId)),
      atGauging: indexOf(keyOf.gauging(bendId)),
      gauge,
      atEdge: gauge.from === 'edge' ? indexOf(gauge.key) : -1,
    };
  });
  const zones = development.zones.map((zone) => ({ zone, bend: bendIndexOf(zone.bendId) }));
  return (given) => {
    // A state outlives its values: callers fill one array over and over.
    const values = given.slice();
    const at = (index: number): number => values[index] ?? 0;
    const thicknessMm = nominalT * (1 + at(atT));
    const shiftMm = new Float64Array(bends.length);
    const legGainMm = new Float64Array(bends.length);
    const formed = bends.map(({ zone, isToApex, plannedReachMm, atAngle, atGauging, gauge, atEdge }, index) => {
      const bendAngleDeg = zone.bendAngleDeg + at(atAngle);
      const insideRadiusMm = zone.insideRadiusMm * (1 + at(atRadius));
      const kFactor = zone.kFactor + at(atK) * zone.kHalfWidth;
      const bendAllowanceMm = ((bendAngleDeg * Math.PI) / 180) * (insideRadiusMm + kFactor * thicknessMm);
      const reachGainMm = reachMm(isToApex, bendAngleDeg, insideRadiusMm + thicknessMm) - plannedReachMm;
      legGainMm[index] = reachGainMm - (bendAllowanceMm - zone.bendAllowanceMm) / 2;
      // A bend gauged against another lies on the outside of that one, wherever it came to.
      const stopMm =
        gauge.from === 'edge'
          ? at(atEdge)
          : gauge.outwards * (shiftMm[gauge.bendIndex] ?? 0) + (legGainMm[gauge.bendIndex] ?? 0);
      shiftMm[index] = at(atGauging) + gauge.side * stopMm;
      return { bendAngleDeg, insideRadiusMm, kFactor, bendAllowanceMm };
    });
    const moved = zones.map(({ zone, bend }): BendZone => {
      const now = formed[bend];
      if (now === undefined) return zone;
      const movedMm = (zone.bendAllowanceMm - now.bendAllowanceMm) / 2 + (shiftMm[bend] ?? 0);
      const { origin, towardsChild } = zone;
      return {
        bendId: zone.bendId,
        parentIndex: zone.parentIndex,
        childIndex: zone.childIndex,
        origin: { x: origin.x + towardsChild.x * movedMm, y: origin.y + towardsChild.y * movedMm },
        along: zone.along,
        towardsChild,
        bendAllowanceMm: now.bendAllowanceMm,
        bendAngleDeg: now.bendAngleDeg,
        direction: zone.direction,
        insideRadiusMm: now.insideRadiusMm,
        kFactor: now.kFactor,
        kHalfWidth: zone.kHalfWidth,
        outer: zone.outer,
      };
    });
    return { thicknessMm, poses: panelPoses(development.panels, moved, thicknessMm, 1), shiftMm, legGainMm, values };
  };
}
