import { readFileSync, readdirSync } from 'node:fs';
import path from 'node:path';
import fc from 'fast-check';
import { layOutMesh, poseFormed } from '@foldwright/shared/bending/formed-mesh';
import { meshFacts } from '@foldwright/shared/bending/testing/mesh-facts';
import { runs } from '@foldwright/shared/bending/testing/runs';
import { partDocumentSchema } from '@foldwright/shared/contracts/part-document-schema';
import { canonicalJson } from '@foldwright/shared/part/canonical-json';
import { developPart } from '@foldwright/shared/part/develop-part';
import { checkInvariants } from '@foldwright/shared/part/invariants';
import type { PartDocument, StockRole } from '@foldwright/shared/part/part-document';
import { checkDevelopedPart } from '@foldwright/shared/rules/check-part';
import * as z from 'zod/mini';
import { furnishedBracket } from '../support/any-command';

const DEMO = path.resolve(__dirname, '../../server/src/setup/demo/parts');
/** No document may hold the kernel longer, ms: far above what any takes on a busy machine, far below a hang. */
const BUDGET_MS = 4000;

jest.setTimeout(120_000 + runs(10) * 60);

type Json = null | boolean | number | string | readonly Json[] | { readonly [key: string]: Json };

const bases: readonly Json[] = [
  furnishedBracket as unknown,
  ...readdirSync(DEMO).map((name): unknown => JSON.parse(readFileSync(path.join(DEMO, name), 'utf8'))),
].map((document) => z.parse(z.json(), JSON.parse(JSON.stringify(document))));

/** Numbers that break arithmetic which is not ready for them. */
const NUMBERS = [
  0, -0, 1e-320, 1e-9, -1e-9, 0.5, 1, -1, 90, 179.999999, 180, 5000, -5000, 5000.0001, 1e9, 1e308, -1e308,
];

interface Mutation {
  readonly at: number;
  readonly how: 'number' | 'nudge' | 'drop' | 'repeat' | 'reverse' | 'swap' | 'word' | 'null';
  readonly pick: number;
}

const mutation: fc.Arbitrary<Mutation> = fc.record({
  at: fc.nat(),
  how: fc.constantFrom('number', 'nudge', 'drop', 'repeat', 'reverse', 'swap', 'word', 'null'),
  pick: fc.nat(),
});

/** How many values there are in a document, itself included. */
function countOf(value: Json): number {
  if (typeof value !== 'object' || value === null) return 1;
  return Object.values(value).reduce((sum: number, one) => sum + countOf(one), 1);
}

/** The document with its n-th value, counted from the outside in, changed. */
function changedAt(value: Json, at: number, change: (value: Json) => Json | undefined): Json | undefined {
  if (at === 0) return change(value);
  if (typeof value !== 'object' || value === null) return value;
  let left = at - 1;
  const entries = Object.entries(value).flatMap(([key, one]): readonly (readonly [string, Json])[] => {
    const count = countOf(one);
    const isHere = left >= 0 && left < count;
    const changed = isHere ? changedAt(one, left, change) : one;
    left -= count;
    return changed === undefined ? [] : [[key, changed]];
  });
  return Array.isArray(value) ? entries.map(([, one]) => one) : Object.fromEntries(entries);
}

function mutate(value: Json, { how, pick }: Mutation): Json | undefined {
  switch (how) {
    case 'number':
      return typeof value === 'number' ? (NUMBERS[pick % NUMBERS.length] ?? 0) : value;
    case 'nudge':
      return typeof value === 'number' ? value + ((pick % 2001) - 1000) / 10 ** (pick % 7) : value;
    case 'drop':
      return undefined;
    case 'repeat':
      return Array.isArray(value) && value.length > 0
        ? [...(value as Json[]), (value as Json[])[pick % value.length] ?? null]
        : value;
    case 'reverse':
      return Array.isArray(value) ? [...(value as Json[])].reverse() : value;
    case 'swap': {
      if (!Array.isArray(value) || value.length < 2) return value;
      const list = [...(value as Json[])];
      const [a, b] = [pick % list.length, (pick >> 3) % list.length];
      const first = list[a] ?? null;
      list[a] = list[b] ?? null;
      list[b] = first;
      return list;
    }
    case 'word':
      return typeof value === 'string' ? ['', 'M6', 'm'.repeat(300), '__proto__', '\u0000'][pick % 5] : value;
    case 'null':
      return null;
  }
}

const mutant = fc
  .tuple(fc.nat(bases.length - 1), fc.array(mutation, { minLength: 1, maxLength: 6 }))
  .map(([index, mutations]) =>
    mutations.reduce<Json>((document, one) => {
      const changed = changedAt(document, one.at % countOf(document), (value) => mutate(value, one));
      return changed ?? null;
    }, bases[index] ?? null),
  );

/** What became of a document. */
type Fate = 'refused by its schema' | 'refused by an invariant' | 'told why it cannot be developed' | 'developed';

function fateOf(document: PartDocument, { role, isFormed }: Look): Fate {
  if (checkInvariants(document).length > 0) return 'refused by an invariant';
  const result = developPart(document, role);
  // Canonical JSON refuses NaN and infinities.
  canonicalJson(checkDevelopedPart(document, role, result, 'left out'));
  if (!result.ok) {
    expect(result.problems.length).toBeGreaterThan(0);
    for (const { message } of result.problems) expect(message).toMatch(/^\S.*\S$/su);
    return 'told why it cannot be developed';
  }
  const { flat, formedBox, bendTable } = result.development;
  canonicalJson({ flat, formedBox, bendTable });
  expect(flat.areaMm2).toBeGreaterThan(0);
  if (isFormed) {
    const mesh = meshFacts(poseFormed(layOutMesh(result.development, 0.5), 1));
    expect(mesh).toMatchObject({ openEdges: 0, isFinite: true });
  }
  return 'developed';
}

/** What is looked at: one of the sheets, and for some of the parts the formed mesh too. */
interface Look {
  readonly role: StockRole;
  readonly isFormed: boolean;
}

const look: fc.Arbitrary<Look> = fc.record({
  role: fc.constantFrom<StockRole>('trial', 'production'),
  isFormed: fc.nat(3).map((pick) => pick === 0),
});

describe('documents that somebody spoiled', () => {
  it('are refused in words or developed right, never with an exception, a NaN or a hang', () => {
    const fates = new Map<Fate, number>();
    let slowestMs = 0;
    fc.assert(
      fc.property(mutant, look, (json, chosen) => {
        const parsed = z.safeParse(partDocumentSchema, json);
        const began = performance.now();
        const fate = parsed.success ? fateOf(parsed.data, chosen) : 'refused by its schema';
        const tookMs = performance.now() - began;
        slowestMs = Math.max(slowestMs, tookMs);
        expect(tookMs).toBeLessThan(BUDGET_MS);
        fates.set(fate, (fates.get(fate) ?? 0) + 1);
      }),
      { numRuns: runs(10) },
    );
    const words = [...fates].map(([fate, count]) => `${count} ${fate}`).join(', ');
    process.stdout.write(`spoiled documents: ${words}; the slowest took ${slowestMs.toFixed(0)} ms\n`);
    // The mutations are mild enough that the kernel, not only the schema, meets many of them.
    expect(fates.get('developed') ?? 0).toBeGreaterThan(runs(1));
    expect(fates.get('told why it cannot be developed') ?? 0).toBeGreaterThan(runs(0.05));
  });
});
