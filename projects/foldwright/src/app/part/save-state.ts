/** How a draft stands with the server. */
export type SaveState =
  | { readonly kind: 'saved'; readonly at: string }
  | { readonly kind: 'saving'; readonly at: string }
  /** No answer: edits are kept here and sent again by themselves. */
  | { readonly kind: 'unreachable' }
  /** The draft can no longer be changed; the reason is for the person. */
  | { readonly kind: 'closed'; readonly reason: string };

/** The line under the part's name: when it was saved, or what is kept and what happens next. */
export function saveWords(state: SaveState, revision: number, unsentEdits: number, locale = 'en-GB'): string {
  switch (state.kind) {
    case 'saved':
      return `saved at ${clockTime(state.at, locale)}, edit ${revision}`;
    case 'saving':
      return `saving edit ${revision + 1}`;
    case 'unreachable': {
      const edits = unsentEdits === 1 ? '1 edit is' : `${unsentEdits} edits are`;
      return `no connection; ${edits} kept here and sent when it is back`;
    }
    case 'closed':
      return state.reason;
  }
}

function clockTime(at: string, locale: string): string {
  const date = new Date(at);
  if (Number.isNaN(date.getTime())) return '—';
  return new Intl.DateTimeFormat(locale, { hour: '2-digit', minute: '2-digit' }).format(date);
}
