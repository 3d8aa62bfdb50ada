import type { BendDeclaration, Feature, OutlineLoop } from '../bending/layout';
import type { Point } from '../geometry/point';
import { length3, subtract3 } from '../geometry/vector3';
import { findFinish } from '../stock/finishes';
import { findHoleDiameterMm } from '../stock/hole-diameter';
import { CommandRefusal, type CommandRefusalCode } from './command-refusal';
import type { Assembly, Mark } from './assembly';
import type { PartDocument, SheetStock } from './part-document';

/** Limits of a document, so that no document can hold up the server. Counts, mm and degrees. */
export const DOCUMENT_LIMITS = {
  edges: 4000,
  cutouts: 500,
  features: 500,
  bends: 60,
  marks: 40,
  neighbours: 60,
  coordinateMm: 5000,
  /** Smallest hole or slot: far below what anything cuts, far above where points run together. */
  leastSizeMm: 0.01,
  bulge: 1000,
} as const;

/** One broken invariant of a document. */
export interface BrokenInvariant {
  readonly code: CommandRefusalCode;
  readonly message: string;
  readonly ids: readonly string[];
}

/**
 * What every stored document fulfils: finite coordinates within ±5000 mm, ids that are unique over edges, loops, holes,
 * slots and bends, outlines of at least three edges (or two with an arc), sizes above 0, threads the tables know, counts
 * within `DOCUMENT_LIMITS`. It says nothing about whether the part can be made; that is what checks are for.
 * @returns all broken invariants, empty for a good document
 */
export function checkInvariants(document: PartDocument): readonly BrokenInvariant[] {
  const broken: BrokenInvariant[] = [];
  const report = (code: CommandRefusalCode, message: string, ...ids: readonly string[]) => {
    broken.push({ code, message, ids });
  };
  const { layout, stocks, template, calibration, assembly } = document;
  const loops = [layout.outer, ...layout.cutouts];
  checkCounts(document, report);
  checkUniqueIds(document, report);
  for (const loop of loops) checkLoop(loop, report);
  for (const feature of layout.features) checkFeature(feature, report);
  for (const bend of layout.bends) checkBend(bend, report);
  for (const mark of document.marks ?? []) checkMark(mark, report);
  if (assembly !== undefined) checkAssembly(assembly, report);
  checkStock('trial', stocks.trial, report);
  checkStock('production', stocks.production, report);
  if (template !== null && !isPositive(template.thicknessMm)) {
    report('impossibleSize', 'The template’s thickness must be more than 0.');
  }
  if (!isPositive(calibration.scaleX) || !isPositive(calibration.scaleY)) {
    report('impossibleSize', 'A scale must be more than 0.');
  }
  if (!isInReach(layout.baseAnchor)) report('limitExceeded', 'The base anchor lies out of reach.');
  const { widthMm, depthMm } = layout.reliefs;
  if ((widthMm !== null && !isPositive(widthMm)) || (depthMm !== null && !isPositive(depthMm))) {
    report('impossibleSize', 'A relief has a width and a depth above 0.');
  }
  return broken;
}

/** @throws CommandRefusal for the first broken invariant */
export function assertInvariants(document: PartDocument): void {
  const [first] = checkInvariants(document);
  if (first !== undefined) throw new CommandRefusal(first.code, first.message, first.ids);
}

type Report = (code: CommandRefusalCode, message: string, ...ids: readonly string[]) => void;

function checkCounts({ layout, marks, assembly }: PartDocument, report: Report): void {
  const edgeCount = [layout.outer, ...layout.cutouts].reduce((sum, loop) => sum + loop.edges.length, 0);
  const counts = [
    [edgeCount, DOCUMENT_LIMITS.edges, 'edges'],
    [layout.cutouts.length, DOCUMENT_LIMITS.cutouts, 'cut-outs'],
    [layout.features.length, DOCUMENT_LIMITS.features, 'holes and slots'],
    [layout.bends.length, DOCUMENT_LIMITS.bends, 'bends'],
    [marks?.length ?? 0, DOCUMENT_LIMITS.marks, 'etched texts'],
    [assembly?.neighbours.length ?? 0, DOCUMENT_LIMITS.neighbours, 'neighbours'],
  ] as const;
  for (const [count, limit, what] of counts) {
    if (count > limit) report('limitExceeded', `A part has at most ${limit} ${what}; this one would have ${count}.`);
  }
}

function checkUniqueIds({ layout, marks, assembly }: PartDocument, report: Report): void {
  const seen = new Set<string>();
  const loops = [layout.outer, ...layout.cutouts];
  const things = [
    ...loops,
    ...loops.flatMap((loop) => loop.edges),
    ...layout.features,
    ...layout.bends,
    ...(marks ?? []),
    ...(assembly?.neighbours ?? []),
  ];
  for (const { id } of things) {
    if (seen.has(id)) report('duplicateId', `The id “${id}” is taken already.`, id);
    seen.add(id);
  }
}

