import { boltChance } from '../../assembly/bolt-chance';
import { patternModel } from '../../assembly/bolt-pattern';
import type { HolePurpose } from '../../bending/layout';
import { STANDARD_BRAKE } from '../../bending/leg-gains';
import { applyCommand, applyCommands } from '../../part/apply-command';
import { developPart } from '../../part/develop-part';
import type { PartDocument } from '../../part/part-document';
import { starterDocument } from '../../part/starter-document';
import { NO_COAT } from '../../spread/causes';
import { ACROSS, MENDED, add, bracket, found, hole, outcomeOfMending, plain } from '../testing/rule-bench';
import { BOLT_SAMPLES } from './bolts-start';
import { assembled } from './testing/assembled';

const M6: HolePurpose = { kind: 'clearance', thread: 'M6', fit: 'medium' };

/** A hat bolted down through both brims: four bends lie between its holes. */
function hat(purpose: HolePurpose = M6): PartDocument {
  const start = starterDocument({ shape: 'hat-section', topMm: 70, sideMm: 40, brimMm: 40, widthMm: 60 });
  const stocked = applyCommand(start, { kind: 'setStock', role: 'production', stock: ACROSS });
  return add(stocked, hole('h1', 18, 30, purpose), hole('h2', 212, 30, purpose));
}

function bolted(document: PartDocument, wantedChance: number, finishId = 'bare', ids = ['h1', 'h2']): PartDocument {
  return assembled(document, { finishId, bolts: { featureIds: ids, placeHalfWidthMm: 0.25, wantedChance } });
}

function modelOf(document: PartDocument) {
  const result = developPart(document, 'production');
  if (!result.ok) throw new Error('a hat can be developed');
  const bolts = ['h1', 'h2'].map((featureId) => ({ featureId, boltMm: 6, at: null }));
  const plan = { brake: STANDARD_BRAKE, coat: NO_COAT, gauging: new Map() };
  return patternModel(result.development, plan, { bolts, placeHalfWidthMm: 0.25 });
}

describe('boltsStart', () => {
  it('flips where the wanted chance meets the one that is there', () => {
    const { chance } = boltChance(modelOf(hat()), NO_COAT, BOLT_SAMPLES.seed, BOLT_SAMPLES.count).bare;
    expect(chance).toBeGreaterThan(0.3);
    expect(chance).toBeLessThan(0.98);
    expect(found(bolted(hat(), chance - 0.001), 'boltsStart')).toEqual([]);
    const [finding] = found(bolted(hat(), chance + 0.001), 'boltsStart');
    expect(finding).toMatchObject({ severity: 'caution', ids: ['h1', 'h2'] });
    expect(finding?.title).toContain(String(Math.floor(chance * 1000) / 10));
  });

  it('tells the chance once coated beside the bare one, and is more likely to speak', () => {
    const { chance } = boltChance(modelOf(hat()), NO_COAT, BOLT_SAMPLES.seed, BOLT_SAMPLES.count).bare;
    expect(found(bolted(hat(), chance - 0.01), 'boltsStart')).toEqual([]);
    const [finding] = found(bolted(hat(), chance - 0.01, 'powder-moss'), 'boltsStart');
    expect(finding?.detail).toContain('once coated');
    expect(finding?.detail).toContain(`${String(Math.floor(chance * 1000) / 10)} before`);
  });

  it.each(['bare', 'powder-moss'])('is mended by a slot that reaches the wanted chance: %s', (finishId) => {
    const document = bolted(hat(), 0.97, finishId);
    const [finding] = found(document, 'boltsStart');
    expect(finding?.mend?.commands.map(({ kind }) => kind)).toEqual(['removeFeature', 'addFeature']);
    expect(outcomeOfMending(document, 'boltsStart')).toEqual(MENDED);
    // Other parts than those it was found on reach it too.
    const after = applyCommands(document, finding?.mend?.commands ?? []);
    const other = boltChance(modelOf(after), NO_COAT, 99, 4000).bare;
    expect(other.chance).toBeGreaterThanOrEqual(0.97);
  });

  it('says the same every time', () => {
    expect(found(bolted(hat(), 0.97), 'boltsStart')).toEqual(found(bolted(hat(), 0.97), 'boltsStart'));
  });

  it('says so when bolts face different ways or an opening takes no bolt', () => {
    const l = add(bracket(), hole('h1', 20, 25, M6), hole('h2', 85, 25, M6), hole('h3', 20, 10, plain(5)));
    expect(found(bolted(l, 0.9), 'boltsStart')).toMatchObject([{ severity: 'hint', mend: null }]);
    const [unread] = found(bolted(l, 0.9, 'bare', ['h1', 'h3']), 'boltsStart');
    expect(unread?.severity).toBe('hint');
  });

  it('reads the bolt off a plain hole’s width', () => {
    expect(found(bolted(hat(plain(6.6)), 0.97), 'boltsStart')).toMatchObject([{ severity: 'caution' }]);
  });
});
