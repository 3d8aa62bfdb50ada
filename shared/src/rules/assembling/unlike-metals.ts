import type { Assembly } from '../../part/assembly';
import type { MetalFamily } from '../../stock/material';
import type { Finding } from '../finding';
import type { RuleContext } from '../rule-context';
import { finishOf } from './assembled-part';
import { UNLIKE_METALS_WHY } from './limits';

type SeatMetal = NonNullable<Assembly['seat']>['material'];

const FERROUS: ReadonlySet<MetalFamily | SeatMetal> = new Set<MetalFamily | SeatMetal>(['steel', 'stainless']);
const RED: ReadonlySet<MetalFamily> = new Set<MetalFamily>(['copper', 'brass']);

/** Metals that eat each other where they touch in the wet: aluminium against steel or stainless, copper and brass against either. */
export function checkUnlikeMetals(context: RuleContext): readonly Finding[] {
  const { material, document } = context;
  const seat = document.assembly?.seat ?? null;
  if (material === null || seat === null || !seat.isWet) return [];
  const { family } = material;
  const isUnlike =
    (family === 'aluminium' && FERROUS.has(seat.material)) ||
    (FERROUS.has(family) && seat.material === 'aluminium') ||
    (RED.has(family) && seat.material !== 'other');
  if (!isUnlike) return [];
  const finish = finishOf(context);
  return [
    {
      id: 'unlikeMetals',
      rule: 'unlikeMetals',
      severity: 'hint',
      title: `${material.shortName} on ${seat.material} in the wet`,
      detail:
        'Where the two touch and water stays, the less noble one is eaten. ' +
        (finish === null ? 'Nothing lies between them.' : `${finish.name} helps until it is scratched.`),
      foundMm: null,
      requiredMm: null,
      why: UNLIKE_METALS_WHY,
      ids: [],
      at: null,
      advice: 'Put a coat, a gasket or plastic washers between them, and let the water run off.',
      mend: null,
    },
  ];
}
