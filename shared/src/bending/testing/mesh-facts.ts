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
  const nameOf = cornerNames(at);
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

type Corner = readonly [number, number, number];

const CELL_MM = 0.001;
const SAME_MM = 0.00001;

/** Numbers corners so that those within `SAME_MM` share one, whichever side of a cell's edge they fall on. */
function cornerNames(at: (index: number) => Corner): (index: number) => number {
  const cells = new Map<string, { readonly corner: Corner; readonly name: number }[]>();
  let count = 0;
  const steps = [-1, 0, 1];
  return (index) => {
    const corner = at(index);
    const cell = corner.map((value) => Math.floor(value / CELL_MM));
    for (const dx of steps) {
      for (const dy of steps) {
        for (const dz of steps) {
          const key = `${String((cell[0] ?? 0) + dx)} ${String((cell[1] ?? 0) + dy)} ${String((cell[2] ?? 0) + dz)}`;
          const known = cells
            .get(key)
            ?.find(
              (one) =>
                Math.hypot(one.corner[0] - corner[0], one.corner[1] - corner[1], one.corner[2] - corner[2]) <= SAME_MM,
            );
          if (known !== undefined) return known.name;
        }
      }
    }
    const key = cell.map(String).join(' ');
    cells.set(key, [...(cells.get(key) ?? []), { corner, name: count }]);
    count += 1;
    return count - 1;
  };
}
