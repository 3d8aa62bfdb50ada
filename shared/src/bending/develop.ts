import { findCrossings } from '../geometry/loop-crossings';
import { loopLength, pointInLoop, signedArea } from '../geometry/loop';
import type { Loop } from '../geometry/path';
import { outsideOpenings } from '../geometry/stretch';
import type { Stretch } from '../geometry/stretch';
import { COINCIDENT_MM } from '../geometry/tolerance';
import { along, distance, dot, subtract } from '../geometry/vector';
import { bendDeductionMm } from './allowance';
import { bendForceKn } from './bend-force';
import type { CardTemplate } from './card';
import type { BendRow, BendZone, BendingStock, DevelopmentResult, FlatBend, FlatPattern, Relief } from './development';
import type { Unfolded } from './flat-pattern';
import { formedBox } from './formed-box';
import { formedSizes } from './formed-sizes';
import type { Layout } from './layout';
import type { ResolvedBend } from './resolved-bend';
import type { Sheet } from './sheet';
import { unfoldLayout } from './unfold-layout';

const MM3_PER_M3 = 1_000_000_000;

/**
 * Everything about a layout in one stock: panels, flat pattern, bend table, formed sizes. Pure: the same input gives the same
 * answer, and input a person can fix comes back as problems that name the offending things.
 * @param template the card the layout was taken from; null when it was typed.
 */
export function developLayout(layout: Layout, template: CardTemplate | null, stock: BendingStock): DevelopmentResult {
  const laidOut = unfoldLayout(layout, template, stock);
  if (!laidOut.ok) return laidOut;
  const { unfolded, bends, sheet } = laidOut;
  const flatBends = describeBends(unfolded, bends);
  return {
    ok: true,
    development: {
      stock,
      panels: unfolded.panels,
      zones: unfolded.zones,
      flat: measureFlat(unfolded, flatBends, stock),
      bendTable: bends.map((bend) => bendRow(bend, flatBends, stock)),
      formedBox: formedBox(unfolded.panels, unfolded.zones, stock.thicknessMm),
      formedSizes: formedSizes(unfolded.panels, unfolded.zones, nameIn(bends), stock.thicknessMm),
      featuresInBendZones: openingsInZones(sheet, unfolded),
      reliefs: describeReliefs(unfolded, bends),
    },
  };
}

function nameIn(bends: readonly ResolvedBend[]): (bendId: string) => string {
  return (bendId) => bends.find(({ declaration }) => declaration.id === bendId)?.name ?? '';
}

function measureFlat(unfolded: Unfolded, bends: readonly FlatBend[], stock: BendingStock): FlatPattern {
  const { outer, cutouts, holes, slots, bounds } = unfolded;
  const holeArea = holes.reduce((sum, { diameterMm }) => sum + (Math.PI * diameterMm ** 2) / 4, 0);
  const slotArea = slots.reduce(
    (sum, slot) => sum + slot.widthMm * distance(slot.from, slot.to) + (Math.PI * slot.widthMm ** 2) / 4,
    0,
  );
  const cutoutArea = cutouts.reduce((sum, loop) => sum + Math.abs(signedArea(loop)), 0);
  const areaMm2 = signedArea(outer) - cutoutArea - holeArea - slotArea;
  const cutLengthMm =
    [outer, ...cutouts].reduce((sum, loop) => sum + loopLength(loop), 0) +
    holes.reduce((sum, { diameterMm }) => sum + Math.PI * diameterMm, 0) +
    slots.reduce((sum, slot) => sum + 2 * distance(slot.from, slot.to) + Math.PI * slot.widthMm, 0);
  return {
    outer,
    cutouts,
    holes,
    slots,
    bends,
    bounds,
    areaMm2,
    cutLengthMm,
    pierces: 1 + cutouts.length + holes.length + slots.length,
    massKg: (areaMm2 * stock.thicknessMm * stock.densityKgPerM3) / MM3_PER_M3,
  };
}

