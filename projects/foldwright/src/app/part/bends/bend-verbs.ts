import type { RuleVerb } from '@foldwright/ui/steel-rule/steel-rule';
import type { EntityRef } from '../drawing-board/geometry/entity';
import type { ToolName } from '../drawing-board/tools/tool';

/** What can be typed about the chosen thing. */
export type BendField = 'bend' | 'beside-edge' | 'slide-bend';

/** Everything that the rule offers in the bends step. */
export type BendVerb = BendField | 'bend-line-tool' | 'turn-over' | 'take-away';

/** The field that stands at a thing as soon as it is chosen. */
export function usualBendField(selection: EntityRef | null): BendField | null {
  if (selection?.kind === 'bend') return 'bend';
  return selection?.kind === 'edge' ? 'beside-edge' : null;
}

/** The verbs of what is chosen, and only those. */
export function bendVerbs(selection: EntityRef | null, field: BendField | null, tool: ToolName): readonly RuleVerb[] {
  const verb = (id: BendVerb, label: string, icon: RuleVerb['icon'], key: string): RuleVerb => ({
    id,
    label,
    icon,
    key,
    primary: id === field || id === `${tool}-tool`,
  });
  switch (selection?.kind) {
    case 'bend':
      return [
        verb('bend', 'Angle and sizes', 'angle', 'A'),
        verb('turn-over', 'Other way', 'bend-away', 'W'),
        verb('slide-bend', 'Slide', 'slide', 'S'),
        verb('take-away', 'Take away', 'delete', 'Del'),
      ];
    case 'edge':
      return [verb('beside-edge', 'Bend beside', 'flange', 'F'), verb('bend-line-tool', 'Draw a bend', 'scribe', 'B')];
    default:
      return [verb('bend-line-tool', 'Draw a bend', 'scribe', 'B')];
  }
}
