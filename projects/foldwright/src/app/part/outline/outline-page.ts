import { ChangeDetectionStrategy, Component, computed, inject, linkedSignal, signal, viewChild } from '@angular/core';
import type { HolePurpose, Layout } from '@foldwright/shared/bending/layout';
import type { Point } from '@foldwright/shared/geometry/point';
import { arcRadius } from '@foldwright/shared/geometry/segment';
import type { PartCommand } from '@foldwright/shared/part/commands';
import { entityNames } from '@foldwright/shared/part/entity-names';
import { edgeLengthMm } from '@foldwright/shared/part/outline-edge-sizes';
import { SteelRule } from '@foldwright/ui/steel-rule/steel-rule';
import { ComputedParts } from '../computed-parts';
import { BoardEditor, newEntityId } from '../drawing-board/board-editor';
import { BoardFrame } from '../drawing-board/board-frame';
import { DrawingBoard } from '../drawing-board/canvas/drawing-board';
import { chainDimensions, layoutChain, placeDimensions } from '../drawing-board/drawing/dimensions';
import { fieldPlace, overlayOf } from '../drawing-board/drawing/selection-overlay';
import { drawingNotes } from '../drawing-board/drawing/notes';
import { drawingOfLayout } from '../drawing-board/drawing/sheet-drawing';
import { describeEntity, listEntities } from '../drawing-board/entity-words';
import { HoleSizeField } from '../drawing-board/fields/hole-size-field';
import { LengthField } from '../drawing-board/fields/length-field';
import { PairField } from '../drawing-board/fields/pair-field';
import type { EntityRef } from '../drawing-board/geometry/entity';
import { findEdge, findFeature } from '../drawing-board/geometry/layout-edges';
import { BoardViews } from '../drawing-board/panels/board-views';
import { EditList } from '../drawing-board/panels/edit-list';
import { EntityList } from '../drawing-board/panels/entity-list';
import { FindingAtPlace } from '../drawing-board/panels/finding-at-place';
import { handleOf } from '../drawing-board/tools/drag-commands';
import { removeCommand } from '../drawing-board/tools/select-tool';
import type { EditorEvent } from '../drawing-board/tools/tool';
import { verbOfKey } from '../drawing-board/verb-of-key';
import { PartStore } from '../part-store';
import { arcRadiusCommands, placeCommands, splitCommands, squareUpCommands } from './outline-commands';
import { type OutlineField, type OutlineVerb, outlineVerbs, usualField } from './outline-verbs';

const SIDE_LISTS = [
  { id: 'list', label: 'Everything drawn' },
  { id: 'edits', label: 'Edits' },
] as const;

/** The outline step: the sheet on the board, drawn and typed into shape, with the list that does the same by keyboard. */
@Component({
  selector: 'fw-outline-page',
  imports: [
    BoardViews,
    DrawingBoard,
    EditList,
    EntityList,
    FindingAtPlace,
    HoleSizeField,
    LengthField,
    PairField,
    SteelRule,
  ],
  templateUrl: './outline-page.html',
  styleUrl: './outline-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
  providers: [BoardFrame],
})
export class OutlinePage {
  protected readonly store = inject(PartStore);
  protected readonly editor = inject(BoardEditor);
  protected readonly frame = inject(BoardFrame);
  private readonly parts = inject(ComputedParts);

  private readonly board = viewChild(DrawingBoard);
  private readonly field = viewChild(LengthField);

  protected readonly sideLists = SIDE_LISTS;
  protected readonly side = signal<string | null>(null);
  /** An open list has taken the words at the left out of the board. */
  protected readonly insets = computed(() => ({
    top: 62,
    right: 90,
    bottom: 84,
    left: this.side() === null ? 210 : 84,
  }));
  protected readonly announcement = signal('');
  protected readonly layout = computed<Layout | null>(() => this.editor.drawn()?.layout ?? null);
  protected readonly drawing = computed(() => {
    const layout = this.layout();
    return layout === null ? null : drawingOfLayout(layout, this.parts.production()?.development ?? null);
  });
  protected readonly dimensions = computed(() => {
    const layout = this.layout();
    if (layout === null) return [];
    const view = this.frame.viewport();
    return [...chainDimensions(layoutChain(layout), view), ...placeDimensions(layout, this.editor.selection(), view)];
  });
  protected readonly notes = computed(() => {
    const layout = this.layout();
    return layout === null ? [] : drawingNotes(layout, this.frame.viewport(), entityNames(layout));
  });
  protected readonly overlay = computed(() => {
    const layout = this.layout();
    return layout === null ? null : overlayOf(layout, this.editor.editor(), this.frame.viewport(), true);
  });
  protected readonly findings = computed(() => this.parts.production()?.findings ?? []);
  protected readonly marks = this.frame.marksOf(
    this.findings,
    computed(() => 'layout'),
  );
  protected readonly chosenFinding = computed(
    () => this.findings().find(({ id }) => id === this.frame.chosenFindingId()) ?? null,
  );
  protected readonly entities = computed(() => {
    const layout = this.layout();
    return layout === null ? [] : listEntities(layout).filter(({ ref }) => ref.kind !== 'bend');
  });

