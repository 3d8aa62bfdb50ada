import { inject } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import type { LiveEvent } from '@foldwright/shared/contracts/system';
import { auditTime, filter, merge } from 'rxjs';
import { LiveEvents } from './live-events';

const REREAD_AFTER_MS = 300;

/** Reads again when something of these kinds happened in the workshop; to be called while a component is made. */
export function rereadOn(kinds: readonly LiveEvent['kind'][], reload: () => void): void {
  const live = inject(LiveEvents);
  merge(live.events.pipe(filter(({ kind }) => kinds.includes(kind))), live.resumed)
    .pipe(auditTime(REREAD_AFTER_MS), takeUntilDestroyed())
    .subscribe(() => reload());
}
