import { ChangeDetectionStrategy, Component, ElementRef, computed, inject, input, output } from '@angular/core';
import { Pictogram } from '@foldwright/ui/pictogram/pictogram';
import type { PictogramName } from '@foldwright/ui/pictogram/pictogram-paths';
import type { EntityWords } from '../entity-words';
import { type EntityKind, type EntityRef, isSameEntity } from '../geometry/entity';
import { type EditorEvent, type Modifiers } from '../tools/tool';

const ICONS: Readonly<Record<EntityKind, PictogramName>> = {
  vertex: 'square-up',
  edge: 'edge-length',
  hole: 'clearance-hole',
  slot: 'slot',
  bend: 'bend-towards',
};

/**
 * Everything that is drawn, as a list: the drawing for those who don't use a pointer, and the quick way for those who know
 * what they want. Arrows walk, Enter edits, Delete takes away; Alt with arrows is left to the nudge keys of the row.
 */
@Component({
  selector: 'fw-entity-list',
  imports: [Pictogram],
  templateUrl: './entity-list.html',
  styleUrl: './entity-list.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class EntityList {
  private readonly host: HTMLElement = inject<ElementRef<HTMLElement>>(ElementRef).nativeElement;

  readonly entities = input.required<readonly EntityWords[]>();
  readonly selection = input<EntityRef | null>(null);

  readonly selected = output<EntityRef>();
  /** Enter on a row: its field should take the caret. */
  readonly entered = output<EntityRef>();
  /** Delete, or an arrow that nudges (held with Ctrl, because plain arrows walk the list). */
  readonly acted = output<EditorEvent>();

  /** The row that Tab reaches. */
  protected readonly stop = computed(() => {
    const entities = this.entities();
    const at = entities.findIndex(({ ref }) => isSameEntity(ref, this.selection()));
    return Math.max(0, at);
  });

  protected icon(kind: EntityKind): PictogramName {
    return ICONS[kind];
  }

  protected isSelected(ref: EntityRef): boolean {
    return isSameEntity(ref, this.selection());
  }

  protected press(event: KeyboardEvent, index: number): void {
    const entity = this.entities()[index];
    if (entity === undefined) return;
    if (event.key.startsWith('Arrow') && (event.ctrlKey || event.shiftKey || event.altKey || isSideways(event.key))) {
      event.preventDefault();
      if (!this.isSelected(entity.ref)) this.selected.emit(entity.ref);
      this.acted.emit({ kind: 'key', key: event.key, modifiers: modifiersOf(event) });
      return;
    }
    const last = this.entities().length - 1;
    const target = { ArrowDown: index + 1, ArrowUp: index - 1, Home: 0, End: last }[event.key];
    if (target !== undefined) {
      event.preventDefault();
      this.walkTo(Math.max(0, Math.min(last, target)));
    } else if (event.key === 'Enter') {
      event.preventDefault();
      this.entered.emit(entity.ref);
    } else if (event.key === 'Delete' || event.key === 'Backspace') {
      event.preventDefault();
      this.selected.emit(entity.ref);
      this.acted.emit({ kind: 'key', key: 'Delete', modifiers: modifiersOf(event) });
    }
  }

  private walkTo(index: number): void {
    const entity = this.entities()[index];
    if (entity === undefined) return;
    this.selected.emit(entity.ref);
    this.host.querySelectorAll<HTMLElement>('[role="option"]').item(index)?.focus();
  }
}

/** Left and right have nowhere to walk in a list, so they nudge without a key held. */
function isSideways(key: string): boolean {
  return key === 'ArrowLeft' || key === 'ArrowRight';
}

function modifiersOf(event: KeyboardEvent): Modifiers {
  return { ctrl: false, shift: event.shiftKey, alt: event.altKey };
}