function checkLoop(loop: OutlineLoop, report: Report): void {
  const isArcPair = loop.edges.length === 2 && loop.edges.some((edge) => edge.bulge !== 0);
  if (loop.edges.length < 3 && !isArcPair) {
    report('tooFewEdges', 'An outline needs at least three corners, or two with an arc.', loop.id);
  }
  for (const edge of loop.edges) {
    if (!isInReach(edge.start)) {
      report('limitExceeded', `A corner lies more than ${DOCUMENT_LIMITS.coordinateMm} mm out.`, edge.id);
    }
    if (!Number.isFinite(edge.bulge) || Math.abs(edge.bulge) > DOCUMENT_LIMITS.bulge) {
      report('impossibleSize', 'An arc cannot close on itself in one edge.', edge.id);
    }
  }
}

function checkFeature(feature: Feature, report: Report): void {
  const points = feature.kind === 'hole' ? [feature.centre] : [feature.from, feature.to];
  if (!points.every(isInReach)) {
    report('limitExceeded', `It lies more than ${DOCUMENT_LIMITS.coordinateMm} mm out.`, feature.id);
  }
  const sizeMm = feature.kind === 'hole' ? findHoleDiameterMm(feature.purpose) : feature.widthMm;
  if (sizeMm === null) {
    report('unknownThread', 'The fastener tables have no such thread for this purpose.', feature.id);
  } else if (!(sizeMm >= DOCUMENT_LIMITS.leastSizeMm && sizeMm <= DOCUMENT_LIMITS.coordinateMm)) {
    report('impossibleSize', 'A hole or slot is at least a hundredth of a millimetre wide.', feature.id);
  }
}

function checkBend(bend: BendDeclaration, report: Report): void {
  if (!isInReach(bend.line.from) || !isInReach(bend.line.to)) {
    report('limitExceeded', `The bend lies more than ${DOCUMENT_LIMITS.coordinateMm} mm out.`, bend.id);
  } else if (bend.line.from.x === bend.line.to.x && bend.line.from.y === bend.line.to.y) {
    report('impossibleSize', 'A bend line runs between two different points.', bend.id);
  }
  if (!isPositive(bend.bendAngleDeg) || bend.bendAngleDeg > 180) {
    report('impossibleSize', 'A bend turns the sheet by more than 0° and at most 180°.', bend.id);
  }
  const radiusMm = bend.insideRadiusMm;
  if (radiusMm !== null && !(Number.isFinite(radiusMm) && radiusMm >= 0)) {
    report('impossibleSize', 'An inside radius is 0 or more.', bend.id);
  }
  const override = bend.override;
  if (override?.kind === 'kFactor' && !(override.kFactor > 0 && override.kFactor <= 0.5)) {
    report('impossibleSize', 'K lies above 0 and is at most 0.5.', bend.id);
  }
  if (override?.kind === 'deduction' && !Number.isFinite(override.deductionMm)) {
    report('impossibleSize', 'A deduction is a length in mm.', bend.id);
  }
}

function checkMark(mark: Mark, report: Report): void {
  if (!isInReach(mark.at) || !Number.isFinite(mark.turnDeg)) {
    report('limitExceeded', 'The etched text lies out of reach.', mark.id);
  }
  if (!isPositive(mark.heightMm)) report('impossibleSize', 'A text has a height above 0.', mark.id);
}

function checkAssembly({ finishId, seat, neighbours, bolts }: Assembly, report: Report): void {
  if (findFinish(finishId) === null) report('unknownEntity', 'The tables have no such finish.', finishId);
  for (const { bendId, radiusMm } of seat?.corners ?? []) {
    if (!(Number.isFinite(radiusMm) && radiusMm >= 0)) {
      report('impossibleSize', 'The seat’s corner has a radius of 0 or more.', bendId);
    }
  }
  for (const neighbour of neighbours) {
    const isSolid =
      neighbour.kind === 'box'
        ? (['x', 'y', 'z'] as const).every((axis) => neighbour.max[axis] > neighbour.min[axis])
        : isPositive(neighbour.radiusMm) && length3(subtract3(neighbour.to, neighbour.from)) > 0;
    if (!isSolid) report('impossibleSize', 'A neighbour takes up room.', neighbour.id);
  }
  if (bolts === null) return;
  const { placeHalfWidthMm, wantedChance, featureIds } = bolts;
  if (!(Number.isFinite(placeHalfWidthMm) && placeHalfWidthMm >= 0) || !(wantedChance > 0 && wantedChance < 1)) {
    report('impossibleSize', 'Bolts sit somewhere, and start with a chance between 0 and 1.', ...featureIds);
  }
}

function checkStock(role: string, stock: SheetStock, report: Report): void {
  if (!isPositive(stock.thicknessMm) || (stock.vOpeningMm !== null && !isPositive(stock.vOpeningMm))) {
    report('impossibleSize', `The ${role} sheet’s thickness and die opening must be more than 0.`, stock.materialId);
  }
  if (stock.grainDirectionDeg !== null && !Number.isFinite(stock.grainDirectionDeg)) {
    report('impossibleSize', `The ${role} sheet’s grain direction is an angle in degrees.`, stock.materialId);
  }
}

function isPositive(value: number): boolean {
  return Number.isFinite(value) && value > 0;
}

function isInReach(point: Point): boolean {
  const limit = DOCUMENT_LIMITS.coordinateMm;
  return Math.abs(point.x) <= limit && Math.abs(point.y) <= limit;
}
