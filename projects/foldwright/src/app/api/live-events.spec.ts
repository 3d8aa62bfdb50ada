import { TestBed } from '@angular/core/testing';
import type { LiveEvent } from '@foldwright/shared/contracts/system';
import { EVENT_SOURCE_FACTORY, LiveEvents, readLiveEvent } from './live-events';

const ID = '5f0c6c0e-5d7c-4a68-9d49-0b8a7f1f2c11';
const EVENT = { kind: 'part-changed', seq: 7, partId: ID };

/** Stands in for the browser's own stream, which jsdom lacks. */
class StubSource {
  onmessage: ((message: MessageEvent<unknown>) => void) | null = null;
  onopen: (() => void) | null = null;
  onerror: (() => void) | null = null;
  readyState = 0;
  isClosed = false;
  private readonly listeners = new Map<string, (message: MessageEvent<unknown>) => void>();

  addEventListener(kind: string, listener: (message: MessageEvent<unknown>) => void): void {
    this.listeners.set(kind, listener);
  }

  send(kind: string, data: unknown): void {
    this.listeners.get(kind)?.(new MessageEvent(kind, { data: JSON.stringify(data) }));
  }

  breakOff(): void {
    this.readyState = 2;
    this.onerror?.();
  }

  close(): void {
    this.isClosed = true;
  }
}

describe('LiveEvents', () => {
  beforeAll(() => Object.defineProperty(globalThis, 'EventSource', { value: { CLOSED: 2 }, configurable: true }));

  function open() {
    const sources: StubSource[] = [];
    const factory = () => {
      const source = new StubSource();
      sources.push(source);
      return source;
    };
    TestBed.configureTestingModule({ providers: [{ provide: EVENT_SOURCE_FACTORY, useValue: factory }] });
    return { live: TestBed.inject(LiveEvents), sources };
  }

  it('opens one stream for all who listen and closes it after the last', () => {
    const { live, sources } = open();
    const [first, second]: [LiveEvent[], LiveEvent[]] = [[], []];
    const one = live.events.subscribe((event) => first.push(event));
    const two = live.events.subscribe((event) => second.push(event));
    expect(sources).toHaveLength(1);
    sources[0]?.send('part-changed', EVENT);
    expect(first).toEqual([EVENT]);
    expect(second).toEqual([EVENT]);
    one.unsubscribe();
    expect(sources[0]?.isClosed).toBe(false);
    two.unsubscribe();
    expect(sources[0]?.isClosed).toBe(true);
  });

  it('opens a stream anew that the server ended, and says that something may be missed', async () => {
    const { live, sources } = open();
    let resumed = 0;
    live.resumed.subscribe(() => resumed++);
    const listening = live.events.subscribe();
    sources[0]?.onopen?.();
    sources[0]?.breakOff();
    await new Promise((resolve) => setTimeout(resolve, 1100));
    expect(sources).toHaveLength(2);
    sources[1]?.onopen?.();
    expect(resumed).toBe(1);
    listening.unsubscribe();
  });

  it('passes over what it doesn’t know', () => {
    expect(readLiveEvent(JSON.stringify(EVENT))).toEqual(EVENT);
    expect(readLiveEvent('{"kind":"moon-changed","seq":1}')).toBeNull();
    expect(readLiveEvent('half a mess')).toBeNull();
    expect(readLiveEvent(12)).toBeNull();
  });
});
