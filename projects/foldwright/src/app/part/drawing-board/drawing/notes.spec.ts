import { applyCommands } from '@foldwright/shared/part/apply-command';
import { entityNames } from '@foldwright/shared/part/entity-names';
import { starterDocument } from '@foldwright/shared/part/starter-document';
import type { Viewport } from '../viewport';
import { chainDimensions, layoutChain, placeDimensions } from './dimensions';
import { drawingNotes } from './notes';

const VIEW: Viewport = { pxPerMm: 4, origin: { xPx: 100, yPx: 300 } };
const bracket = applyCommands(
  starterDocument({ shape: 'l-bracket', baseMm: 50, flangeMm: 30, widthMm: 40, bendAngleDeg: 90 }),
  [10, 30].map((x) => ({
    kind: 'addFeature' as const,
    feature: {
      kind: 'hole' as const,
      id: `h${x}`,
      centre: { x, y: 20 },
      purpose: { kind: 'clearance' as const, thread: 'M6', fit: 'medium' as const },
    },
  })),
);

describe('dimensions', () => {
  it('chain from edge to bend to edge', () => {
    const texts = chainDimensions(layoutChain(bracket.layout), VIEW).map(({ text }) => text);
    expect(texts).toEqual(['50', '30', '40']);
  });

  it('say where a chosen hole stands', () => {
    const texts = placeDimensions(bracket.layout, { kind: 'hole', id: 'h30' }, VIEW).map(({ text }) => text);
    expect(texts).toEqual(['30', '20']);
  });

  it('leave out figures that have no room', () => {
    expect(chainDimensions(layoutChain(bracket.layout), { ...VIEW, pxPerMm: 0.4 })).toEqual([]);
  });
});

describe('notes', () => {
  it('count holes of one kind once and name bends along their crease', () => {
    const notes = drawingNotes(bracket.layout, VIEW, entityNames(bracket.layout));
    expect(notes.map(({ lines }) => lines)).toEqual([['B1 towards 90°'], ['2 × M6', 'Ø 6.6']]);
    expect(notes[0]?.turnDeg).toBe(-90);
  });
});
