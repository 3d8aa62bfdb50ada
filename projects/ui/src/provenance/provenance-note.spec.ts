import { TestBed } from '@angular/core/testing';
import { ProvenanceNote } from './provenance-note';

describe('ProvenanceNote', () => {
  async function read(of: unknown): Promise<string> {
    const fixture = TestBed.createComponent(ProvenanceNote);
    fixture.componentRef.setInput('of', of);
    await fixture.whenStable();
    return ((fixture.nativeElement as HTMLElement).textContent ?? '').trim();
  }

  it('says text, source and trust', async () => {
    expect(await read({ text: 'K for steel', source: 'DIN 6935', confidence: 'published' })).toBe(
      'K for steel, DIN 6935 (published)',
    );
  });

  it('says common practice once', async () => {
    const of = { text: 'usual die', source: 'common practice, no source', confidence: 'common-practice' };
    expect(await read(of)).toBe('usual die, common practice, no source');
  });

  it('does not name the source twice and owns up to memory', async () => {
    expect(await read({ text: 'factors of trade charts', source: 'trade charts', confidence: 'memory' })).toBe(
      'factors of trade charts (from memory, check it)',
    );
  });
});
