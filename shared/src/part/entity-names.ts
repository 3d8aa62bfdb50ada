import type { Layout } from '../bending/layout';

/**
 * Names by which people call the things of a layout: edges E1, E2, ... (outer first, then cut-outs), cut-outs C1, ...,
 * holes H1, ..., slots S1, ..., bends B1, ..., each in document order.
 * @returns name by id
 */
export function entityNames(layout: Layout): ReadonlyMap<string, string> {
  const names = new Map<string, string>();
  const edges = [layout.outer, ...layout.cutouts].flatMap((loop) => loop.edges);
  edges.forEach(({ id }, index) => names.set(id, `E${index + 1}`));
  layout.cutouts.forEach(({ id }, index) => names.set(id, `C${index + 1}`));
  const count = { hole: 0, slot: 0 };
  for (const { id, kind } of layout.features) {
    count[kind] += 1;
    names.set(id, `${kind === 'hole' ? 'H' : 'S'}${count[kind]}`);
  }
  layout.bends.forEach(({ id }, index) => names.set(id, `B${index + 1}`));
  return names;
}
