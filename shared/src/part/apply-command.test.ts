import type { PartCommand } from './commands';
import { applyCommand, applyCommands } from './apply-command';
import { CommandRefusal } from './command-refusal';
import { edgeLengthMm } from './outline-edge-sizes';
import type { PartDocument } from './part-document';
import { starterDocument } from './starter-document';

const plate = starterDocument({ shape: 'flat-plate', widthMm: 100, heightMm: 60 });

function refusalOf(document: PartDocument, command: PartCommand): string {
  try {
    applyCommand(document, command);
  } catch (error) {
    if (error instanceof CommandRefusal) return error.code;
    throw error;
  }
  return 'accepted';
}

const corners = (document: PartDocument) => document.layout.outer.edges.map(({ start }) => [start.x, start.y]);

describe('applyCommand on the outline', () => {
  it('moves a corner', () => {
    const moved = applyCommand(plate, { kind: 'moveVertex', edgeId: 'e3', to: { x: 110, y: 65 } });
    expect(corners(moved)).toEqual([
      [0, 0],
      [100, 0],
      [110, 65],
      [0, 60],
    ]);
    expect(corners(plate)[2]).toEqual([100, 60]);
  });

  it('keeps square corners square when an edge is given a length', () => {
    const longer = applyCommand(plate, { kind: 'setEdgeLength', edgeId: 'e1', lengthMm: 120, hold: 'start' });
    expect(corners(longer)).toEqual([
      [0, 0],
      [120, 0],
      [120, 60],
      [0, 60],
    ]);
    const heldAtEnd = applyCommand(plate, { kind: 'setEdgeLength', edgeId: 'e1', lengthMm: 120, hold: 'end' });
    expect(corners(heldAtEnd)).toEqual([
      [-20, 0],
      [100, 0],
      [100, 60],
      [-20, 60],
    ]);
  });

  it('measures and sets an edge between rounded corners by the sharp corners they replace', () => {
    const rounded = applyCommands(plate, [
      { kind: 'roundCorner', edgeId: 'e1', radiusMm: 8, newEdgeId: 'r1' },
      { kind: 'roundCorner', edgeId: 'e2', radiusMm: 5, newEdgeId: 'r2' },
    ]);
    expect(edgeLengthMm(rounded.layout.outer, 'e1')).toBeCloseTo(100, 9);
    expect(edgeLengthMm(rounded.layout.outer, 'r1')).toBeCloseTo((8 * Math.PI) / 2, 9);
    const shorter = applyCommand(rounded, { kind: 'setEdgeLength', edgeId: 'e1', lengthMm: 84, hold: 'start' });
    expect(edgeLengthMm(shorter.layout.outer, 'e1')).toBeCloseTo(84, 9);
    expect(edgeLengthMm(shorter.layout.outer, 'e3')).toBeCloseTo(84, 9);
    expect(edgeLengthMm(shorter.layout.outer, 'r2')).toBeCloseTo((5 * Math.PI) / 2, 9);
    expect(edgeLengthMm(shorter.layout.outer, 'e2')).toBeCloseTo(60, 9);
  });

  it('slides an edge out along its neighbours, oblique ones too', () => {
    const trapezoid = applyCommand(plate, { kind: 'moveVertex', edgeId: 'e3', to: { x: 80, y: 60 } });
    const slid = applyCommand(trapezoid, { kind: 'slideEdge', edgeId: 'e3', byMm: 30 });
    expect(corners(slid)[2]?.[0]).toBeCloseTo(70, 9);
    expect(corners(slid)[2]?.[1]).toBeCloseTo(90, 9);
    expect(corners(slid)[3]?.[1]).toBeCloseTo(90, 9);
  });

  it('slides an edge of a cut-out away from the metal, whichever way the loop runs', () => {
    const window = { x: 40, y: 20 };
    const points = [window, { x: 60, y: 20 }, { x: 60, y: 40 }, { x: 40, y: 40 }];
    for (const order of [points, [...points].reverse()]) {
      const edges = order.map((start, index) => ({ id: `c${index}`, start, bulge: 0 }));
      const cut = applyCommand(plate, { kind: 'addCutout', loop: { id: 'cut', edges } });
      const slid = applyCommand(cut, { kind: 'slideEdge', edgeId: 'c0', byMm: 5 });
      const area = (document: PartDocument) => {
        const [xs, ys] = [0, 1].map((axis) => {
          const values = document.layout.cutouts[0]?.edges.map(({ start }) => (axis === 0 ? start.x : start.y)) ?? [];
          return Math.max(...values) - Math.min(...values);
        });
        return (xs ?? 0) * (ys ?? 0);
      };
      // Away from the metal is into the opening: it becomes smaller.
      expect(area(slid)).toBeCloseTo(20 * 15, 9);
    }
  });

  it('splits an arc into two arcs of the same circle and joins them again', () => {
    const bowed = applyCommand(plate, { kind: 'setEdgeBulge', edgeId: 'e2', bulge: 0.4 });
    const split = applyCommand(bowed, {
      kind: 'insertVertex',
      edgeId: 'e2',
      newEdge: { id: 'n', start: { x: 130, y: 25 }, bulge: 0 },
    });
    const lengths = ['e2', 'n'].map((id) => edgeLengthMm(split.layout.outer, id) ?? 0);
    expect((lengths[0] ?? 0) + (lengths[1] ?? 0)).toBeCloseTo(edgeLengthMm(bowed.layout.outer, 'e2') ?? 0, 6);
    const joined = applyCommand(split, { kind: 'removeVertex', edgeId: 'n' });
    expect(joined.layout.outer.edges.map(({ id }) => id)).toEqual(['e1', 'e2', 'e3', 'e4']);
    expect(joined.layout.outer.edges[1]?.bulge).toBeCloseTo(0.4, 9);
  });

  it.each<[string, PartCommand, string]>([
    ['an edge that is not there', { kind: 'slideEdge', edgeId: 'x', byMm: 1 }, 'unknownEntity'],
    [
      'a rounding longer than its edges',
      { kind: 'roundCorner', edgeId: 'e1', radiusMm: 61, newEdgeId: 'r' },
      'impossibleSize',
    ],
    ['an id that is taken', { kind: 'roundCorner', edgeId: 'e1', radiusMm: 5, newEdgeId: 'e2' }, 'duplicateId'],
    ['an edge slid through its opposite', { kind: 'slideEdge', edgeId: 'e3', byMm: -61 }, 'impossibleSize'],
    ['a corner out of reach', { kind: 'moveVertex', edgeId: 'e1', to: { x: 5001, y: 0 } }, 'limitExceeded'],
    ['a corner at nowhere', { kind: 'moveVertex', edgeId: 'e1', to: { x: Number.NaN, y: 0 } }, 'limitExceeded'],
    [
      'a corner on a corner',
      { kind: 'insertVertex', edgeId: 'e1', newEdge: { id: 'n', start: { x: 100, y: 0 }, bulge: 0 } },
      'impossibleSize',
    ],
  ])('refuses %s', (_, command, code) => {
    expect(refusalOf(plate, command)).toBe(code);
  });

  it('refuses to go below three corners', () => {
    const triangle = applyCommand(plate, { kind: 'removeVertex', edgeId: 'e4' });
    expect(refusalOf(triangle, { kind: 'removeVertex', edgeId: 'e1' })).toBe('tooFewEdges');
  });
});

