import type { Layout } from '../bending/layout';
import type { Point } from '../geometry/point';
import { between } from '../geometry/vector';
import type { PartCommand } from '../part/commands';
import { type Copies, findCopies } from './copies';
import type { Finding } from './finding';
import { plural } from './in-words';
import { DRAWN_TWICE } from './limits';
import { mendThatHolds } from './mend-that-holds';
import { type RuleContext, listSome, nameOf, placeOfLayout } from './rule-context';

const KIND = { bend: 'bend', hole: 'hole', slot: 'slot', cutout: 'cut-out' } as const;

/**
 * Bends on one line, and holes, slots and cut-outs in one place and of one size, within 0.05 mm. A machine would cut or bend
 * there twice, and there is no flat pattern of it: a blocker. The first stays, the copies can go.
 */
export function checkDrawnTwice(context: RuleContext): readonly Finding[] {
  return findCopies(context.document.layout).map((copies): Finding => {
    const names = [copies.id, ...copies.copyIds].map((id) => nameOf(context, id));
    const id = `drawnTwice-${[copies.id, ...copies.copyIds].join('-')}`;
    const at = placeOfThing(context.document.layout, copies.id);
    const gone = listSome(names.slice(1));
    return {
      id,
      rule: 'drawnTwice',
      severity: 'blocker',
      title: `${listSome(names)} are the same ${KIND[copies.kind]}`,
      detail:
        copies.kind === 'bend'
          ? 'They lie on one line, so the sheet would be bent there more than once.'
          : 'They lie in one place and have one size, so the machine would cut there more than once.',
      foundMm: null,
      requiredMm: null,
      why: DRAWN_TWICE.why,
      ids: [copies.id, ...copies.copyIds],
      at: at === null ? null : placeOfLayout(context, at),
      advice: `Take ${gone} away, or move ${plural(copies.copyIds.length, 'it', 'them')} to where ${plural(
        copies.copyIds.length,
        'it belongs',
        'they belong',
      )}.`,
      mend: mendThatHolds(
        context,
        id,
        `Take ${gone} away`,
        copies.copyIds.map((copy) => removal(copies.kind, copy)),
      ),
    };
  });
}

function removal(kind: Copies['kind'], id: string): PartCommand {
  if (kind === 'bend') return { kind: 'removeBend', bendId: id };
  return kind === 'cutout' ? { kind: 'removeCutout', loopId: id } : { kind: 'removeFeature', featureId: id };
}

function placeOfThing({ bends, features, cutouts }: Layout, id: string): Point | null {
  const bend = bends.find((one) => one.id === id);
  if (bend !== undefined) return between(bend.line.from, bend.line.to, 0.5);
  const feature = features.find((one) => one.id === id);
  if (feature !== undefined) return feature.kind === 'hole' ? feature.centre : between(feature.from, feature.to, 0.5);
  return cutouts.find((one) => one.id === id)?.edges[0]?.start ?? null;
}
