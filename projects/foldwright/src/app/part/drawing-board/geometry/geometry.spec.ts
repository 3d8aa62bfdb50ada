import { starterDocument } from '@foldwright/shared/part/starter-document';
import { creaseAcross, creaseBesideEdge } from './crease';
import { withBendsKept } from './keep-bends';
import { edgesOfLayout, findEdge, layoutBounds } from './layout-edges';
import { circlePath, loopPath } from './svg-path';

const bracket = starterDocument({ shape: 'l-bracket', baseMm: 50, flangeMm: 30, widthMm: 40, bendAngleDeg: 90 });
const { layout } = bracket;

describe('layout edges', () => {
  it('close the chain and know their neighbours', () => {
    expect(edgesOfLayout(layout).map(({ segment }) => segment.to)).toEqual([
      { x: 80, y: 0 },
      { x: 80, y: 40 },
      { x: 0, y: 40 },
      { x: 0, y: 0 },
    ]);
    expect(findEdge(layout, 'e1')?.previous.id).toBe('e4');
    expect(findEdge(layout, 'nowhere')).toBeNull();
    expect(layoutBounds(layout)).toEqual({ min: { x: 0, y: 0 }, max: { x: 80, y: 40 } });
  });
});

describe('creases', () => {
  it('run from edge to edge at any slant', () => {
    expect(creaseAcross(layout, { x: 20, y: 20 }, { x: 1, y: 1 })).toEqual({
      from: { x: 0, y: 0 },
      to: { x: 40, y: 40 },
    });
    expect(creaseAcross(layout, { x: 20, y: 10 }, { x: 0, y: -3 })).toEqual({
      from: { x: 20, y: 40 },
      to: { x: 20, y: 0 },
    });
  });

  it('do not exist beside the sheet', () => {
    expect(creaseAcross(layout, { x: 20, y: 90 }, { x: 1, y: 0 })).toBeNull();
  });

  it('lie as far inside an edge as was typed', () => {
    expect(creaseBesideEdge(layout, 'e4', 12)).toEqual({ from: { x: 12, y: 40 }, to: { x: 12, y: 0 } });
    expect(creaseBesideEdge(layout, 'e4', 500)).toBeNull();
    expect(creaseBesideEdge(layout, 'e4', 0)).toBeNull();
  });
});

describe('bends kept from edge to edge', () => {
  it('follow an outline that grows and one that shrinks', () => {
    for (const byMm of [15, -10]) {
      const commands = withBendsKept(bracket, [{ kind: 'slideEdge', edgeId: 'e3', byMm }]);
      expect(commands[1]).toMatchObject({
        kind: 'changeBend',
        bendId: 'b1',
        bend: { line: { to: { x: 50, y: 40 + byMm } } },
      });
    }
  });

  it('leave alone what still reaches', () => {
    const slide = { kind: 'slideEdge', edgeId: 'e2', byMm: 5 } as const;
    expect(withBendsKept(bracket, [slide])).toEqual([slide]);
  });
});

describe('path data', () => {
  it('turns counter-clockwise arcs with a positive sweep, y up', () => {
    const arc = {
      kind: 'arc',
      from: { x: 1, y: 0 },
      to: { x: 0, y: 1 },
      centre: { x: 0, y: 0 },
      clockwise: false,
    } as const;
    const back = { kind: 'line', from: { x: 0, y: 1 }, to: { x: 1, y: 0 } } as const;
    expect(loopPath([arc, back])).toBe('M1 0A1 1 0 0 1 0 1L1 0Z');
  });

  it('draws a circle as two arcs', () => {
    expect(circlePath({ x: 5, y: 0 }, 4)).toBe('M3 0A2 2 0 0 0 7 0A2 2 0 0 0 3 0Z');
  });
});
