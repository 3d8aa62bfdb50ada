import type { Layout } from '@foldwright/shared/bending/layout';
import type { RuleVerb } from '@foldwright/ui/steel-rule/steel-rule';
import type { EntityRef } from '../drawing-board/geometry/entity';
import { findEdge } from '../drawing-board/geometry/layout-edges';
import type { ToolName } from '../drawing-board/tools/tool';

/** What can be typed about the chosen thing. */
export type OutlineField = 'length' | 'slide' | 'arc-radius' | 'corner-radius' | 'place' | 'hole-size' | 'slot-size';

/** Everything that the rule offers in the outline step. */
export type OutlineVerb =
  OutlineField | 'square-up' | 'split' | 'straighten' | 'take-away' | 'hole-tool' | 'slot-tool' | 'split-tool';

/** The field that stands at a thing as soon as it is chosen. */
export function usualField(layout: Layout, selection: EntityRef | null): OutlineField | null {
  switch (selection?.kind) {
    case 'edge':
      return findEdge(layout, selection.id)?.segment.kind === 'arc' ? 'arc-radius' : 'length';
    case 'vertex':
      return 'place';
    case 'hole':
      return 'hole-size';
    case 'slot':
      return 'slot-size';
    default:
      return null;
  }
}

/** The verbs of what is chosen, and only those. `field` is the one that is being typed. */
export function outlineVerbs(
  layout: Layout,
  selection: EntityRef | null,
  field: OutlineField | null,
  tool: ToolName,
): readonly RuleVerb[] {
  const verb = (id: OutlineVerb, label: string, icon: RuleVerb['icon'], key: string): RuleVerb => ({
    id,
    label,
    icon,
    key,
    primary: id === field || id === `${tool}-tool`,
  });
  switch (selection?.kind) {
    case 'edge':
      if (findEdge(layout, selection.id)?.segment.kind === 'arc') {
        return [
          verb('arc-radius', 'Radius', 'round', 'R'),
          verb('straighten', 'Straighten', 'edge-length', 'T'),
          verb('split', 'Split', 'split', 'P'),
        ];
      }
      return [
        verb('length', 'Length', 'edge-length', 'L'),
        verb('slide', 'Slide', 'slide', 'S'),
        verb('square-up', 'Square up', 'square-up', 'Q'),
        verb('split', 'Split', 'split', 'P'),
      ];
    case 'vertex':
      return [
        verb('place', 'Place', 'move', 'M'),
        verb('corner-radius', 'Round', 'round', 'R'),
        verb('take-away', 'Take away', 'delete', 'Del'),
      ];
    case 'hole':
      return [
        verb('hole-size', 'Size', 'size', 'Z'),
        verb('place', 'Place', 'move', 'M'),
        verb('take-away', 'Take away', 'delete', 'Del'),
      ];
    case 'slot':
      return [
        verb('slot-size', 'Size', 'size', 'Z'),
        verb('place', 'Place', 'move', 'M'),
        verb('take-away', 'Take away', 'delete', 'Del'),
      ];
    default:
      return [
        verb('hole-tool', 'Hole', 'clearance-hole', 'H'),
        verb('slot-tool', 'Slot', 'slot', 'O'),
        verb('split-tool', 'Corner', 'split', 'P'),
      ];
  }
}
