import type {
  BendDeclaration,
  BendDirection,
  CardReading,
  Feature,
  Layout,
  OutlineEdge,
  OutlineLoop,
} from '../bending/layout';
import { loopBounds, loopFromBulges } from '../geometry/loop';
import type { Point, Point3 } from '../geometry/point';
import { type Mark, type Neighbour, markLengthMm } from './assembly';
import { edgeAt } from './outline-edge-sizes';
import type { PartDocument, SheetStock, Template } from './part-document';
import { withAssembly, withMarks } from './with-optional';

/**
 * The other hand of a part: the layout mirrored left to right within its own width, everything else kept. Face A stays
 * face A, towards stays towards; so the formed part is the mirror image. Twice is the identity up to rounding.
 */
export function mirrorDocument(document: PartDocument): PartDocument {
  const bounds = loopBounds(loopFromBulges(document.layout.outer.edges));
  const sumOfSidesMm = bounds === null ? 0 : bounds.min.x + bounds.max.x;
  const mirrored: PartDocument = {
    ...document,
    stocks: { trial: mirrorGrain(document.stocks.trial), production: mirrorGrain(document.stocks.production) },
    layout: mirrorLayout(document.layout, (point) => ({ x: sumOfSidesMm - point.x, y: point.y })),
  };
  const { assembly } = document;
  return withMarks(
    withAssembly(
      mirrored,
      assembly === undefined
        ? null
        : { ...assembly, neighbours: assembly.neighbours.map((one) => mirrorNeighbour(one, sumOfSidesMm)) },
    ),
    (document.marks ?? []).map((mark) => mirrorMark(mark, sumOfSidesMm)),
  );
}

function mirrorNeighbour(neighbour: Neighbour, sumOfSidesMm: number): Neighbour {
  if (neighbour.kind === 'cylinder') {
    const mirror = (point: Point3): Point3 => ({ ...point, x: sumOfSidesMm - point.x });
    return { ...neighbour, from: mirror(neighbour.from), to: mirror(neighbour.to) };
  }
  return {
    ...neighbour,
    min: { ...neighbour.min, x: sumOfSidesMm - neighbour.max.x },
    max: { ...neighbour.max, x: sumOfSidesMm - neighbour.min.x },
  };
}

/** What stood above face B of the base panel stands below face A of it. */
function turnNeighbourOver(neighbour: Neighbour, thicknessMm: number): Neighbour {
  const turn = (point: Point3): Point3 => ({ ...point, z: thicknessMm - point.z });
  if (neighbour.kind === 'cylinder') return { ...neighbour, from: turn(neighbour.from), to: turn(neighbour.to) };
  return {
    ...neighbour,
    min: { ...neighbour.min, z: thicknessMm - neighbour.max.z },
    max: { ...neighbour.max, z: thicknessMm - neighbour.min.z },
  };
}

/** The text takes the mirrored place and still reads from left to right. */
function mirrorMark(mark: Mark, sumOfSidesMm: number): Mark {
  const turnRad = (mark.turnDeg * Math.PI) / 180;
  const lengthMm = markLengthMm(mark);
  const end = { x: mark.at.x + lengthMm * Math.cos(turnRad), y: mark.at.y + lengthMm * Math.sin(turnRad) };
  return { ...mark, at: { x: sumOfSidesMm - end.x, y: end.y }, turnDeg: -mark.turnDeg };
}

/**
 * The same part seen from its other face, for a template that was photographed wrong side up: the layout mirrored, and
 * towards and away, face A and face B change places. The formed part stays what it was.
 */
export function turnDocumentOver(document: PartDocument): PartDocument {
  const mirrored = mirrorDocument(document);
  const { assembly } = mirrored;
  const thicknessMm = document.stocks.production.thicknessMm;
  const turned =
    assembly === undefined
      ? null
      : { ...assembly, neighbours: assembly.neighbours.map((one) => turnNeighbourOver(one, thicknessMm)) };
  return {
    ...withAssembly(mirrored, turned),
    template: mirrored.template === null ? null : turnTemplateOver(mirrored.template),
    layout: { ...mirrored.layout, bends: mirrored.layout.bends.map((bend) => turnBendOver(bend, document)) },
  };
}

function mirrorGrain(stock: SheetStock): SheetStock {
  const { grainDirectionDeg } = stock;
  return grainDirectionDeg === null ? stock : { ...stock, grainDirectionDeg: (180 - grainDirectionDeg) % 180 };
}

function mirrorLayout(layout: Layout, mirror: (point: Point) => Point): Layout {
  return {
    ...layout,
    outer: mirrorLoop(layout.outer, mirror),
    cutouts: layout.cutouts.map((loop) => mirrorLoop(loop, mirror)),
    features: layout.features.map((feature): Feature =>
      feature.kind === 'hole'
        ? { ...feature, centre: mirror(feature.centre) }
        : { ...feature, from: mirror(feature.from), to: mirror(feature.to) },
    ),
    bends: layout.bends.map((bend) => ({
      ...bend,
      line: { from: mirror(bend.line.from), to: mirror(bend.line.to) },
    })),
    baseAnchor: mirror(layout.baseAnchor),
  };
}

/** Mirrored and run the other way, so that the outline stays counter-clockwise; both turn the bulge's sign, so it stays. */
function mirrorLoop(loop: OutlineLoop, mirror: (point: Point) => Point): OutlineLoop {
  const edges = loop.edges.map((edge, index): OutlineEdge => ({
    ...edge,
    start: mirror(edgeAt(loop.edges, index + 1).start),
  }));
  return { ...loop, edges: edges.reverse() };
}

function turnBendOver(bend: BendDeclaration, { template }: PartDocument): BendDeclaration {
  const direction = opposite(bend.direction);
  if (bend.lengths.from !== 'template' || bend.lengths.override === null || template === null) {
    return { ...bend, direction };
  }
  const override = otherFace({ reading: bend.lengths.override, thicknessMm: template.thicknessMm });
  return { ...bend, direction, lengths: { from: 'template', override } };
}

function turnTemplateOver(template: Template): Template {
  const turned = { ...template, reading: otherFace(template) };
  return template.flangesFold === undefined ? turned : { ...turned, flangesFold: opposite(template.flangesFold) };
}

function opposite(direction: BendDirection): BendDirection {
  return direction === 'towards' ? 'away' : 'towards';
}

function otherFace(card: { readonly reading: CardReading; readonly thicknessMm: number }): CardReading {
  const { readOn, bearingFace, hinge } = card.reading;
  return {
    readOn: readOn === 'faceA' ? 'faceB' : readOn === 'faceB' ? 'faceA' : 'crease',
    bearingFace: bearingFace === 'A' ? 'B' : 'A',
    hinge:
      hinge.kind === 'liner'
        ? { kind: 'liner', face: hinge.face === 'A' ? 'B' : 'A' }
        : hinge.kind === 'depth'
          ? { kind: 'depth', depthMm: card.thicknessMm - hinge.depthMm }
          : hinge,
  };
}