describe('applyCommand on holes, slots and bends', () => {
  const hole = {
    kind: 'hole',
    id: 'h1',
    centre: { x: 20, y: 20 },
    purpose: { kind: 'clearance', thread: 'M6', fit: 'medium' },
  } as const;
  const slot = { kind: 'slot', id: 's1', from: { x: 40, y: 20 }, to: { x: 50, y: 20 }, widthMm: 6 } as const;

  it('adds, moves, sizes and takes away', () => {
    const drilled = applyCommands(plate, [
      { kind: 'addFeature', feature: hole },
      { kind: 'addFeature', feature: slot },
      { kind: 'moveFeature', featureId: 'h1', by: { x: 1, y: -2 } },
      { kind: 'setHolePurpose', featureId: 'h1', purpose: { kind: 'rivet-nut', thread: 'M6' } },
      { kind: 'setSlotSize', featureId: 's1', lengthMm: 26, widthMm: 6.6 },
    ]);
    expect(drilled.layout.features[0]).toEqual({
      ...hole,
      centre: { x: 21, y: 18 },
      purpose: { kind: 'rivet-nut', thread: 'M6' },
    });
    // 26 overall less one width of 6.6 leaves 19.4 between the end centres, about the same middle (45, 20).
    expect(drilled.layout.features[1]).toMatchObject({ widthMm: 6.6 });
    const changed = drilled.layout.features[1];
    expect(changed?.kind === 'slot' && [changed.from.x, changed.to.x]).toEqual([35.3, 54.7]);
    const emptied = applyCommands(drilled, [
      { kind: 'removeFeature', featureId: 'h1' },
      { kind: 'removeFeature', featureId: 's1' },
    ]);
    expect(emptied).toEqual(plate);
  });

  it.each<[string, PartCommand, string]>([
    [
      'a thread without a rivet nut',
      { kind: 'setHolePurpose', featureId: 'h1', purpose: { kind: 'rivet-nut', thread: 'M2' } },
      'unknownThread',
    ],
    ['a slot as wide as long', { kind: 'setSlotSize', featureId: 's1', lengthMm: 6, widthMm: 6 }, 'impossibleSize'],
    ['a hole sized as a slot', { kind: 'setSlotSize', featureId: 'h1', lengthMm: 9, widthMm: 6 }, 'unknownEntity'],
    ['a bend that is not there', { kind: 'removeBend', bendId: 'b9' }, 'unknownEntity'],
    ['a second hole of one id', { kind: 'addFeature', feature: hole }, 'duplicateId'],
  ])('refuses %s', (_, command, code) => {
    const drilled = applyCommands(plate, [
      { kind: 'addFeature', feature: hole },
      { kind: 'addFeature', feature: slot },
    ]);
    expect(refusalOf(drilled, command)).toBe(code);
  });

  it('stretches the layout when callipers overrule the photo, and back', () => {
    const drilled = applyCommand(plate, { kind: 'addFeature', feature: hole });
    const stretched = applyCommand(drilled, { kind: 'setCalibration', scaleX: 1.01, scaleY: 1 });
    expect(corners(stretched)[1]).toEqual([101, 0]);
    expect(stretched.layout.features[0]).toMatchObject({ centre: { x: 20.2, y: 20 }, purpose: hole.purpose });
    const back = applyCommand(stretched, { kind: 'setCalibration', scaleX: 1, scaleY: 1 });
    expect(corners(back)[1]?.[0]).toBeCloseTo(100, 9);
  });
});
