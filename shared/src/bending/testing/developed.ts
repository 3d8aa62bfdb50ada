import { developLayout } from '../develop';
import type { Development } from '../development';
import type { Layout } from '../layout';
import { sampleStock } from './sample-layouts';

/** The development of a layout that must be possible. */
export function developed(
  layout: Layout,
  stock = sampleStock(),
  template: Parameters<typeof developLayout>[1] = null,
): Development {
  const result = developLayout(layout, template, stock);
  if (!result.ok) throw new Error(result.problems.map(({ message }) => message).join(' '));
  return result.development;
}

/** Width and height of the blank, mm. */
export function sizeOf({ flat }: Development): readonly [number, number] {
  return [flat.bounds.max.x - flat.bounds.min.x, flat.bounds.max.y - flat.bounds.min.y];
}

/** Sizes of the formed part along x, y and z, mm. */
export function boxOf({ formedBox }: Development): readonly number[] {
  return (['x', 'y', 'z'] as const).map((axis) => formedBox.max[axis] - formedBox.min[axis]);
}
