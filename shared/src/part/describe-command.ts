import { formatDecimal } from '../units/length';
import type { PartCommand } from './commands';

/** A command as the history and the undo button say it: a few words, lengths in mm. */
export function describeCommand(command: PartCommand): string {
  const mm = (valueMm: number) => `${formatDecimal(valueMm, 2)} mm`;
  switch (command.kind) {
    case 'setStock':
      return `Change the ${command.role} sheet`;
    case 'setTemplate':
      return 'Answer about the template';
    case 'setCalibration':
      return 'Overrule the photo’s scale';
    case 'replaceLayout':
      return { trace: 'Accept the trace', starter: 'Start from typed sizes', import: 'Bring in a drawing' }[
        command.origin
      ];
    case 'moveVertex':
      return 'Move corner';
    case 'insertVertex':
      return 'Add corner';
    case 'removeVertex':
      return 'Take corner away';
    case 'setEdgeLength':
      return `Length of edge to ${mm(command.lengthMm)}`;
    case 'slideEdge':
      return `Slide edge ${mm(Math.abs(command.byMm))} ${command.byMm < 0 ? 'in' : 'out'}`;
    case 'setEdgeBulge':
      return command.bulge === 0 ? 'Straighten edge' : 'Curve edge';
    case 'roundCorner':
      return `Round corner to R ${mm(command.radiusMm)}`;
    case 'addCutout':
      return 'Add cut-out';
    case 'removeCutout':
      return 'Take cut-out away';
    case 'addFeature':
      return command.feature.kind === 'hole' ? 'Add hole' : 'Add slot';
    case 'moveFeature':
      return `Move hole ${mm(Math.hypot(command.by.x, command.by.y))}`;
    case 'setHolePurpose':
      return `Hole for ${'thread' in command.purpose ? command.purpose.thread : mm(command.purpose.diameterMm)}`;
    case 'setSlotSize':
      return `Slot to ${formatDecimal(command.widthMm, 2)} × ${mm(command.lengthMm)}`;
    case 'removeFeature':
      return 'Take hole away';
    case 'addBend':
      return `Add bend ${formatDecimal(command.bend.bendAngleDeg, 2)}° ${command.bend.direction}`;
    case 'changeBend':
      return `Change bend to ${formatDecimal(command.bend.bendAngleDeg, 2)}° ${command.bend.direction}`;
    case 'removeBend':
      return 'Take bend away';
    case 'setReliefs':
      return command.reliefs.mode === 'automatic' ? 'Cut reliefs automatically' : 'Cut no reliefs';
    case 'setBaseAnchor':
      return 'Choose base panel';
    case 'setMaking':
      return 'Change how it is made';
    case 'setDeclaredUses':
      return 'Declare what it is used for';
    case 'setAssembly':
      return 'Say what it is put on';
    case 'setMarks':
      return 'Change the etched text';
    case 'revert':
      return command.reason === 'undo' ? `Undo: ${command.of}` : `Redo: ${command.of}`;
  }
}
