import { TestBed } from '@angular/core/testing';
import type { PartCommand } from '@foldwright/shared/part/commands';
import { starterDocument } from '@foldwright/shared/part/starter-document';
import { DraftsApi } from '../api/drafts-api';
import { LiveEvents } from '../api/live-events';
import { PartsApi } from '../api/parts-api';
import { PartStore } from './part-store';
import { SHELF_STORAGE } from './pending-shelf';
import { DRAFT_ID, DraftServer, PART_ID } from './testing/draft-server';

const plate = () => starterDocument({ shape: 'flat-plate', widthMm: 100, heightMm: 60 });

const addHole = (id: string, x: number): PartCommand => ({
  kind: 'addFeature',
  feature: { kind: 'hole', id, centre: { x, y: 30 }, purpose: { kind: 'plain', diameterMm: 5 } },
});
const widen: PartCommand = { kind: 'slideEdge', edgeId: 'e2', byMm: 10 };

class MemoryStorage implements Storage {
  private readonly items = new Map<string, string>();
  get length(): number {
    return this.items.size;
  }
  clear(): void {
    this.items.clear();
  }
  key(index: number): string | null {
    return [...this.items.keys()][index] ?? null;
  }
  getItem(key: string): string | null {
    return this.items.get(key) ?? null;
  }
  setItem(key: string, value: string): void {
    this.items.set(key, value);
  }
  removeItem(key: string): void {
    this.items.delete(key);
  }
}

/** Lets everything that is on its way arrive. */
const arrive = async (): Promise<void> => {
  for (let turn = 0; turn < 60; turn += 1) await Promise.resolve();
};

