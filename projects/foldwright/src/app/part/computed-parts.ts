import { Injectable, type Signal, computed, effect, inject, signal, untracked } from '@angular/core';
import { toObservable, toSignal } from '@angular/core/rxjs-interop';
import type { BendRow, Development, FlatPattern, FormedBox, FormedSize } from '@foldwright/shared/bending/development';
import type { ComputedPart } from '@foldwright/shared/contracts/development-schema';
import { developPart } from '@foldwright/shared/part/develop-part';
import type { PartDocument, StockRole } from '@foldwright/shared/part/part-document';
import { checkDevelopedPart } from '@foldwright/shared/rules/check-part';
import type { Finding } from '@foldwright/shared/rules/finding';
import { audit, timer } from 'rxjs';
import { problemFromError } from '../api/api-problem';
import { DraftsApi } from '../api/drafts-api';
import { BoardEditor } from './drawing-board/board-editor';
import { PartStore } from './part-store';
import { stockWords } from './stock-words';

/** Flat pattern and tables of the part in one sheet; null when it can't be developed. */
export interface Figures {
  readonly flat: FlatPattern;
  readonly bendTable: readonly BendRow[];
  readonly formedBox: FormedBox;
  readonly formedSizes: readonly FormedSize[];
}

/** The part in one of its sheets, as far as it is known now. */
export interface PartInStock {
  readonly role: StockRole;
  readonly stockLabel: string;
  readonly figures: Figures | null;
  readonly findings: readonly Finding[];
  /** `server`: the server computed it for what is drawn. `preview`: the same kernel did here, until the server has. */
  readonly origin: 'server' | 'preview';
  /** For folding on the screen; computed here in either case. */
  readonly development: Development | null;
}

interface Served {
  readonly draftId: string;
  readonly revision: number;
  readonly computed: ComputedPart;
}

/** How often figures follow a hand that moves, ms. */
const GESTURE_STEP_MS = 80;

const ROLES = ['trial', 'production'] as const satisfies readonly StockRole[];

/**
 * What the part comes to in its two sheets. The server's figures are shown as soon as they belong to what is drawn; in
 * between, and while a hand moves, the same kernel computes them here, so nothing ever goes blank.
 */
@Injectable()
export class ComputedParts {
  private readonly store = inject(PartStore);
  private readonly editor = inject(BoardEditor);
  private readonly draftsApi = inject(DraftsApi);

  private readonly served: Readonly<Record<StockRole, ReturnType<typeof signal<Served | null>>>> = {
    trial: signal<Served | null>(null),
    production: signal<Served | null>(null),
  };

  /**
   * What the figures are computed from: what is drawn, one turn later, so that the drawing answers a hand within a frame;
   * while a gesture lasts, a few times a second.
   */
  private readonly followed = toSignal(
    toObservable(computed(() => ({ document: this.editor.drawn(), isMoving: this.editor.isInGesture() }))).pipe(
      audit(({ isMoving }) => timer(isMoving ? GESTURE_STEP_MS : 0)),
    ),
    { initialValue: null },
  );
  private readonly figured = computed(() => {
    const drawn = this.editor.drawn();
    return drawn === null ? null : (this.followed()?.document ?? drawn);
  });
  private readonly isMoving = computed(() => this.followed()?.isMoving === true);

  readonly trial = this.inStock('trial');
  readonly production = this.inStock('production');

  constructor() {
    effect(() => {
      const draftId = this.store.draftId();
      const revision = this.store.revision();
      if (draftId === null || !this.store.isSettled()) return;
      untracked(() => {
        for (const role of ROLES) void this.fetch(draftId, role, revision);
      });
    });
  }

  of(role: StockRole): Signal<PartInStock | null> {
    return role === 'trial' ? this.trial : this.production;
  }

  private inStock(role: StockRole): Signal<PartInStock | null> {
    const preview = computed(() => {
      const document = this.figured();
      // Nobody can press a mend while a hand moves, and trying them takes longer than a frame.
      return document === null ? null : previewPart(document, role, this.isMoving() ? 'left out' : 'offered');
    });
    return computed(() => {
      const here = preview();
      const served = this.served[role]();
      const isCurrent =
        served !== null &&
        served.draftId === this.store.draftId() &&
        served.revision === this.store.revision() &&
        this.store.isSettled() &&
        this.figured() === this.store.document();
      if (here === null || !isCurrent) return here;
      const { development, findings } = served.computed;
      return { ...here, figures: development, findings, origin: 'server' };
    });
  }

  private async fetch(draftId: string, role: StockRole, revision: number): Promise<void> {
    if (this.served[role]()?.draftId === draftId && this.served[role]()?.revision === revision) return;
    try {
      const answer = await this.draftsApi.compute(draftId, role);
      const known = this.served[role]();
      // Answers may overtake each other; an older one says nothing any more.
      if (known !== null && known.draftId === draftId && known.revision > answer.revision) return;
      this.served[role].set({ draftId, ...answer });
    } catch (error) {
      // The preview stands until the next revision is answered; the line under the name tells of a lost connection.
      problemFromError(error);
    }
  }
}

/** The part in one sheet, computed in the browser by the same kernel that the server uses. */
export function previewPart(
  document: PartDocument,
  role: StockRole,
  mends: 'offered' | 'left out' = 'offered',
): PartInStock {
  const result = developPart(document, role);
  return {
    role,
    stockLabel: stockWords(document.stocks[role]),
    figures: result.ok ? result.development : null,
    findings: checkDevelopedPart(document, role, result, mends),
    origin: 'preview',
    development: result.ok ? result.development : null,
  };
}
