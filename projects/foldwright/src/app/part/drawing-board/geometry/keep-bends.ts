import type { BendDeclaration, Layout } from '@foldwright/shared/bending/layout';
import { nearestOnSegment } from '@foldwright/shared/geometry/segment';
import { JOIN_MM } from '@foldwright/shared/geometry/tolerance';
import type { Point } from '@foldwright/shared/geometry/point';
import { distance, subtract } from '@foldwright/shared/geometry/vector';
import type { PartCommand } from '@foldwright/shared/part/commands';
import { applyCommands } from '@foldwright/shared/part/apply-command';
import type { PartDocument } from '@foldwright/shared/part/part-document';
import { creaseAcross } from './crease';
import { edgesOfLoop } from './layout-edges';

/**
 * Commands together with those that keep every bend running from edge to edge: a bend that reached the outline on both
 * sides before, and would not after, is cut to the new outline in the same step of undo.
 * @throws CommandRefusal when the commands themselves cannot be applied
 */
export function withBendsKept(before: PartDocument, commands: readonly PartCommand[]): readonly PartCommand[] {
  const after = applyCommands(before, commands);
  if (after.layout.outer === before.layout.outer) return commands;
  const mended = after.layout.bends.flatMap((bend): readonly PartCommand[] => {
    if (!reachesAcross(before.layout, bend) || reachesAcross(after.layout, bend)) return [];
    const line = recut(after.layout, bend);
    return line === null ? [] : [{ kind: 'changeBend', bendId: bend.id, bend: { ...bend, line } }];
  });
  return [...commands, ...mended];
}

function reachesAcross(layout: Layout, bend: BendDeclaration): boolean {
  return isOnOutline(layout, bend.line.from) && isOnOutline(layout, bend.line.to);
}

function isOnOutline(layout: Layout, point: Point): boolean {
  return edgesOfLoop(layout.outer).some(({ segment }) => nearestOnSegment(segment, point).distanceMm <= JOIN_MM / 10);
}

function recut(layout: Layout, bend: BendDeclaration): BendDeclaration['line'] | null {
  const { from, to } = bend.line;
  if (distance(from, to) === 0) return null;
  const middle = { x: (from.x + to.x) / 2, y: (from.y + to.y) / 2 };
  return creaseAcross(layout, middle, subtract(to, from));
}
