import { NO_MODIFIERS } from '../tools/tool';
import type { Viewport } from '../viewport';
import { BoardPointers, type PointerInput } from './board-pointers';

const VIEW: Viewport = { pxPerMm: 2, origin: { xPx: 100, yPx: 200 } };

const at = (xPx: number, yPx: number, over: Partial<PointerInput> = {}): PointerInput => ({
  pointerId: 1,
  pointer: 'mouse',
  atPx: { xPx, yPx },
  modifiers: NO_MODIFIERS,
  isPanning: false,
  ...over,
});

describe('BoardPointers', () => {
  it('tells one pointer’s work in millimetres, y up', () => {
    const pointers = new BoardPointers();
    expect(pointers.press(at(120, 180), VIEW)).toEqual([
      { kind: 'event', event: expect.objectContaining({ kind: 'press', at: { x: 10, y: 10 } }) },
    ]);
    expect(pointers.release(at(140, 160), VIEW)).toEqual([
      { kind: 'event', event: expect.objectContaining({ kind: 'release', at: { x: 20, y: 20 } }) },
    ]);
  });

  it('pans with the space bar and tells the tool nothing', () => {
    const pointers = new BoardPointers();
    expect(pointers.press(at(10, 10, { isPanning: true }), VIEW)).toEqual([]);
    expect(pointers.move(at(15, 4, { isPanning: true }), VIEW)).toEqual([{ kind: 'pan', xPx: 5, yPx: -6 }]);
    expect(pointers.release(at(15, 4, { isPanning: true }), VIEW)).toEqual([]);
  });

  it('hovers with a mouse and not with a finger', () => {
    expect(new BoardPointers().move(at(1, 1), VIEW)).toHaveLength(1);
    expect(new BoardPointers().move(at(1, 1, { pointer: 'touch' }), VIEW)).toEqual([]);
  });

  it('drops the work of the first finger when a second comes, then pinches about the middle', () => {
    const pointers = new BoardPointers();
    const finger = (pointerId: number): Partial<PointerInput> => ({ pointerId, pointer: 'touch' });
    pointers.press(at(0, 0, finger(1)), VIEW);
    expect(pointers.press(at(100, 0, finger(2)), VIEW)).toEqual([{ kind: 'event', event: { kind: 'cancel' } }]);
    expect(pointers.move(at(200, 0, finger(2)), VIEW)).toEqual([
      { kind: 'pan', xPx: 50, yPx: 0 },
      { kind: 'zoom', factor: 2, at: { xPx: 100, yPx: 0 } },
    ]);
    expect(pointers.release(at(200, 0, finger(2)), VIEW)).toEqual([]);
    expect(pointers.move(at(5, 5, finger(1)), VIEW)).toEqual([]);
    pointers.release(at(5, 5, finger(1)), VIEW);
    expect(pointers.press(at(5, 5, finger(1)), VIEW)).toHaveLength(1);
  });

  it('cancels when the browser takes the pointer away', () => {
    const pointers = new BoardPointers();
    pointers.press(at(0, 0), VIEW);
    expect(pointers.lose(1)).toEqual([{ kind: 'event', event: { kind: 'cancel' } }]);
    expect(pointers.lose(1)).toEqual([]);
  });
});
