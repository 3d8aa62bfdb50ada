import type { Listener } from '../database/listen';
import { listen } from '../database/listen';

/** Wakes the open streams of a workshop when an event of it was committed, by whichever process. */
export interface LiveHub {
  /** @returns a function that ends the subscription */
  subscribe(workshopId: string, wake: () => void): () => void;
  stop(): Promise<void>;
}

export async function openLiveHub(options: { url: string; onError: (error: Error) => void }): Promise<LiveHub> {
  const subscribers = new Map<string, Set<() => void>>();
  const wakeAll = (): void => subscribers.forEach((wakes) => wakes.forEach((wake) => wake()));
  const listener: Listener = await listen({
    url: options.url,
    channel: 'foldwright_events',
    onNotice: (workshopId) => subscribers.get(workshopId)?.forEach((wake) => wake()),
    onConnected: wakeAll,
    onError: options.onError,
  });
  return {
    subscribe(workshopId, wake) {
      const wakes = subscribers.get(workshopId) ?? new Set();
      subscribers.set(workshopId, wakes.add(wake));
      return () => {
        wakes.delete(wake);
        if (wakes.size === 0 && subscribers.get(workshopId) === wakes) subscribers.delete(workshopId);
      };
    },
    stop: () => listener.stop(),
  };
}
