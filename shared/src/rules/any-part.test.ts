import * as fc from 'fast-check';
import { applyCommands } from '../part/apply-command';
import { canonicalJson } from '../part/canonical-json';
import type { StockRole } from '../part/part-document';
import { anyCommand, furnishedBracket, tryApply } from '../part/testing/any-command';
import { checkPart } from './check-part';

/** Parts as people leave them half way: corners pulled through each other, bends off the sheet, holes over the edge. */
const anyPart = fc.array(anyCommand, { maxLength: 10 }).map((commands) => commands.reduce(tryApply, furnishedBracket));
const role = fc.constantFrom<StockRole>('trial', 'production');

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
      { numRuns: 100 },
    );
  });

  it('offer only mends that can be applied', () => {
    fc.assert(
      fc.property(anyPart, role, (document, stock) => {
        for (const { mend } of checkPart(document, stock)) {
          if (mend !== null) expect(() => applyCommands(document, mend.commands)).not.toThrow();
        }
      }),
      { numRuns: 100 },
    );
  });

  it('answer the same for the same part', () => {
    fc.assert(
      fc.property(anyPart, role, (document, stock) => {
        expect(checkPart(document, stock)).toEqual(checkPart(document, stock));
      }),
      { numRuns: 20 },
    );
  });
});
