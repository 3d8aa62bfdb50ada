import type { PartDocument } from '@foldwright/shared/part/part-document';
import { starterDocument } from '@foldwright/shared/part/starter-document';
import { applyCommands } from '@foldwright/shared/part/apply-command';
import { EditorDriver } from './editor-driver';

/** A plate of 100 by 60 with one M6 hole and one slot. */
function plate(): PartDocument {
  return applyCommands(starterDocument({ shape: 'flat-plate', widthMm: 100, heightMm: 60 }), [
    {
      kind: 'addFeature',
      feature: {
        kind: 'hole',
        id: 'h1',
        centre: { x: 30, y: 30 },
        purpose: { kind: 'clearance', thread: 'M6', fit: 'medium' },
      },
    },
    {
      kind: 'addFeature',
      feature: { kind: 'slot', id: 's1', from: { x: 60, y: 40 }, to: { x: 75, y: 40 }, widthMm: 6 },
    },
  ]);
}

const bracket = (): PartDocument =>
  starterDocument({ shape: 'l-bracket', baseMm: 50, flangeMm: 30, widthMm: 40, bendAngleDeg: 90 });

const startOf = (document: PartDocument, edgeId: string) =>
  document.layout.outer.edges.find((edge) => edge.id === edgeId)?.start;

const featureOf = (document: PartDocument, id: string) => document.layout.features.find((feature) => feature.id === id);

describe('choosing', () => {
  it.each([
    ['a corner', { x: 0.5, y: 0.4 }, { kind: 'vertex', id: 'e1' }],
    ['an edge', { x: 40, y: 0.6 }, { kind: 'edge', id: 'e1' }],
    ['a hole by its inside', { x: 31, y: 31 }, { kind: 'hole', id: 'h1' }],
    ['a slot by its inside', { x: 68, y: 41 }, { kind: 'slot', id: 's1' }],
    ['nothing on the bare sheet', { x: 50, y: 15 }, null],
  ])('%s', (_name, at, expected) => {
    expect(new EditorDriver(plate()).click(at).editor.selection).toEqual(expected);
  });

  it('a bend, and only what the step lets one choose', () => {
    expect(new EditorDriver(bracket()).click({ x: 50.4, y: 20 }).editor.selection).toEqual({ kind: 'bend', id: 'b1' });
    expect(new EditorDriver(bracket(), ['vertex', 'edge']).click({ x: 50.4, y: 20 }).editor.selection).toBeNull();
  });

  it('reaches further with a finger than with a mouse', () => {
    const at = { x: 40, y: 4 };
    const driver = new EditorDriver(plate());
    expect(driver.click(at).editor.selection).toBeNull();
    driver.pointer = 'touch';
    expect(driver.click(at).editor.selection).toEqual({ kind: 'edge', id: 'e1' });
  });
});

