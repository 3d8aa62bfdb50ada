import type { Layout } from '@foldwright/shared/bending/layout';
import { arcRadius, arcSweepDeg, segmentLength } from '@foldwright/shared/geometry/segment';
import { entityNames } from '@foldwright/shared/part/entity-names';
import { edgeLengthMm } from '@foldwright/shared/part/outline-edge-sizes';
import { findHoleDiameterMm } from '@foldwright/shared/stock/hole-diameter';
import { formatDecimal } from '@foldwright/shared/units/length';
import { purposeWord } from '../part-card/hole-lines';
import type { EntityRef } from './geometry/entity';
import { edgesOfLayout, featureCentre, findBend, findEdge, findFeature } from './geometry/layout-edges';

/** A thing of the drawing in words: its name and what there is to know of it. */
export interface EntityWords {
  readonly ref: EntityRef;
  readonly name: string;
  readonly detail: string;
}

/** Everything that is drawn, in the order of the list: corners and edges by turns, then holes and slots, then bends. */
export function listEntities(layout: Layout): readonly EntityWords[] {
  const names = entityNames(layout);
  const refs: EntityRef[] = [
    ...edgesOfLayout(layout).flatMap(({ edge }): EntityRef[] => [
      { kind: 'vertex', id: edge.id },
      { kind: 'edge', id: edge.id },
    ]),
    ...layout.features.map((feature): EntityRef => ({ kind: feature.kind, id: feature.id })),
    ...layout.bends.map((bend): EntityRef => ({ kind: 'bend', id: bend.id })),
  ];
  return refs.map((ref) => ({ ref, ...describeEntity(layout, ref, names) }));
}

/** Name and detail of one thing: "Edge E3", "84 mm long". */
export function describeEntity(
  layout: Layout,
  ref: EntityRef,
  names: ReadonlyMap<string, string> = entityNames(layout),
): { readonly name: string; readonly detail: string } {
  const name = names.get(ref.id) ?? ref.id;
  switch (ref.kind) {
    case 'vertex': {
      const at = findEdge(layout, ref.id)?.edge.start;
      return { name: `Corner ${name.replace(/^E/, 'P')}`, detail: at === undefined ? '' : placeWords(at.x, at.y) };
    }
    case 'edge': {
      const placed = findEdge(layout, ref.id);
      if (placed === null) return { name: `Edge ${name}`, detail: '' };
      if (placed.segment.kind === 'line') {
        const lengthMm = edgeLengthMm(placed.loop, ref.id) ?? segmentLength(placed.segment);
        return { name: `Edge ${name}`, detail: `${figure(lengthMm)} mm long` };
      }
      const sweepDeg = Math.abs(arcSweepDeg(placed.segment));
      return { name: `Arc ${name}`, detail: `R ${figure(arcRadius(placed.segment))}, ${formatDecimal(sweepDeg, 0)}°` };
    }
    case 'hole': {
      const feature = findFeature(layout, ref.id);
      if (feature?.kind !== 'hole') return { name: `Hole ${name}`, detail: '' };
      const { purpose, centre } = feature;
      const size = `Ø ${figure(findHoleDiameterMm(purpose) ?? 0)}`;
      const what =
        'thread' in purpose
          ? `${purpose.thread} ${purposeWord(purpose.kind)}, ${size}`
          : `${size} ${purposeWord(purpose.kind)}`;
      return { name: `Hole ${name}`, detail: `${what}, ${placeWords(centre.x, centre.y)}` };
    }
    case 'slot': {
      const feature = findFeature(layout, ref.id);
      if (feature?.kind !== 'slot') return { name: `Slot ${name}`, detail: '' };
      const lengthMm = Math.hypot(feature.to.x - feature.from.x, feature.to.y - feature.from.y) + feature.widthMm;
      const at = featureCentre(feature);
      return {
        name: `Slot ${name}`,
        detail: `${figure(feature.widthMm)} × ${figure(lengthMm)}, ${placeWords(at.x, at.y)}`,
      };
    }
    case 'bend': {
      const bend = findBend(layout, ref.id);
      const detail = bend === null ? '' : `${formatDecimal(bend.bendAngleDeg, 2)}° ${bend.direction}`;
      return { name: `Bend ${name}`, detail };
    }
  }
}

function figure(valueMm: number): string {
  return formatDecimal(valueMm, 2);
}

function placeWords(x: number, y: number): string {
  return `at ${figure(x)}, ${figure(y)}`;
}
