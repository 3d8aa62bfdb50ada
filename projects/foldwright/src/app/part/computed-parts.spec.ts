import { ApplicationRef } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { starterDocument } from '@foldwright/shared/part/starter-document';
import { DraftsApi } from '../api/drafts-api';
import { LiveEvents } from '../api/live-events';
import { PartsApi } from '../api/parts-api';
import { ComputedParts } from './computed-parts';
import { BoardEditor } from './drawing-board/board-editor';
import { PartStore } from './part-store';
import { DraftServer, PART_ID } from './testing/draft-server';

describe('ComputedParts', () => {
  async function open() {
    const server = new DraftServer(
      starterDocument({ shape: 'l-bracket', baseMm: 50, flangeMm: 30, widthMm: 40, bendAngleDeg: 90 }),
    );
    TestBed.configureTestingModule({
      providers: [
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
    const parts = TestBed.inject(ComputedParts);
    const settle = async (): Promise<void> => {
      await TestBed.inject(ApplicationRef).whenStable();
      await new Promise((done) => setTimeout(done, 20));
      await TestBed.inject(ApplicationRef).whenStable();
    };
    await settle();
    return { server, store, parts, settle };
  }

  it('shows what the server computed once it belongs to what is drawn', async () => {
    const { parts } = await open();
    expect(parts.trial()?.origin).toBe('server');
    expect(parts.production()?.origin).toBe('server');
    expect(parts.trial()?.figures?.bendTable).toHaveLength(1);
  });

  it('previews with the same kernel while the server is away, to the same figures', async () => {
    const { server, store, parts, settle } = await open();
    server.isReachable = false;
    store.apply([{ kind: 'slideEdge', edgeId: 'e2', byMm: 10 }]);
    await settle();
    const preview = parts.production();
    expect(preview?.origin).toBe('preview');
    server.isReachable = true;
    await store.settle();
    await settle();
    const served = parts.production();
    expect(served?.origin).toBe('server');
    expect(served?.figures?.flat.bounds).toEqual(preview?.figures?.flat.bounds);
    expect(served?.figures?.flat.massKg).toBe(preview?.figures?.flat.massKg);
  });
});
