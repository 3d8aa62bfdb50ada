import * as fc from 'fast-check';
import { runs } from '@foldwright/shared/bending/testing/runs';
import { applyCommands } from '@foldwright/shared/part/apply-command';
import { canonicalJson } from '@foldwright/shared/part/canonical-json';
import type { StockRole } from '@foldwright/shared/part/part-document';
import type { Finding } from '@foldwright/shared/rules/finding';
import { anyCommand, furnishedBracket, tryApply } from '../support/any-command';
import { checkPart } from '@foldwright/shared/rules/check-part';

/** Parts as people leave them half way: corners pulled through each other, bends off the sheet, holes over the edge. */
const anyPart = fc.array(anyCommand, { maxLength: 10 }).map((commands) => commands.reduce(tryApply, furnishedBracket));
const role = fc.constantFrom<StockRole>('trial', 'production');

function blockerIds(findings: readonly Finding[]): readonly string[] {
  return findings.filter(({ severity }) => severity === 'blocker').map(({ id }) => id);
}

describe('checks of any part', () => {
  it('answer with findings that say what, why and what to do, never with an exception or a NaN', () => {
    fc.assert(
      fc.property(anyPart, role, (document, stock) => {
        const findings = checkPart(document, stock);
        // Canonical JSON refuses NaN and infinities.
        expect(canonicalJson(findings).length).toBeGreaterThan(1);
        for (const { title, detail, advice, why } of findings) {
          for (const words of [title, detail, advice, why.text, why.source]) expect(words).toMatch(/^\S.*\S$/su);
        }
        const ids = findings.map(({ id }) => id);
        expect(new Set(ids).size).toBe(ids.length);
      }),
      { numRuns: runs(0.15) },
    );
  });

  it('offer only mends that can be applied, take their finding away and bring nothing that cannot be made', () => {
    fc.assert(
      fc.property(anyPart, role, (document, stock) => {
        const findings = checkPart(document, stock);
        const known = blockerIds(findings);
        for (const { id, mend } of findings) {
          if (mend === null) continue;
          const left = checkPart(applyCommands(document, mend.commands), stock);
          expect(left.map((finding) => finding.id)).not.toContain(id);
          expect(blockerIds(left).filter((blocker) => !known.includes(blocker))).toEqual([]);
        }
      }),
      { numRuns: runs(0.1) },
    );
  });

  it('answer the same for the same part', () => {
    fc.assert(
      fc.property(anyPart, role, (document, stock) => {
        expect(checkPart(document, stock)).toEqual(checkPart(document, stock));
      }),
      { numRuns: runs(0.03) },
    );
  });
});
