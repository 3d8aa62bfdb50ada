import { orientation } from './orientation';

/** The same determinant in whole numbers: coordinates are multiples of 2^-53. */
function exact(a: readonly [number, number], b: readonly [number, number], c: readonly [number, number]): number {
  const whole = (value: number): bigint => BigInt(value * 2 ** 53);
  const [ax, ay, bx, by, cx, cy] = [...a, ...b, ...c].map(whole) as [bigint, bigint, bigint, bigint, bigint, bigint];
  const determinant = (bx - ax) * (cy - ay) - (by - ay) * (cx - ax);
  return determinant > 0n ? 1 : determinant < 0n ? -1 : 0;
}

describe('orientation', () => {
  it('is 1 to the left with y up', () => {
    expect(orientation({ x: 0, y: 0 }, { x: 1, y: 0 }, { x: 0, y: 1 })).toBe(1);
    expect(orientation({ x: 0, y: 0 }, { x: 1, y: 0 }, { x: 0, y: -1 })).toBe(-1);
    expect(orientation({ x: 0, y: 0 }, { x: 1, y: 1 }, { x: 2, y: 2 })).toBe(0);
  });

  // Source: the classic test of nearly collinear points, Kettner et al., Classroom examples of robustness problems (2008).
  it('is right where plain arithmetic is not', () => {
    for (let i = 0; i < 32; i += 1) {
      for (let j = 0; j < 32; j += 1) {
        const near = [0.5 + i * 2 ** -53, 0.5 + j * 2 ** -53] as const;
        const found = orientation({ x: near[0], y: near[1] }, { x: 12, y: 12 }, { x: 24, y: 24 });
        expect(found).toBe(exact(near, [12, 12], [24, 24]));
      }
    }
  });
});
