import type { Severity } from '@foldwright/shared/rules/finding';

/** What is drawn over the sheet for the hand at work: in pixels of the board. */
export interface BoardOverlay {
  /** The chosen thing, in layout coordinates: thick chalk along an edge, a bend or a rim. */
  readonly picked: string;
  /** The thing under the pointer. */
  readonly hovered: string;
  /** Corners to take hold of, px. */
  readonly handles: readonly {
    readonly key: string;
    readonly xPx: number;
    readonly yPx: number;
    readonly isPicked: boolean;
  }[];
  /** What the point is drawn to, px path, and the word for it. */
  readonly guides: string;
  readonly snapWord: string;
  readonly snapAt: { readonly xPx: number; readonly yPx: number } | null;
  /** Extension lines up to the field that stands at the chosen edge, px. */
  readonly measure: string;
}

/** A finding's sign where it is, px. It can be chosen. */
export interface BoardMark {
  readonly id: string;
  readonly severity: Severity;
  readonly label: string;
  readonly xPx: number;
  readonly yPx: number;
  readonly isChosen: boolean;
}
