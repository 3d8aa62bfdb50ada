import { type PaintFace, paintOrder } from './paint-order';
import { TO_EYE } from './axonometry';

const flat = (heightMm: number, sizeMm = 10): PaintFace => ({
  kind: 'face',
  normal: { x: 0, y: 0, z: 1 },
  points: [
    { x: 0, y: 0, z: heightMm },
    { x: sizeMm, y: 0, z: heightMm },
    { x: sizeMm, y: sizeMm, z: heightMm },
    { x: 0, y: sizeMm, z: heightMm },
  ],
});

describe('paintOrder', () => {
  it('paints what lies lower first, in whatever order it came', () => {
    const [low, middle, high] = [flat(0), flat(5), flat(9)];
    for (const given of [
      [low, middle, high],
      [high, low, middle],
      [middle, high, low],
    ]) {
      expect(paintOrder(given)).toEqual([low, middle, high]);
    }
  });

  it('cuts a face that reaches through another and keeps all of its area', () => {
    const wall: PaintFace = {
      kind: 'face',
      normal: { x: 0, y: -1, z: 0 },
      points: [
        { x: 2, y: 5, z: -4 },
        { x: 8, y: 5, z: -4 },
        { x: 8, y: 5, z: 4 },
        { x: 2, y: 5, z: 4 },
      ],
    };
    const painted = paintOrder([flat(0, 40), wall]);
    expect(painted).toHaveLength(3);
    const heights = painted.map((item) => (item.kind === 'face' ? item.points.map((point) => point.z) : []));
    expect(Math.max(...(heights[0] ?? []))).toBe(0);
    expect(Math.min(...(heights[2] ?? []))).toBe(0);
  });

  it('paints a line in a face’s plane right after the face', () => {
    const line = { kind: 'line', from: { x: 0, y: 0, z: 5 }, to: { x: 10, y: 0, z: 5 } } as const;
    expect(paintOrder([line, flat(9), flat(5)])).toEqual([flat(5), line, flat(9)]);
  });
});

describe('the eye', () => {
  it('looks from a direction of length one', () => {
    expect(Math.hypot(TO_EYE.x, TO_EYE.y, TO_EYE.z)).toBeCloseTo(1, 12);
  });
});