  /** The field that stands at the chosen thing; choosing another brings its usual one. */
  protected readonly openField = linkedSignal<EntityRef | null, OutlineField | null>({
    source: this.editor.selection,
    computation: (selection) => {
      const layout = this.store.document()?.layout;
      return layout === undefined ? null : usualField(layout, selection);
    },
  });
  protected readonly fieldAt = computed(() => {
    const layout = this.layout();
    const selection = this.editor.selection();
    return layout === null || selection === null ? null : fieldPlace(layout, selection, this.frame.viewport());
  });
  protected readonly what = computed(() => {
    const layout = this.layout();
    const selection = this.editor.selection();
    if (this.editor.editor().tool !== 'select') return ['Put it down', 'Escape leaves it'];
    if (layout === null || selection === null) return ['Nothing chosen', 'tap a line or hole'];
    const { name, detail } = describeEntity(layout, selection);
    return [name, detail.split(',')[0] ?? ''];
  });
  protected readonly verbs = computed(() => {
    const layout = this.layout();
    if (layout === null || !this.store.canEdit()) return [];
    const { selection, tool } = this.editor.editor();
    return outlineVerbs(layout, tool === 'select' ? selection : null, this.openField(), tool);
  });
  protected readonly isPlacing = computed(() => this.editor.editor().tool !== 'select');
  protected readonly label = computed(() => {
    const layout = this.layout();
    const name = this.store.detail()?.name ?? 'the part';
    const { length: holes } = layout?.features ?? [];
    return `Layout of ${name}: ${layout?.outer.edges.length ?? 0} edges, ${holes} holes and slots, ${layout?.bends.length ?? 0} bends`;
  });

  protected readonly edgeLengthMm = computed(() => {
    const placed = this.chosenEdge();
    return placed === null ? 0 : (edgeLengthMm(placed.loop, placed.edge.id) ?? 0);
  });
  protected readonly arcRadiusMm = computed(() => {
    const segment = this.chosenEdge()?.segment;
    return segment?.kind === 'arc' ? arcRadius(segment) : 0;
  });
  protected readonly place = computed<Point>(() => {
    const layout = this.layout();
    const selection = this.editor.selection();
    return (layout === null || selection === null ? null : handleOf(layout, selection)) ?? { x: 0, y: 0 };
  });
  protected readonly chosenHole = computed(() => {
    const feature = this.chosenFeature();
    return feature?.kind === 'hole' ? feature : null;
  });
  protected readonly slotSize = computed(() => {
    const feature = this.chosenFeature();
    if (feature?.kind !== 'slot') return null;
    const apart = Math.hypot(feature.to.x - feature.from.x, feature.to.y - feature.from.y);
    return { lengthMm: apart + feature.widthMm, widthMm: feature.widthMm };
  });
  protected readonly chosenName = computed(() => this.what()[0] ?? '');

  constructor() {
    this.editor.enterStep(['vertex', 'edge', 'hole', 'slot']);
  }

  protected act(event: EditorEvent): void {
    if (event.kind === 'key') {
      if (event.key === 'Enter') return this.focusField();
      const verb = event.modifiers.ctrl ? null : verbOfKey(this.verbs(), event.key);
      if (verb !== null) return this.doVerb(verb);
    }
    if (event.kind === 'press') this.frame.chooseFinding(null);
    const before = this.store.document();
    this.editor.act(event, this.frame.viewport().pxPerMm);
    if (event.kind === 'key' && this.store.document() !== before) this.announceSelection();
  }

