import { applyCommands } from '@foldwright/shared/part/apply-command';
import { entityNames } from '@foldwright/shared/part/entity-names';
import { starterDocument } from '@foldwright/shared/part/starter-document';
import { type Viewport, toScreen } from '../viewport';
import { chainDimensions, layoutChain, placeDimensions } from './dimensions';
import { boxesAlong, isFree, noteBox } from './note-room';
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

  it.each([0.8, 1.5, 2.2, 3, 4, 6, 10])('cover no crease, no hole and each other at %d px a millimetre', (pxPerMm) => {
    const view: Viewport = { ...VIEW, pxPerMm };
    const crowded = applyCommands(
      bracket,
      [4, 16].map((x) => ({
        kind: 'addBend' as const,
        bend: {
          id: `b${x}`,
          line: { from: { x, y: 0 }, to: { x, y: 40 } },
          bendAngleDeg: 45,
          direction: 'away' as const,
          lengths: { from: 'reference' as const, reference: 'outsideApex' as const },
          insideRadiusMm: null,
          override: null,
          sideEdges: 'trimmed' as const,
        },
      })),
    );
    const notes = drawingNotes(crowded.layout, view, entityNames(crowded.layout));
    const creases = crowded.layout.bends.flatMap(({ line }) =>
      boxesAlong(toScreen(view, line.from), toScreen(view, line.to)),
    );
    const boxes = notes.map(noteBox);
    for (const [at, box] of boxes.entries()) {
      expect(isFree(box, [...creases, ...boxes.slice(0, at)])).toBe(true);
    }
  });
});