describe('PartStore', () => {
  let server: DraftServer;
  let storage: MemoryStorage;

  const openStore = async (): Promise<PartStore> => {
    TestBed.resetTestingModule();
    TestBed.configureTestingModule({
      providers: [
        PartStore,
        { provide: PartsApi, useValue: server.partsApi },
        { provide: DraftsApi, useValue: server.draftsApi },
        { provide: LiveEvents, useValue: server.liveEvents },
        { provide: SHELF_STORAGE, useValue: storage },
      ],
    });
    const store = TestBed.inject(PartStore);
    await store.open(PART_ID);
    return store;
  };

  const holes = (store: PartStore): readonly string[] => store.document()?.layout.features.map(({ id }) => id) ?? [];

  beforeEach(() => {
    server = new DraftServer(plate());
    storage = new MemoryStorage();
  });

  it('applies at once, sends, and says when it was saved', async () => {
    const store = await openStore();
    expect(store.apply([addHole('h1', 20)])).toBe(true);
    expect(holes(store)).toEqual(['h1']);
    expect(store.isSettled()).toBe(false);
    await arrive();
    expect(store.isSettled()).toBe(true);
    expect(server.document.layout.features).toHaveLength(1);
    expect(store.savedWords()).toMatch(/^saved at \d\d:\d\d, edit 2$/);
  });

  it('says why the drawing refuses an edit and changes nothing', async () => {
    const store = await openStore();
    expect(store.apply([{ kind: 'removeFeature', featureId: 'nowhere' }])).toBe(false);
    expect(store.news()).not.toBeNull();
    expect(store.history().past).toHaveLength(0);
    await arrive();
    expect(server.revision).toBe(1);
  });

  it('refuses edits of somebody who may only look', async () => {
    server.canEdit = false;
    const store = await openStore();
    expect(store.canEdit()).toBe(false);
    expect(store.apply([addHole('h1', 20)])).toBe(false);
  });

  describe('undo and redo', () => {
    it('are commands, and bring back exactly what was', async () => {
      const store = await openStore();
      store.apply([addHole('h1', 20)]);
      store.apply([widen]);
      await arrive();
      const after = store.document();
      expect(store.undoLabel()).toBe('Slide edge 10 mm out');
      store.undo();
      store.undo();
      await arrive();
      expect(store.document()).toEqual(plate());
      expect(server.log.at(-1)?.commands[0]).toMatchObject({ kind: 'revert', reason: 'undo' });
      store.redo();
      store.redo();
      await arrive();
      expect(store.document()).toEqual(after);
      expect(server.document).toEqual(after);
    });

    it('go to any point of the history', async () => {
      const store = await openStore();
      for (const [index, x] of [20, 40, 60].entries()) store.apply([addHole(`h${index + 1}`, x)]);
      await arrive();
      const first = store.history().past[0]?.id ?? '';
      const last = store.history().past[2]?.id ?? '';
      store.goTo(first);
      expect(holes(store)).toEqual(['h1']);
      store.goTo(last);
      expect(holes(store)).toEqual(['h1', 'h2', 'h3']);
      store.goTo(null);
      expect(holes(store)).toEqual([]);
    });

    it('count repeated nudges as one step, even when answers come in between', async () => {
      const store = await openStore();
      store.apply([addHole('h1', 20)]);
      for (let press = 0; press < 5; press += 1) {
        store.apply([{ kind: 'moveFeature', featureId: 'h1', by: { x: 1, y: 0 } }], { fold: 'nudge h1' });
        await arrive();
      }
      expect(store.history().past).toHaveLength(2);
      store.undo();
      expect(store.document()?.layout.features[0]).toMatchObject({ centre: { x: 20, y: 30 } });
    });
  });

  describe('two people on one draft', () => {
    it('both keep their edits when they are made at the same time', async () => {
      const store = await openStore();
      server.change([addHole('theirs', 80)]);
      store.apply([addHole('mine', 20)]);
      await arrive();
      expect([...holes(store)].sort()).toEqual(['mine', 'theirs']);
      expect(server.document).toEqual(store.document());
      expect(store.news()).toBe('Imogen Harrow changed this draft: Add hole');
      expect(server.log.map(({ clientId }) => clientId)).toEqual(['another-tab', store.clientId]);
    });

    it('keeps the line about the other until it is put away, whatever one draws meanwhile', async () => {
      const store = await openStore();
      server.change([addHole('theirs', 80)]);
      store.apply([addHole('mine', 20)]);
      await arrive();
      store.apply([widen]);
      store.undo();
      await arrive();
      expect(store.news()).toBe('Imogen Harrow changed this draft: Add hole');
      store.dismissNews();
      expect(store.news()).toBeNull();
    });

    it('drops the line about a refused edit with the next one that fits', async () => {
      const store = await openStore();
      store.apply([{ kind: 'removeFeature', featureId: 'nowhere' }]);
      expect(store.news()).not.toBeNull();
      store.apply([addHole('mine', 20)]);
      expect(store.news()).toBeNull();
    });

    it('hands back an edit that no longer fits and says so', async () => {
      server.change([addHole('h1', 20)]);
      const store = await openStore();
      server.isReachable = false;
      store.apply([{ kind: 'moveFeature', featureId: 'h1', by: { x: 5, y: 0 } }]);
      await arrive();
      server.change([{ kind: 'removeFeature', featureId: 'h1' }]);
      server.isReachable = true;
      await store.settle();
      expect(holes(store)).toEqual([]);
      expect(store.history().past).toHaveLength(0);
      expect(store.news()).toContain('Imogen Harrow changed this draft: Take hole away');
      expect(store.news()).toContain('Your “Move hole 5 mm” no longer fits');
    });

    it('undoes one’s own step after the other changed something else', async () => {
      const store = await openStore();
      store.apply([addHole('mine', 20)]);
      await arrive();
      server.change([widen]);
      await arrive();
      expect(store.undoLabel()).toBe('Add hole');
      store.undo();
      await arrive();
      expect(holes(store)).toEqual([]);
      expect(store.document()?.layout.outer.edges[1]?.start.x).toBe(110);
      expect(server.document).toEqual(store.document());
    });

    it('leaves a step standing that the other has changed since, and undoes the one before', async () => {
      const store = await openStore();
      store.apply([widen]);
      store.apply([addHole('h1', 20)]);
      await arrive();
      server.change([{ kind: 'moveFeature', featureId: 'h1', by: { x: 3, y: 0 } }]);
      await arrive();
      store.undo();
      expect(store.news()).toContain('“Add hole” can’t be undone');
      expect(holes(store)).toEqual(['h1']);
      expect(store.undoLabel()).toBe('Slide edge 10 mm out');
      store.undo();
      await arrive();
      expect(store.document()?.layout.outer).toEqual(plate().layout.outer);
    });
  });

  describe('without a connection', () => {
    it('keeps edits, says so, and sends them when it is back', async () => {
      const store = await openStore();
      server.isReachable = false;
      store.apply([addHole('h1', 20)]);
      store.apply([addHole('h2', 40)]);
      await arrive();
      expect(store.savedWords()).toBe('no connection; 2 edits are kept here and sent when it is back');
      expect(holes(store)).toEqual(['h1', 'h2']);
      server.isReachable = true;
      expect(await store.settle()).toBe(true);
      expect(server.document.layout.features).toHaveLength(2);
    });

    it('waits for an edit that is on its way when asked whether all arrived', async () => {
      const store = await openStore();
      store.apply([addHole('h1', 20)]);
      expect(await store.settle()).toBe(true);
      expect(server.document.layout.features).toHaveLength(1);
    });

    it('counts an edit once whose answer was lost', async () => {
      const store = await openStore();
      server.losesNextAnswer = true;
      store.apply([addHole('h1', 20)]);
      await arrive();
      expect(store.saveState().kind).toBe('unreachable');
      await store.settle();
      expect(server.log).toHaveLength(1);
      expect(store.document()).toEqual(server.document);
    });

    it('brings edits of a closed tab back', async () => {
      const first = await openStore();
      server.isReachable = false;
      first.apply([addHole('h1', 20)]);
      await arrive();
      first.close();
      server.isReachable = true;
      const second = await openStore();
      await arrive();
      expect(holes(second)).toEqual(['h1']);
      expect(server.document.layout.features).toHaveLength(1);
      expect(storage.getItem(`foldwright.unsent.${DRAFT_ID}`)).toBeNull();
    });
  });

  it('stops when the draft was released, and keeps what was not sent in view', async () => {
    const store = await openStore();
    server.refusesWith = 'wrong-state';
    store.apply([addHole('h1', 20)]);
    await arrive();
    expect(store.canEdit()).toBe(false);
    expect(store.savedWords()).toBe('Revision A was released in the meantime.');
    expect(holes(store)).toEqual(['h1']);
  });
});
