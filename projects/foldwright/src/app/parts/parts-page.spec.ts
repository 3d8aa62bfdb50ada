import { provideHttpClient } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { TestBed } from '@angular/core/testing';
import { provideRouter } from '@angular/router';
import { partDocumentSchema } from '@foldwright/shared/contracts/part-document-schema';
import type { PartSummary } from '@foldwright/shared/contracts/parts';
import { starterDocument } from '@foldwright/shared/part/starter-document';
import { Subject } from 'rxjs';
import { LiveEvents } from '../api/live-events';
import { PartsPage } from './parts-page';
import { factsOf, fallsUnder, matchesSearch, partLink } from './part-facts';

const ID = '5f0c6c0e-5d7c-4a68-9d49-0b8a7f1f2c1';
const NOW = new Date(2026, 4, 20);
const document = partDocumentSchema.parse(
  starterDocument({ shape: 'l-bracket', baseMm: 60, flangeMm: 40, widthMm: 50, bendAngleDeg: 90 }),
);
const draft: PartSummary['draft'] = {
  id: `${ID}9`,
  letter: 'C',
  revision: 4,
  furthestStep: 'bends',
  updatedAt: '2026-05-12T10:00:00Z',
  updatedBy: 'Tomasz Wren',
  blockers: 0,
  cautions: 1,
  hints: 2,
};
const released: PartSummary['latestRevision'] = {
  id: `${ID}8`,
  partId: `${ID}1`,
  letter: 'B',
  hash: 'abc',
  note: '',
  releasedAt: '2026-03-04T10:00:00Z',
  releasedBy: 'Imogen Harrow',
};
const part = (over: Partial<PartSummary>): PartSummary => ({
  id: `${ID}1`,
  number: 'LC-07',
  name: 'Grinder cradle',
  revision: 1,
  draft,
  latestRevision: released,
  document,
  state: 'blued',
  openQuestion: null,
  updatedAt: '2026-05-12T10:00:00Z',
  ...over,
});

describe('part facts', () => {
  it('says revision, step, finding and release in order', () => {
    const facts = factsOf(part({}), NOW);
    expect(facts.revision).toEqual({ icon: 'scribe', strong: 'C in draft', soft: 'at Bends' });
    expect(facts.finding).toEqual({ severity: 'caution', text: '1 to check' });
    expect(facts.before).toEqual({ icon: 'punched', strong: 'B released', soft: '4 March' });
    expect(facts.sheets).toMatch(/^Mild steel 1.5, then .+ 3\.0$/);
  });

  it('names what can’t be made before what is to check', () => {
    expect(factsOf(part({ draft: { ...draft, blockers: 2 } }), NOW).finding?.text).toBe('2 can’t be made');
  });

  it('sifts by state and finds by name or number', () => {
    const mockUp = part({ state: 'card', latestRevision: null });
    expect(fallsUnder(mockUp, 'mock-up')).toBe(true);
    expect(fallsUnder(mockUp, 'in-draft')).toBe(false);
    expect(fallsUnder(part({}), 'released')).toBe(true);
    expect(matchesSearch(part({}), ' lc-07')).toBe(true);
    expect(matchesSearch(part({}), 'cradle')).toBe(true);
    expect(matchesSearch(part({}), 'tray')).toBe(false);
  });

  it('leads to the step a draft is at, else to the release', () => {
    expect(partLink(part({}))).toEqual(['/parts', `${ID}1`, 'bends']);
    expect(partLink(part({ draft: null }))).toEqual(['/parts', `${ID}1`, 'release']);
  });
});

describe('PartsPage', () => {
  const events = new Subject<unknown>();

  async function open(parts: readonly PartSummary[]) {
    TestBed.configureTestingModule({
      providers: [
        provideRouter([]),
        provideHttpClient(),
        provideHttpClientTesting(),
        { provide: LiveEvents, useValue: { events, resumed: new Subject<void>() } },
      ],
    });
    const fixture = TestBed.createComponent(PartsPage);
    TestBed.tick();
    TestBed.inject(HttpTestingController).expectOne('/api/parts').flush({ parts });
    await fixture.whenStable();
    return { fixture, host: fixture.nativeElement as HTMLElement };
  }

  it('lists parts with counts per state and sifts them', async () => {
    const { fixture, host } = await open([
      part({}),
      part({ id: `${ID}2`, name: 'Umbrella foot', number: 'LC-15', state: 'card', latestRevision: null, draft: null }),
    ]);
    const filters = [...host.querySelectorAll('.sift button')].map((button) =>
      button.textContent?.replace(/\s+/g, ' ').trim(),
    );
    expect(filters).toEqual(['All2', 'Mock-up1', 'In draft1', 'Released1']);
    expect(host.querySelectorAll('fw-part-tile')).toHaveLength(2);
    await new Promise((resolve) => setTimeout(resolve, 20));
    await fixture.whenStable();
    expect(host.querySelectorAll('fw-formed-preview')).toHaveLength(2);
    expect(host.querySelector('fw-scale-bar')).not.toBeNull();
    host.querySelectorAll<HTMLButtonElement>('.sift button')[1]?.click();
    await fixture.whenStable();
    expect(host.querySelector('.called')?.textContent).toBe('Umbrella foot');
    expect(host.querySelectorAll('fw-part-tile')).toHaveLength(1);
  });

  it('says what to do first when the bench is clear', async () => {
    const { host } = await open([]);
    expect(host.textContent).toContain('The bench is clear.');
  });

  it('reads the list again when a part changes', async () => {
    await open([part({})]);
    events.next({ kind: 'part-changed', seq: 1, partId: `${ID}1` });
    await new Promise((resolve) => setTimeout(resolve, 500));
    TestBed.tick();
    expect(TestBed.inject(HttpTestingController).expectOne('/api/parts')).toBeDefined();
  });
});
