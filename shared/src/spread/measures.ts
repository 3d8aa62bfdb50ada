import type { Development, Panel } from '../bending/development';
import { placeIn } from '../bending/fold';
import { outsideReachMm } from '../bending/leg-gains';
import { formedSpans } from '../bending/formed-spans';
import type { FormedSpan } from '../bending/formed-spans';
import { isInRegion } from '../geometry/loop';
import type { Point, Point3 } from '../geometry/point';
import { along, between, dot, subtract } from '../geometry/vector';
import { dot3, subtract3 } from '../geometry/vector3';
import type { CoatSpread } from './causes';
import { valueAt } from './formed-state';
import type { FormedState } from './formed-state';
import { keyOf } from './variables';
import type { VariableModel } from './variables';

/** Something of the formed part with a spread. */
export interface Measure {
  readonly kind: 'size' | 'holes' | 'tip';
  readonly label: string;
  /** Bends, holes or slots that it lies between. */
  readonly ids: readonly string[];
  /** mm, of a part that came out in this state. */
  readonly valueIn: (state: FormedState) => number;
}

/** A hole or slot with the panel it lies on. */
export interface PlacedOpening {
  readonly featureId: string;
  readonly panelIndex: number;
  /** Middle in the flat pattern. */
  readonly middle: Point;
  /** Places of its cut's variables in the model. */
  readonly atX: number;
  readonly atY: number;
}

/** Holes and slots whose middle lies on a panel. Those in a bend zone are pulled out of shape and have no place worth a spread. */
export function openingsOnPanels(development: Development, model: VariableModel): readonly PlacedOpening[] {
  const middles = [
    ...development.flat.holes.map(({ featureId, centre }) => ({ featureId, middle: centre })),
    ...development.flat.slots.map(({ featureId, from, to }) => ({ featureId, middle: between(from, to, 0.5) })),
  ];
  return middles.flatMap(({ featureId, middle }) => {
    const panel = development.panels.find(({ outer }) => isInRegion(middle, outer, [], 0));
    if (panel === undefined) return [];
    const [atX, atY] = [model.indexOf(keyOf.holeX(featureId)), model.indexOf(keyOf.holeY(featureId))];
    return [{ featureId, middle, panelIndex: panel.index, atX, atY }];
  });
}

/** Middle of an opening in space, at half the thickness, mm. */
export function openingIn(state: FormedState, opening: PlacedOpening): Point3 | null {
  const pose = state.poses[opening.panelIndex];
  if (pose === undefined) return null;
  const { middle, atX, atY } = opening;
  const cut = { x: middle.x + valueAt(state, atX), y: middle.y + valueAt(state, atY) };
  return placeIn(pose, cut, state.thicknessMm / 2).at;
}

/**
 * Everything of a formed part that is worth a spread: the sizes callipers find across each panel, over the coat; how far the tip
 * of each flange lies off its place across its face, seen from the base's holes; the distance of every two holes or slots with a
 * bend between them, middle to middle at half the thickness.
 * @param nominal the part as planned
 */
export function measuresOf(
  development: Development,
  model: VariableModel,
  coat: CoatSpread,
  nominal: FormedState,
): readonly Measure[] {
  const nameOf = (bendId: string): string => development.bendTable.find((row) => row.bendId === bendId)?.name ?? bendId;
  const spans = formedSpans(development.panels, development.zones, nameOf);
  return [
    ...spans.map((span) => sizeMeasure(span, development.stock.thicknessMm, model, coat)),
    ...spans.flatMap((span) => tipMeasure(span, development.panels, nominal)),
    ...holeMeasures(openingsOnPanels(development, model)),
  ];
}

function sizeMeasure(span: FormedSpan, thicknessMm: number, model: VariableModel, coat: CoatSpread): Measure {
  const { ends, flatMm, label, panelIndex } = span;
  const plannedMm = flatMm + ends.reduce((sum, { zone }) => sum + outsideReachMm({ ...zone, thicknessMm }), 0);
  const [first] = ends;
  const isToEdge = ends.length === 1 && first !== undefined;
  const atEdge = isToEdge ? model.indexOf(keyOf.edge(panelIndex, first.zone.bendId)) : -1;
  const atCoat = model.indexOf(keyOf.coat);
  const bends = ends.map(({ zone, outwards }) => ({
    index: model.bendIndexOf(zone.bendId),
    side: dot(outwards, zone.towardsChild) > 0 ? 1 : -1,
  }));
  const coatMm = coat.lowMm + coat.highMm;
  return {
    kind: 'size',
    label,
    ids: ends.map(({ zone }) => zone.bendId),
    valueIn: (state) => {
      let valueMm = plannedMm + coatMm + 2 * valueAt(state, atCoat) + valueAt(state, atEdge);
      for (const { index, side } of bends)
        valueMm += side * (state.shiftMm[index] ?? 0) + (state.legGainMm[index] ?? 0);
      return valueMm;
    },
  };
}

function tipMeasure(span: FormedSpan, panels: readonly Panel[], nominal: FormedState): readonly Measure[] {
  const [end] = span.ends;
  const isFlange = panels[span.panelIndex]?.parentIndex !== null;
  if (end === undefined || span.ends.length !== 1 || !isFlange) return [];
  const { zone, name } = end;
  const reach = zone.outer.map(({ from }) => dot(subtract(from, zone.origin), zone.along));
  const middle = along(zone.origin, zone.along, (Math.min(...reach) + Math.max(...reach)) / 2);
  const tip = along(middle, zone.towardsChild, zone.bendAllowanceMm + span.flatMm);
  const placed = (state: FormedState): Point3 | null => {
    const pose = state.poses[span.panelIndex];
    return pose === undefined ? null : placeIn(pose, tip, state.thicknessMm / 2).at;
  };
  const from = placed(nominal);
  const face = nominal.poses[span.panelIndex]?.uz;
  if (from === null || face === undefined) return [];
  return [
    {
      kind: 'tip',
      label: `Flange at ${name}, its tip across its face`,
      ids: [zone.bendId],
      valueIn: (state) => {
        const at = placed(state);
        return at === null ? 0 : dot3(subtract3(at, from), face);
      },
    },
  ];
}

function holeMeasures(openings: readonly PlacedOpening[]): readonly Measure[] {
  return openings.flatMap((first, index) =>
    openings.slice(index + 1).flatMap((second): readonly Measure[] => {
      if (first.panelIndex === second.panelIndex) return [];
      return [
        {
          kind: 'holes',
          label: `${first.featureId} to ${second.featureId}, middle to middle`,
          ids: [first.featureId, second.featureId],
          valueIn: (state) => {
            const [a, b] = [openingIn(state, first), openingIn(state, second)];
            return a === null || b === null ? 0 : Math.hypot(a.x - b.x, a.y - b.y, a.z - b.z);
          },
        },
      ];
    }),
  );
}
