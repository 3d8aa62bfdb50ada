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
import type { Point } from '../geometry/point';
import { edgeAt } from './outline-edge-sizes';
import type { PartDocument, SheetStock, Template } from './part-document';

/**
 * The other hand of a part: the layout mirrored left to right within its own width, everything else kept. Face A stays
 * face A, towards stays towards; so the formed part is the mirror image. Twice is the identity up to rounding.
 */
export function mirrorDocument(document: PartDocument): PartDocument {
  const bounds = loopBounds(loopFromBulges(document.layout.outer.edges));
  const sumOfSidesMm = bounds === null ? 0 : bounds.min.x + bounds.max.x;
  return {
    ...document,
    stocks: { trial: mirrorGrain(document.stocks.trial), production: mirrorGrain(document.stocks.production) },
    layout: mirrorLayout(document.layout, (point) => ({ x: sumOfSidesMm - point.x, y: point.y })),
  };
}

/**
 * The same part seen from its other face, for a template that was photographed wrong side up: the layout mirrored, and
 * towards and away, face A and face B change places. The formed part stays what it was.
 */
export function turnDocumentOver(document: PartDocument): PartDocument {
  const mirrored = mirrorDocument(document);
  return {
    ...mirrored,
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