describe('dragging a corner', () => {
  it('commits one command on release and nothing before', () => {
    const driver = new EditorDriver(plate());
    driver.press({ x: 100, y: 60 }).moveTo({ x: 110, y: 67.3 });
    expect(driver.commits).toHaveLength(0);
    expect(startOf(driver.drawn, 'e3')).toEqual({ x: 110, y: 67 });
    expect(startOf(driver.document, 'e3')).toEqual({ x: 100, y: 60 });
    driver.release({ x: 110, y: 67.3 });
    expect(driver.lastCommands).toEqual([{ kind: 'moveVertex', edgeId: 'e3', to: { x: 110, y: 67 } }]);
    expect(startOf(driver.undo().document, 'e3')).toEqual({ x: 100, y: 60 });
    expect(startOf(driver.redo().document, 'e3')).toEqual({ x: 110, y: 67 });
  });

  it('keeps its edges square to their neighbours and says so', () => {
    const driver = new EditorDriver(plate());
    driver.press({ x: 100, y: 60 }).moveTo({ x: 112.2, y: 61.5 });
    expect(driver.editor.snap?.kind).toBe('perpendicular');
    expect(startOf(driver.drawn, 'e3')?.y).toBe(60);
  });

  it('goes exactly where the hand is with Ctrl', () => {
    const driver = new EditorDriver(plate()).drag({ x: 100, y: 60 }, { x: 112.34, y: 61.23 }, { ctrl: true });
    expect(startOf(driver.document, 'e3')).toEqual({ x: 112.34, y: 61.23 });
  });

  it('keeps one axis with Shift', () => {
    const driver = new EditorDriver(plate()).drag({ x: 100, y: 60 }, { x: 117, y: 71 }, { shift: true });
    expect(startOf(driver.document, 'e3')).toEqual({ x: 117, y: 60 });
  });

  it('is a click while the hand stays within the threshold', () => {
    const driver = new EditorDriver(plate())
      .press({ x: 100, y: 60 })
      .moveTo({ x: 100.5, y: 60 })
      .release({ x: 100.5, y: 60 });
    expect(driver.commits).toHaveLength(0);
    expect(driver.editor.selection).toEqual({ kind: 'vertex', id: 'e3' });
  });

  it('is dropped by Escape', () => {
    const driver = new EditorDriver(plate()).press({ x: 100, y: 60 }).moveTo({ x: 120, y: 80 }).escape();
    expect(driver.editor.draft).toEqual([]);
    driver.release({ x: 120, y: 80 });
    expect(driver.commits).toHaveLength(0);
  });

  it('is refused to a viewer', () => {
    const driver = new EditorDriver(plate(), undefined, false).drag({ x: 100, y: 60 }, { x: 120, y: 80 });
    expect(driver.commits).toHaveLength(0);
  });
});

describe('dragging other things', () => {
  it('slides an edge square to itself', () => {
    const driver = new EditorDriver(plate()).drag({ x: 100, y: 20 }, { x: 108, y: 26 });
    expect(driver.lastCommands).toEqual([{ kind: 'slideEdge', edgeId: 'e2', byMm: 8 }]);
    expect(startOf(driver.document, 'e3')).toEqual({ x: 108, y: 60 });
  });

  it('moves a hole by its middle, wherever it was taken', () => {
    const driver = new EditorDriver(plate()).drag({ x: 31, y: 31 }, { x: 43.1, y: 21.1 });
    expect(featureOf(driver.document, 'h1')).toMatchObject({ centre: { x: 42, y: 20 } });
  });

  it('snaps a hole level with a slot and shows what it is level with', () => {
    const driver = new EditorDriver(plate()).press({ x: 30, y: 30 }).moveTo({ x: 42, y: 40.9 });
    expect(driver.editor.snap).toMatchObject({ kind: 'alignment', guides: [{ from: { x: 67.5, y: 40 } }] });
    expect(featureOf(driver.drawn, 'h1')).toMatchObject({ centre: { x: 42, y: 40 } });
  });

  it('moves a bend along and keeps it from edge to edge', () => {
    const driver = new EditorDriver(bracket()).drag({ x: 50, y: 10 }, { x: 45, y: 16 });
    expect(driver.document.layout.bends[0]?.line).toEqual({ from: { x: 45, y: 0 }, to: { x: 45, y: 40 } });
  });
});

