import { line } from '@foldwright/shared/geometry/segment';
import { type SnapCandidates, type SnapOptions, snap, squareRays } from './snap';

const NONE: SnapCandidates = { points: [], edges: [], rays: [] };
const options = (over: Partial<SnapOptions> = {}): SnapOptions => ({
  toleranceMm: 2,
  gridMm: null,
  isSuspended: false,
  lockFrom: null,
  ...over,
});
const corner = { kind: 'endpoint', point: { x: 10, y: 10 } } as const;

describe('snap', () => {
  it.each([
    [
      'a corner before all else',
      { x: 11, y: 9 },
      { ...NONE, points: [corner] },
      {},
      { kind: 'endpoint', point: { x: 10, y: 10 } },
    ],
    [
      'a level line with a corner',
      { x: 40, y: 11 },
      { ...NONE, points: [corner] },
      {},
      { kind: 'alignment', point: { x: 40, y: 10 } },
    ],
    [
      'where two lines cross',
      { x: 11, y: 29.5 },
      { ...NONE, points: [corner, { kind: 'centre' as const, point: { x: 50, y: 30 } }] },
      {},
      { kind: 'alignment', point: { x: 10, y: 30 } },
    ],
    [
      'an edge',
      { x: 5, y: 1 },
      { ...NONE, edges: [line({ x: 0, y: 0 }, { x: 20, y: 0 })] },
      {},
      { kind: 'on-edge', point: { x: 5, y: 0 } },
    ],
    ['the grid', { x: 5.2, y: 3.7 }, NONE, { gridMm: 1 }, { kind: 'grid', point: { x: 5, y: 4 } }],
    ['nothing', { x: 5.2, y: 3.7 }, NONE, {}, { kind: 'none', point: { x: 5.2, y: 3.7 } }],
    [
      'nothing while suspended',
      { x: 11, y: 9 },
      { ...NONE, points: [corner] },
      { gridMm: 1, isSuspended: true },
      { kind: 'none', point: { x: 11, y: 9 } },
    ],
    [
      'one axis while locked',
      { x: 33.3, y: 4 },
      NONE,
      { gridMm: 1, lockFrom: { x: 0, y: 0 } },
      { kind: 'alignment', point: { x: 33, y: 0 } },
    ],
    [
      'a corner’s height while locked',
      { x: 3, y: 11 },
      { ...NONE, points: [corner] },
      { lockFrom: { x: 0, y: 0 } },
      { kind: 'alignment', point: { x: 0, y: 10 } },
    ],
  ] as const)('draws to %s', (_name, at, candidates, over, expected) => {
    expect(snap(at, candidates, options(over))).toMatchObject(expected);
  });

  it('makes an edge square to its slanting neighbour', () => {
    const rays = squareRays({ x: 0, y: 0 }, { x: -10, y: -10 });
    const result = snap({ x: -9, y: 10.5 }, { ...NONE, rays }, options());
    expect(result.kind).toBe('perpendicular');
    expect(result.point.x).toBeCloseTo(-9.75, 9);
    expect(result.point.y).toBeCloseTo(9.75, 9);
    expect(result.guides).toHaveLength(1);
  });
});