  protected doVerb(id: string): void {
    const layout = this.store.document()?.layout;
    const selection = this.editor.selection();
    if (layout === undefined) return;
    switch (id as OutlineVerb | 'undo' | 'redo' | 'fit') {
      case 'undo':
        return this.store.undo();
      case 'redo':
        return this.store.redo();
      case 'fit':
        return this.board()?.fit();
      case 'hole-tool':
        return this.editor.take('hole');
      case 'slot-tool':
        return this.editor.take('slot');
      case 'split-tool':
        return this.editor.take('split');
      case 'square-up':
        return this.change(selection === null ? [] : squareUpCommands(layout, selection.id));
      case 'straighten':
        return this.change(selection === null ? [] : [{ kind: 'setEdgeBulge', edgeId: selection.id, bulge: 0 }]);
      case 'split': {
        if (selection === null) return;
        const newId = newEntityId();
        this.change(splitCommands(layout, selection.id, newId));
        return this.editor.select({ kind: 'vertex', id: newId });
      }
      case 'take-away': {
        const command = selection === null ? null : removeCommand(selection);
        return this.change(command === null ? [] : [command]);
      }
      default:
        this.openField.set(id as OutlineField);
        return this.focusField();
    }
  }

  protected setLength(lengthMm: number): void {
    this.withSelection((edgeId) => [{ kind: 'setEdgeLength', edgeId, lengthMm, hold: 'start' }]);
  }

  protected slide(byMm: number): void {
    this.withSelection((edgeId) => [{ kind: 'slideEdge', edgeId, byMm }]);
  }

  protected round(radiusMm: number): void {
    this.withSelection((edgeId) => [{ kind: 'roundCorner', edgeId, radiusMm, newEdgeId: newEntityId() }]);
  }

  protected setArcRadius(radiusMm: number): void {
    const layout = this.store.document()?.layout;
    if (layout !== undefined) this.withSelection((edgeId) => arcRadiusCommands(layout, edgeId, radiusMm));
  }

  protected setPlace(to: Point): void {
    const layout = this.store.document()?.layout;
    const selection = this.editor.selection();
    if (layout !== undefined && selection !== null) this.change(placeCommands(layout, selection, to));
  }

  protected setPurpose(purpose: HolePurpose): void {
    this.withSelection((featureId) => [{ kind: 'setHolePurpose', featureId, purpose }]);
    // The next hole is most often of the same kind.
    this.editor.changeSettings({ hole: purpose });
  }

  protected setSlotSize(lengthMm: number, widthMm: number): void {
    this.withSelection((featureId) => [{ kind: 'setSlotSize', featureId, lengthMm, widthMm }]);
    this.editor.changeSettings({ slot: { lengthMm, widthMm } });
  }

  protected mend(commands: readonly PartCommand[], label: string): void {
    this.store.apply(commands, { label });
    this.frame.chooseFinding(null);
  }

  /** A finding's note takes the place of the field. */
  protected showFinding(id: string): void {
    this.editor.select(null);
    this.frame.chooseFinding(id);
  }

  protected toggleSide(id: string): void {
    this.side.update((current) => (current === id ? null : id));
  }

  protected enter(ref: EntityRef): void {
    this.editor.select(ref);
    this.focusField();
  }

  protected backToBoard(): void {
    this.board()?.focus();
  }

  private change(commands: readonly PartCommand[]): void {
    if (commands.length > 0 && this.store.apply(commands)) this.announceSelection();
  }

  private withSelection(commandsFor: (id: string) => readonly PartCommand[]): void {
    const selection = this.editor.selection();
    if (selection !== null) this.change(commandsFor(selection.id));
  }

  private focusField(): void {
    // The field is drawn first.
    setTimeout(() => this.field()?.focus());
  }

  private announceSelection(): void {
    const layout = this.layout();
    const selection = this.editor.selection();
    if (layout === null || selection === null) return this.announcement.set('Done');
    const { name, detail } = describeEntity(layout, selection);
    this.announcement.set(`${name}, ${detail}`);
  }

  private readonly chosenEdge = computed(() => {
    const layout = this.layout();
    const selection = this.editor.selection();
    return layout === null || selection?.kind !== 'edge' ? null : findEdge(layout, selection.id);
  });
  private readonly chosenFeature = computed(() => {
    const layout = this.layout();
    const selection = this.editor.selection();
    return layout === null || selection === null ? null : findFeature(layout, selection.id);
  });
}
