import DxfDrawing from 'dxf-writer';
import { type CutEntity, planCutFile } from '@foldwright/shared/drawing/cut-plan';
import type { Bounds } from '@foldwright/shared/geometry/point';
import { buildCutModel, measureCutModel } from './cut-model';
import { type DocumentInput, revisionWords, stockWords } from './document-input';

/** AutoCAD colour index and line type a layer; colours are ours, chosen to be told apart on black and on white. */
const LAYERS = {
  OUTLINE: { colour: 7, lineType: 'CONTINUOUS' },
  OPENING: { colour: 4, lineType: 'CONTINUOUS' },
  'FOLD-TOWARD': { colour: 30, lineType: 'DASHED' },
  'FOLD-AWAY': { colour: 94, lineType: 'DASHDOT' },
  SCRIBE: { colour: 8, lineType: 'CONTINUOUS' },
  NOTES: { colour: 9, lineType: 'CONTINUOUS' },
} as const;

/** Coordinates are written to a thousandth of a micron; no exponents, which some readers refuse. */
const rounded = (valueMm: number): number => {
  const value = Math.round(valueMm * 1e9) / 1e9;
  return Math.abs(value) < 1e-6 ? 0 : value;
};

/** How far our own bounds and the second opinion may differ, mm. */
const EXTENTS_AGREE_MM = 1e-6;

function assertSameExtents(kernel: Bounds, measured: Bounds | null): void {
  const differs =
    !measured ||
    Math.abs(kernel.min.x - measured.min.x) > EXTENTS_AGREE_MM ||
    Math.abs(kernel.min.y - measured.min.y) > EXTENTS_AGREE_MM ||
    Math.abs(kernel.max.x - measured.max.x) > EXTENTS_AGREE_MM ||
    Math.abs(kernel.max.y - measured.max.y) > EXTENTS_AGREE_MM;
  if (differs) throw new Error('The cut file’s extents differ from the flat pattern’s; it was not written');
}

/** The writer reads the bulge from a corner's third place; its typings know only two. */
const withBulge = (corner: [number, number], bulge: number): [number, number] => Object.assign(corner, { 2: bulge });

function drawEntity(drawing: DxfDrawing, entity: CutEntity): void {
  drawing.setActiveLayer(entity.layer);
  switch (entity.kind) {
    case 'contour':
      drawing.drawPolyline(
        entity.corners.map((corner) => withBulge([rounded(corner.at.x), rounded(corner.at.y)], corner.bulge)),
        true,
      );
      return;
    case 'circle':
      drawing.drawCircle(rounded(entity.centre.x), rounded(entity.centre.y), rounded(entity.diameterMm / 2));
      return;
    case 'line':
      drawing.drawLine(rounded(entity.from.x), rounded(entity.from.y), rounded(entity.to.x), rounded(entity.to.y));
  }
}

/**
 * The cut file: flat pattern at full size in mm, face A up, arcs as arcs, cut contours closed, fold lines on layers that
 * are never cut, a note beside the part on NOTES.
 * @throws OpenContourError or Error when the contours would not close or the extents do not agree.
 */
export function makeDxf(input: DocumentInput): Promise<Buffer> {
  const { flat } = input.development;
  const plan = planCutFile(flat);
  assertSameExtents(flat.bounds, measureCutModel(buildCutModel(plan)));
  const drawing = new DxfDrawing();
  drawing.setUnits('Millimeters');
  drawing.header('MEASUREMENT', [[70, 1]]);
  drawing.addLineType('DASHDOT', '_ . _ . ', [6, -2, 0, -2]);
  for (const [name, layer] of Object.entries(LAYERS)) drawing.addLayer(name, layer.colour, layer.lineType);
  for (const entity of plan) drawEntity(drawing, entity);
  drawing.setActiveLayer('NOTES');
  const note = `${input.partNumber} ${revisionWords(input)}, ${stockWords(input)}, face A up, mm`;
  drawing.drawText(
    rounded(flat.bounds.min.x),
    rounded(flat.bounds.min.y - 8),
    4,
    0,
    plainText(note),
    'left',
    'baseline',
  );
  return Promise.resolve(Buffer.from(`${drawing.toDxfString()}\n`, 'latin1'));
}

/** DXF of this version is written in an 8-bit code page: what lies outside becomes "?", line breaks become spaces. */
const plainText = (text: string): string => text.replace(/\s+/g, ' ').replace(/[^\x20-\x7e\u00a0-\u00ff]/g, '?');