describe('keys', () => {
  it.each([
    [{}, { x: 31, y: 30 }],
    [{ shift: true }, { x: 40, y: 30 }],
    [{ alt: true }, { x: 30.1, y: 30 }],
  ])('nudge with %j', (modifiers, centre) => {
    const driver = new EditorDriver(plate()).select({ kind: 'hole', id: 'h1' }).key('ArrowRight', modifiers);
    expect(featureOf(driver.document, 'h1')).toMatchObject({ centre });
  });

  it('fold repeated nudges into one step of undo', () => {
    const driver = new EditorDriver(plate()).select({ kind: 'hole', id: 'h1' });
    driver.key('ArrowUp').key('ArrowUp').key('ArrowUp');
    expect(featureOf(driver.document, 'h1')).toMatchObject({ centre: { x: 30, y: 33 } });
    expect(featureOf(driver.undo().document, 'h1')).toMatchObject({ centre: { x: 30, y: 30 } });
  });

  it('delete what is chosen and let go of it', () => {
    const driver = new EditorDriver(plate()).select({ kind: 'slot', id: 's1' }).key('Delete');
    expect(featureOf(driver.document, 's1')).toBeUndefined();
    expect(driver.editor.selection).toBeNull();
    expect(featureOf(driver.undo().document, 's1')).toBeDefined();
  });
});

describe('placing', () => {
  it('a hole of the set purpose, which stays chosen', () => {
    const driver = new EditorDriver(plate()).take('hole').moveTo({ x: 80, y: 20.1 });
    expect(driver.drawn.layout.features).toHaveLength(3);
    expect(driver.document.layout.features).toHaveLength(2);
    driver.click({ x: 80, y: 20.1 });
    expect(featureOf(driver.document, 'new-1')).toMatchObject({ centre: { x: 80, y: 20 } });
    expect(driver.editor.selection).toEqual({ kind: 'hole', id: 'new-1' });
    expect(driver.editor.tool).toBe('select');
  });

  it('a slot from end to end, or level by one click', () => {
    const dragged = new EditorDriver(plate()).take('slot').drag({ x: 20, y: 11 }, { x: 20, y: 51 });
    expect(featureOf(dragged.document, 'new-1')).toMatchObject({ from: { x: 20, y: 11 }, to: { x: 20, y: 51 } });
    const clicked = new EditorDriver(plate()).take('slot').click({ x: 50, y: 20 });
    expect(featureOf(clicked.document, 'new-1')).toMatchObject({ from: { x: 43.3, y: 20 }, to: { x: 56.7, y: 20 } });
  });

  it.each([
    [
      'two clicks',
      (driver: EditorDriver) => driver.click({ x: 40, y: 12 }).moveTo({ x: 40, y: 31 }).click({ x: 40, y: 31 }),
    ],
    ['one drag', (driver: EditorDriver) => driver.drag({ x: 40, y: 12 }, { x: 40, y: 31 })],
  ])('a bend across the sheet by %s', (_name, gesture) => {
    const driver = gesture(new EditorDriver(plate()).take('bend-line'));
    expect(driver.document.layout.bends).toEqual([
      expect.objectContaining({ id: 'new-1', line: { from: { x: 40, y: 0 }, to: { x: 40, y: 60 } }, bendAngleDeg: 90 }),
    ]);
    expect(driver.undo().document.layout.bends).toEqual([]);
  });

  it('a corner on an edge', () => {
    const driver = new EditorDriver(plate()).take('split').click({ x: 33, y: 0.5 });
    expect(driver.document.layout.outer.edges).toHaveLength(5);
    expect(startOf(driver.document, 'new-1')).toEqual({ x: 33, y: 0 });
  });

  it.each(['hole', 'slot', 'bend-line', 'split'] as const)('nothing after Escape with the %s tool', (tool) => {
    const driver = new EditorDriver(plate()).take(tool).press({ x: 20, y: 20 }).escape();
    driver.escape();
    expect(driver.editor.tool).toBe('select');
    expect(driver.editor.draft).toEqual([]);
    expect(driver.commits).toHaveLength(0);
  });
});

describe('bends beside a changed outline', () => {
  it('still run from edge to edge, in the same step of undo', () => {
    const driver = new EditorDriver(bracket()).drag({ x: 20, y: 40 }, { x: 20, y: 55 });
    expect(driver.document.layout.bends[0]?.line).toEqual({ from: { x: 50, y: 0 }, to: { x: 50, y: 55 } });
    expect(driver.undo().document).toEqual(bracket());
  });
});
