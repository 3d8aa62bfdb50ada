import type { DeclaredUse } from '../part/part-document';
import type { Finding } from './finding';
import type { RuleContext } from './rule-context';

const WHY = {
  text: 'what this program does not judge',
  source: 'common practice, no source',
  confidence: 'common-practice',
} as const;

const WORDS: Readonly<Record<DeclaredUse, { readonly title: string; readonly detail: string }>> = {
  vehicle: {
    title: 'It is for a vehicle',
    detail:
      'It will be shaken and may work loose. Lock the fasteners, keep bends out of the highest load, and look at it again after some use.',
  },
  fuel: {
    title: 'It is near fuel',
    detail: 'Foldwright draws brackets and clamps only; nothing that holds fuel. Keep lines clear of edges and heat.',
  },
  pressure: {
    title: 'It is near something under pressure',
    detail:
      'Foldwright draws brackets and clamps only; nothing that holds pressure. Let the pressure off before fitting.',
  },
  heat: {
    title: 'It gets hot',
    detail:
      'Coatings and hardened aluminium lose much from about 100 to 150 °C on, zinc from about 200 °C (from memory; ask the supplier). Keep nuts and hoses out of the heat.',
  },
  vibration: {
    title: 'It vibrates',
    detail: 'Nothing here says how long it lasts. Larger radii, smooth cut edges and locked fasteners help.',
  },
  'lifting-people': {
    title: 'It lifts or carries people',
    detail: 'Foldwright does not cover this at all: no load is rated here.',
  },
  seat: { title: 'It holds a seat or a belt', detail: 'Foldwright does not cover this at all: no load is rated here.' },
  steering: {
    title: 'It is part of a steering',
    detail: 'Foldwright does not cover this at all: no load is rated here.',
  },
  brakes: { title: 'It is part of a brake', detail: 'Foldwright does not cover this at all: no load is rated here.' },
};

/** A caution for every use a person declared: what to mind, and who decides. */
export function checkDeclaredUse({ document }: RuleContext): readonly Finding[] {
  return [...new Set(document.declaredUses)].map((use): Finding => ({
    id: `declaredUse-${use}`,
    rule: 'declaredUse',
    severity: 'caution',
    title: WORDS[use].title,
    detail: WORDS[use].detail,
    foundMm: null,
    requiredMm: null,
    why: WHY,
    ids: [],
    at: null,
    advice: 'Your local code and a licensed engineer decide whether and how it may be used.',
    mend: null,
  }));
}
