import { DOCUMENT, Injectable, computed, effect, inject, signal } from '@angular/core';

export type Theme = 'light' | 'dark';

const STORED_UNDER = 'foldwright.theme';

/** Light or dark: follows the system until a person chooses, then keeps what was chosen in this browser. */
@Injectable({ providedIn: 'root' })
export class ThemeChoice {
  private readonly document = inject(DOCUMENT);
  private readonly chosen = signal<Theme | null>(this.readStored());
  private readonly system = signal<Theme>(this.readSystem());

  readonly theme = computed(() => this.chosen() ?? this.system());

  constructor() {
    this.mediaQuery()?.addEventListener('change', () => this.system.set(this.readSystem()));
    effect(() => {
      const chosen = this.chosen();
      const root = this.document.documentElement;
      if (chosen === null) delete root.dataset['theme'];
      else root.dataset['theme'] = chosen;
    });
  }

  switch(): void {
    const next: Theme = this.theme() === 'dark' ? 'light' : 'dark';
    this.chosen.set(next);
    try {
      this.document.defaultView?.localStorage.setItem(STORED_UNDER, next);
    } catch {
      // Storage may be switched off in this browser; the choice then lasts as long as the page.
    }
  }

  private readStored(): Theme | null {
    try {
      const stored = this.document.defaultView?.localStorage.getItem(STORED_UNDER);
      return stored === 'light' || stored === 'dark' ? stored : null;
    } catch {
      // As above: without storage the system decides.
      return null;
    }
  }

  private readSystem(): Theme {
    return this.mediaQuery()?.matches === true ? 'dark' : 'light';
  }

  private mediaQuery(): MediaQueryList | null {
    const view = this.document.defaultView;
    return view !== null && typeof view.matchMedia === 'function'
      ? view.matchMedia('(prefers-color-scheme: dark)')
      : null;
  }
}
