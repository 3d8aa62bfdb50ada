const TWO_32 = 2 ** 32;

/** A stream of numbers that follows from its seed alone. */
export interface SeededNumbers {
  /** Even in 0 < u < 1. */
  uniform(): number;
  /** Normal with mean 0 and standard deviation 1. */
  normal(): number;
}

/**
 * Seeded numbers: 32-bit small fast counter generator (four words of state, period at least 2^32), normals by the polar method.
 * Source: C. Doty-Humphrey, PractRand (sfc32); G. Marsaglia and T. A. Bray 1964 (polar method).
 * @param seed any finite number; its integer part modulo 2^32 counts.
 * @throws RangeError for a seed that is not finite
 */
export function seededNumbers(seed: number): SeededNumbers {
  if (!Number.isFinite(seed)) throw new RangeError(`A seed is a finite number, got ${String(seed)}`);
  let [a, b, c, counter] = [0x9e3779b9, 0x243f6a88, Math.trunc(seed) | 0, 1];
  const next = (): number => {
    const sum = (((a + b) | 0) + counter) | 0;
    counter = (counter + 1) | 0;
    a = b ^ (b >>> 9);
    b = (c + (c << 3)) | 0;
    c = (((c << 21) | (c >>> 11)) + sum) | 0;
    return sum >>> 0;
  };
  // Neighbouring seeds are far apart only after the state has been stirred.
  for (let round = 0; round < 15; round += 1) next();
  const uniform = (): number => (next() + 0.5) / TWO_32;
  let spare: number | null = null;
  const normal = (): number => {
    if (spare !== null) {
      const kept = spare;
      spare = null;
      return kept;
    }
    for (;;) {
      const x = 2 * uniform() - 1;
      const y = 2 * uniform() - 1;
      const size = x * x + y * y;
      if (size >= 1 || size === 0) continue;
      const factor = Math.sqrt((-2 * Math.log(size)) / size);
      spare = y * factor;
      return x * factor;
    }
  };
  return { uniform, normal };
}
