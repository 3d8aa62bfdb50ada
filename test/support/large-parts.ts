import type { BendDeclaration, OutlineEdge } from '@foldwright/shared/bending/layout';
import type { Point } from '@foldwright/shared/geometry/point';
import type { PartDocument } from '@foldwright/shared/part/part-document';
import { starterDocument } from '@foldwright/shared/part/starter-document';

const PANEL_MM = 60;
const WIDTH_MM = 90;
/** Depth of the teeth, and how far they keep from the bend lines. */
const TOOTH_MM = 2;
const CLEAR_MM = 12;

/**
 * A strip folded to and fro with teeth along both long sides: a part with as many edges and bends as are asked for, whose bends
 * all cross straight edges. The strip is as long as its teeth need.
 * @param edgeCount at least 4 and four for each panel; the next number the teeth allow is taken
 */
export function toothedStrip(edgeCount: number, bendCount: number): PartDocument {
  const panels = bendCount + 1;
  const teethPerSide = Math.max(0, Math.ceil((edgeCount - 4) / (8 * panels)));
  const panelMm = Math.max(PANEL_MM, 2 * CLEAR_MM + teethPerSide * 4);
  const lengthMm = panels * panelMm;
  const below: Point[] = [{ x: 0, y: 0 }];
  for (let panel = 0; panel < panels; panel += 1) {
    for (let tooth = 0; tooth < teethPerSide; tooth += 1) {
      const x = panel * panelMm + CLEAR_MM + tooth * 4;
      below.push({ x, y: 0 }, { x: x + 0.5, y: TOOTH_MM }, { x: x + 1.5, y: TOOTH_MM }, { x: x + 2, y: 0 });
    }
  }
  below.push({ x: lengthMm, y: 0 });
  const above = below.map(({ x, y }) => ({ x: lengthMm - x, y: WIDTH_MM - y }));
  const edges = [...below, ...above].map((start, index): OutlineEdge => ({ id: `t${index}`, start, bulge: 0 }));
  const base = starterDocument({ shape: 'flat-plate', widthMm: lengthMm, heightMm: WIDTH_MM });
  return {
    ...base,
    layout: {
      ...base.layout,
      outer: { id: 'outer', edges },
      bends: Array.from({ length: bendCount }, (_, index) => bendAt(index, panelMm)),
      baseAnchor: { x: panelMm / 2, y: WIDTH_MM / 2 },
    },
  };
}

function bendAt(index: number, panelMm: number): BendDeclaration {
  const x = (index + 1) * panelMm;
  return {
    id: `b${index + 1}`,
    line: { from: { x, y: 0 }, to: { x, y: WIDTH_MM } },
    bendAngleDeg: 60,
    direction: index % 2 === 0 ? 'towards' : 'away',
    lengths: { from: 'reference', reference: 'outsideApex' },
    insideRadiusMm: null,
    override: null,
    sideEdges: 'trimmed',
  };
}
