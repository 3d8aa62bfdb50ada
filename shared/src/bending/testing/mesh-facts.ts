import type { Mesh } from '../development';

/** What a closed mesh must satisfy, counted. */
export interface MeshFacts {
  /** Edges whose counterpart is missing; 0 for a closed mesh with one sense. */
  readonly openEdges: number;
  readonly volumeMm3: number;
  readonly isFinite: boolean;
  readonly min: readonly [number, number, number];
  readonly max: readonly [number, number, number];
}

/** Counts open edges and volume of a mesh; corners within 0.00001 mm are one. */
export function meshFacts(mesh: Mesh): MeshFacts {
  const at = (index: number): readonly [number, number, number] => [
    mesh.positions[3 * index] ?? 0,
    mesh.positions[3 * index + 1] ?? 0,
    mesh.positions[3 * index + 2] ?? 0,
  ];
  const names = new Map<string, number>();
  const nameOf = (index: number): number => {
    const key = at(index)
      .map((value) => String(Math.round(value * 100_000)))
      .join(' ');
    const known = names.get(key);
    if (known !== undefined) return known;
    names.set(key, names.size);
    return names.size - 1;
  };
  const travelled = new Map<string, number>();
  let volume = 0;
  for (let first = 0; first + 2 < mesh.indices.length; first += 3) {
    const corners = [mesh.indices[first] ?? 0, mesh.indices[first + 1] ?? 0, mesh.indices[first + 2] ?? 0] as const;
    const [a, b, c] = [at(corners[0]), at(corners[1]), at(corners[2])];
    volume +=
      (a[0] * (b[1] * c[2] - b[2] * c[1]) - a[1] * (b[0] * c[2] - b[2] * c[0]) + a[2] * (b[0] * c[1] - b[1] * c[0])) /
      6;
    const ids = corners.map(nameOf);
    ids.forEach((from, side) => {
      const to = ids[(side + 1) % 3] ?? from;
      if (from === to) return;
      travelled.set(`${String(from)} ${String(to)}`, (travelled.get(`${String(from)} ${String(to)}`) ?? 0) + 1);
    });
  }
  let openEdges = 0;
  for (const [edge, times] of travelled) {
    const [from, to] = edge.split(' ');
    if ((travelled.get(`${String(to)} ${String(from)}`) ?? 0) !== times) openEdges += 1;
  }
  const extent = (pick: (...values: number[]) => number): readonly [number, number, number] => {
    const axis = (offset: number): number =>
      mesh.positions.filter((_, index) => index % 3 === offset).reduce((best, value) => pick(best, value));
    return [axis(0), axis(1), axis(2)];
  };
  return {
    openEdges,
    volumeMm3: volume,
    isFinite: [...mesh.positions, ...mesh.normals].every(Number.isFinite),
    min: extent(Math.min),
    max: extent(Math.max),
  };
}