function describeBends(unfolded: Unfolded, bends: readonly ResolvedBend[]): readonly FlatBend[] {
  const openings = unfolded.panels.flatMap((panel) => panel.openings);
  return bends.flatMap((bend) => {
    const zones = unfolded.zones.filter(({ bendId }) => bendId === bend.declaration.id);
    const groups = new Map<string, BendZone[]>();
    for (const zone of zones) {
      const key = `${String(zone.parentIndex)} ${String(zone.childIndex)}`;
      groups.set(key, [...(groups.get(key) ?? []), zone]);
    }
    return [...groups.values()].flatMap((group): readonly FlatBend[] => {
      const first = group[0];
      if (first === undefined) return [];
      const linesAt = (share: number): readonly Stretch[] =>
        group.flatMap((zone) => outsideOpenings(lineAcross(zone, share), openings));
      return [
        {
          bendId: bend.declaration.id,
          name: bend.name,
          centreLines: linesAt(0.5),
          tangentLines: [...linesAt(0), ...linesAt(1)],
          direction: bend.declaration.direction,
          bendAngleDeg: bend.geometry.bendAngleDeg,
          insideRadiusMm: bend.geometry.insideRadiusMm,
          bendAllowanceMm: bend.allowanceMm,
          towardsChild: first.towardsChild,
        },
      ];
    });
  });
}

/** The line along a zone at a share of its allowance, from side to side. */
function lineAcross(zone: BendZone, share: number): Stretch {
  const levelMm = zone.bendAllowanceMm * share;
  const origin = along(zone.origin, zone.towardsChild, levelMm);
  const reach: number[] = [];
  for (const { from, to } of zone.outer) {
    const start = dot(subtract(from, origin), zone.towardsChild);
    const end = dot(subtract(to, origin), zone.towardsChild);
    if (Math.abs(start) <= COINCIDENT_MM) reach.push(dot(subtract(from, origin), zone.along));
    if (start * end < 0) {
      const t = start / (start - end);
      reach.push(
        dot(subtract({ x: from.x + (to.x - from.x) * t, y: from.y + (to.y - from.y) * t }, origin), zone.along),
      );
    }
  }
  return { from: along(origin, zone.along, Math.min(...reach)), to: along(origin, zone.along, Math.max(...reach)) };
}

function bendRow(bend: ResolvedBend, flatBends: readonly FlatBend[], stock: BendingStock): BendRow {
  const lines = flatBends
    .filter(({ bendId }) => bendId === bend.declaration.id)
    .flatMap(({ centreLines }) => centreLines);
  const bendLengthMm = lines.reduce((sum, { from, to }) => sum + distance(from, to), 0);
  const { geometry } = bend;
  return {
    bendId: bend.declaration.id,
    name: bend.name,
    bendAngleDeg: geometry.bendAngleDeg,
    direction: bend.declaration.direction,
    insideRadiusMm: geometry.insideRadiusMm,
    kFactor: geometry.kFactor,
    kProvenance: bend.provenance,
    kNote: bend.note,
    bendAllowanceMm: bend.allowanceMm,
    bendDeductionMm: bendDeductionMm(geometry, bend.reference),
    deductionReference: bend.reference,
    layoutDeductionMm: 2 * bend.layoutSetbackMm - bend.allowanceMm,
    vOpeningMm: stock.vOpeningMm,
    bendLengthMm,
    forceKn: bendForceKn({
      ultimateStrengthMpa: stock.ultimateStrengthMpa,
      bendLengthMm,
      thicknessMm: stock.thicknessMm,
      vOpeningMm: stock.vOpeningMm,
    }),
  };
}

/** Ids of openings that reach into a bend zone: those a bend line crosses, and those beside it. */
function openingsInZones(sheet: Sheet, unfolded: Unfolded): readonly string[] {
  const reaches = (loop: Loop): boolean =>
    unfolded.zones.some((zone) => {
      const corner = loop[0]?.from;
      if (corner !== undefined && pointInLoop(corner, zone.outer, 0) === 'inside') return true;
      return findCrossings([zone.outer, loop], 0).length > 0;
    });
  const crossed = sheet.cutouts
    .filter(({ id }) => !unfolded.openings.some((opening) => opening.id === id))
    .map(({ id }) => id);
  const beside = unfolded.openings.filter(({ loop }) => reaches(loop)).map(({ id }) => id);
  return [...crossed, ...beside];
}

function describeReliefs(unfolded: Unfolded, bends: readonly ResolvedBend[]): readonly Relief[] {
  return unfolded.shoulders.flatMap(({ panel, end }): readonly Relief[] => {
    const bend = bends[end.crease];
    const shift = unfolded.shifts[panel] ?? { x: 0, y: 0 };
    if (bend === undefined) return [];
    return [
      {
        bendId: bend.declaration.id,
        state: end.isRelieved ? 'added' : 'missing',
        layout: end.corner,
        flat: { x: end.tangentPoint.x + shift.x, y: end.tangentPoint.y + shift.y },
        widthMm: end.widthMm,
        depthMm: end.depthMm,
      },
    ];
  });
}
