import type { Finding } from '../finding';
import type { RuleContext } from '../rule-context';
import { checkCoatedSize } from './coated-size';
import { checkFastenerRoom } from './fastener-room';
import { checkFinishForMetal } from './finish-for-metal';
import { checkMaskedHardware } from './masked-hardware';
import { checkNeighbourFouled } from './neighbour-fouled';
import { checkThreadEngagement } from './thread-engagement';
import { checkUnlikeMetals } from './unlike-metals';
import { checkWasherSeat } from './washer-seat';

/** Checks on assembling that are quick enough for mends to be tried on. All but thread in sheet keep quiet without an assembly. */
export const ASSEMBLING_RULES: readonly ((context: RuleContext) => readonly Finding[])[] = [
  checkThreadEngagement,
  checkCoatedSize,
  checkMaskedHardware,
  checkFinishForMetal,
  checkUnlikeMetals,
  checkWasherSeat,
  checkFastenerRoom,
  checkNeighbourFouled,
];
