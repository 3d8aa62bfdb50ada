import { TestBed } from '@angular/core/testing';
import { provideRouter } from '@angular/router';
import { starterDocument } from '@foldwright/shared/part/starter-document';
import { DraftsApi } from '../../api/drafts-api';
import { LiveEvents } from '../../api/live-events';
import { PartsApi } from '../../api/parts-api';
import { ComputedParts } from '../computed-parts';
import { BoardEditor } from '../drawing-board/board-editor';
import { PartStore } from '../part-store';
import { DraftServer, PART_ID } from '../testing/draft-server';
import { OutlinePage } from './outline-page';

describe('OutlinePage', () => {
  async function open(canEdit = true) {
    const server = new DraftServer(
      starterDocument({ shape: 'l-bracket', baseMm: 50, flangeMm: 30, widthMm: 40, bendAngleDeg: 90 }),
    );
    server.canEdit = canEdit;
    TestBed.configureTestingModule({
      providers: [
        provideRouter([]),
        PartStore,
        BoardEditor,
        ComputedParts,
        { provide: PartsApi, useValue: server.partsApi },
        { provide: DraftsApi, useValue: server.draftsApi },
        { provide: LiveEvents, useValue: server.liveEvents },
      ],
    });
    localStorage.clear();
    const store = TestBed.inject(PartStore);
    await store.open(PART_ID);
    const fixture = TestBed.createComponent(OutlinePage);
    await fixture.whenStable();
    const host = fixture.nativeElement as HTMLElement;
    const verbs = (): string[] =>
      [...host.querySelectorAll('fw-steel-rule button[data-action]')].map(
        (button) => button.getAttribute('data-action') ?? '',
      );
    const press = async (action: string): Promise<void> => {
      host.querySelector<HTMLButtonElement>(`button[data-action="${action}"]`)?.click();
      await fixture.whenStable();
    };
    return { server, store, editor: TestBed.inject(BoardEditor), fixture, host, verbs, press };
  }

  it('offers the verbs of what is chosen and only those', async () => {
    const { editor, fixture, verbs } = await open();
    expect(verbs()).toEqual(['hole-tool', 'slot-tool', 'split-tool', 'undo', 'redo', 'fit']);
    editor.select({ kind: 'edge', id: 'e2' });
    await fixture.whenStable();
    expect(verbs()).toEqual(['length', 'slide', 'square-up', 'split', 'undo', 'redo', 'fit']);
  });

  it('sets an edge’s length where it is typed, and undoes it', async () => {
    const { editor, fixture, host, store, press } = await open();
    editor.select({ kind: 'edge', id: 'e2' });
    await fixture.whenStable();
    const field = host.querySelector<HTMLInputElement>('fw-length-field input');
    if (field === null) throw new Error('a field at the edge');
    expect(field.value).toBe('40');
    field.value = '2 in';
    field.dispatchEvent(new Event('input'));
    field.dispatchEvent(new KeyboardEvent('keydown', { key: 'Enter' }));
    await fixture.whenStable();
    expect(store.document()?.layout.outer.edges[2]?.start.y).toBeCloseTo(50.8, 9);
    expect(store.document()?.layout.bends[0]?.line.to.y).toBeCloseTo(50.8, 6);
    await press('undo');
    expect(store.document()?.layout.outer.edges[2]?.start.y).toBe(40);
  });

  it('has a row for everything drawn but bends, and takes things away from there', async () => {
    const { editor, fixture, host, store } = await open();
    store.apply([
      {
        kind: 'addFeature',
        feature: { kind: 'hole', id: 'h1', centre: { x: 20, y: 20 }, purpose: { kind: 'tapped', thread: 'M6' } },
      },
    ]);
    host.querySelector<HTMLButtonElement>('fw-board-views button')?.click();
    await fixture.whenStable();
    const rows = [...host.querySelectorAll<HTMLElement>('[role="option"]')];
    expect(rows).toHaveLength(9);
    const row = rows.at(-1);
    expect(row?.textContent).toContain('M6 tapped, Ø 5');
    row?.dispatchEvent(new KeyboardEvent('keydown', { key: 'ArrowRight' }));
    await fixture.whenStable();
    expect(store.document()?.layout.features[0]).toMatchObject({ centre: { x: 21, y: 20 } });
    row?.dispatchEvent(new KeyboardEvent('keydown', { key: 'Delete' }));
    await fixture.whenStable();
    expect(store.document()?.layout.features).toEqual([]);
    expect(editor.selection()).toBeNull();
  });

  it('lets a viewer look and offers no verbs', async () => {
    const { editor, fixture, host, verbs } = await open(false);
    editor.select({ kind: 'edge', id: 'e2' });
    await fixture.whenStable();
    expect(verbs()).toEqual(['undo', 'redo', 'fit']);
    expect(host.querySelector<HTMLInputElement>('fw-length-field input')?.disabled).toBe(true);
  });
});
