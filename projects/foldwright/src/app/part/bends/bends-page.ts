import { ChangeDetectionStrategy, Component, computed, inject, linkedSignal, signal, viewChild } from '@angular/core';
import type { BendDeclaration, Layout } from '@foldwright/shared/bending/layout';
import { along, subtract, turnLeft, unit } from '@foldwright/shared/geometry/vector';
import type { PartCommand } from '@foldwright/shared/part/commands';
import { entityNames } from '@foldwright/shared/part/entity-names';
import type { SheetStock, StockRole } from '@foldwright/shared/part/part-document';
import { SteelRule } from '@foldwright/ui/steel-rule/steel-rule';
import { ComputedParts } from '../computed-parts';
import { BoardEditor, newEntityId } from '../drawing-board/board-editor';
import { BoardFrame } from '../drawing-board/board-frame';
import { DrawingBoard } from '../drawing-board/canvas/drawing-board';
import { chainDimensions, flatChain, layoutChain } from '../drawing-board/drawing/dimensions';
import { fieldPlace, overlayOf } from '../drawing-board/drawing/selection-overlay';
import { drawingNotes } from '../drawing-board/drawing/notes';
import { drawingOfFlat, drawingOfLayout } from '../drawing-board/drawing/sheet-drawing';
import { describeEntity, listEntities } from '../drawing-board/entity-words';
import { LengthField } from '../drawing-board/fields/length-field';
import { creaseBesideEdge } from '../drawing-board/geometry/crease';
import type { EntityRef } from '../drawing-board/geometry/entity';
import { findBend } from '../drawing-board/geometry/layout-edges';
import { BoardViews } from '../drawing-board/panels/board-views';
import { EditList } from '../drawing-board/panels/edit-list';
import { EntityList } from '../drawing-board/panels/entity-list';
import { FindingAtPlace } from '../drawing-board/panels/finding-at-place';
import { handleOf, moveHandleTo } from '../drawing-board/tools/drag-commands';
import { removeCommand } from '../drawing-board/tools/select-tool';
import type { EditorEvent } from '../drawing-board/tools/tool';
import { verbOfKey } from '../drawing-board/verb-of-key';
import { PartStore } from '../part-store';
import { referenceWords } from '../reference-words';
import { BendForm } from './bend-form';
import { BendTable } from './bend-table';
import { type BendField, type BendVerb, bendVerbs, usualBendField } from './bend-verbs';
import { SheetPicker } from './sheet-picker';
import { Turntable } from './turntable';

type View = 'layout' | StockRole;

const SIDE_LISTS = [
  { id: 'table', label: 'Bend table' },
  { id: 'sheets', label: 'Sheets' },
  { id: 'list', label: 'Everything drawn' },
  { id: 'edits', label: 'Edits' },
] as const;

/** Where a bend is suggested beside an edge until another distance is typed, mm. */
const FIRST_FLANGE_MM = 20;

/** The bends step: creases across the layout, the flat pattern in both sheets, and the part on its turntable. */
@Component({
  selector: 'fw-bends-page',
  imports: [
    BendForm,
    BendTable,
    BoardViews,
    DrawingBoard,
    EditList,
    EntityList,
    FindingAtPlace,
    LengthField,
    SheetPicker,
    SteelRule,
    Turntable,
  ],
  templateUrl: './bends-page.html',
  styleUrl: './bends-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
  providers: [BoardFrame],
})
export class BendsPage {
  protected readonly store = inject(PartStore);
  protected readonly editor = inject(BoardEditor);
  protected readonly frame = inject(BoardFrame);
  protected readonly parts = inject(ComputedParts);

  private readonly board = viewChild(DrawingBoard);
  private readonly field = viewChild(LengthField);

  protected readonly firstFlangeMm = FIRST_FLANGE_MM;
  protected readonly roles = ['trial', 'production'] as const satisfies readonly StockRole[];
  protected readonly sideLists = SIDE_LISTS;
  protected readonly side = signal<string | null>(null);
  /** The turntable stands to the right of the drawing; the views stand to the left unless a list has pushed them out. */
  protected readonly insets = computed(() => ({
    top: 56,
    right: 370,
    bottom: 84,
    left: this.side() === null ? 190 : 64,
  }));
  protected readonly view = signal<View>('layout');
  protected readonly announcement = signal('');
  protected readonly views = computed(() => [
    { id: 'layout', label: 'Layout' },
    { id: 'trial', label: `Flat, ${this.parts.trial()?.stockLabel ?? 'trial'}` },
    { id: 'production', label: `Flat, ${this.parts.production()?.stockLabel ?? 'production'}` },
  ]);
  protected readonly layout = computed<Layout | null>(() => this.editor.drawn()?.layout ?? null);
  /** The sheet whose findings and bend table are shown: the one that lies on the board, else the production sheet. */
  protected readonly part = computed(() => (this.view() === 'trial' ? this.parts.trial() : this.parts.production()));
  private readonly flat = computed(() => (this.view() === 'layout' ? null : (this.part()?.figures?.flat ?? null)));
  protected readonly isLayout = computed(() => this.view() === 'layout' || this.flat() === null);
  protected readonly drawing = computed(() => {
    const flat = this.flat();
    const layout = this.layout();
    if (flat !== null) return drawingOfFlat(flat);
    return layout === null ? null : drawingOfLayout(layout, this.part()?.development ?? null);
  });
  protected readonly dimensions = computed(() => {
    const flat = this.flat();
    const layout = this.layout();
    if (flat !== null) return chainDimensions(flatChain(flat), this.frame.viewport());
    return layout === null ? [] : chainDimensions(layoutChain(layout), this.frame.viewport());
  });
  protected readonly notes = computed(() => {
    const layout = this.layout();
    if (layout === null || !this.isLayout()) return [];
    return drawingNotes(layout, this.frame.viewport(), entityNames(layout));
  });
  protected readonly overlay = computed(() => {
    const layout = this.layout();
    return layout === null || !this.isLayout()
      ? null
      : overlayOf(layout, this.editor.editor(), this.frame.viewport(), false);
  });
  protected readonly findings = computed(() => this.part()?.findings ?? []);
  protected readonly marks = this.frame.marksOf(
    this.findings,
    computed(() => (this.isLayout() ? 'layout' : 'flat')),
  );
  protected readonly chosenFinding = computed(
    () => this.findings().find(({ id }) => id === this.frame.chosenFindingId()) ?? null,
  );
  protected readonly entities = computed(() => {
    const layout = this.layout();
    return layout === null ? [] : listEntities(layout).filter(({ ref }) => ref.kind === 'bend' || ref.kind === 'edge');
  });
  /** The words under the views: what the lengths on the board mean. */
  protected readonly reference = computed(() => {
    if (!this.isLayout()) return 'the blank as it is cut, mm; chains to the middle of each bend';
    const bends = this.layout()?.bends ?? [];
    const references = new Set(
      bends.map(({ lengths }) => (lengths.from === 'template' ? 'template' : lengths.reference)),
    );
    const [only] = references;
    if (references.size !== 1 || only === undefined)
      return references.size === 0 ? 'lengths in mm' : 'lengths as each bend says, mm';
    return only === 'template'
      ? 'lengths as measured on the template, mm'
      : `lengths to the ${referenceWords(only)}, mm`;
  });

  protected readonly openField = linkedSignal<EntityRef | null, BendField | null>({
    source: this.editor.selection,
    computation: usualBendField,
  });
  protected readonly fieldAt = computed(() => {
    const layout = this.layout();
    const selection = this.editor.selection();
    if (layout === null || selection === null || !this.isLayout()) return null;
    return fieldPlace(layout, selection, this.frame.viewport());
  });
  protected readonly chosenBend = computed(() => {
    const layout = this.store.document()?.layout;
    const selection = this.editor.selection();
    return layout === undefined || selection?.kind !== 'bend' ? null : findBend(layout, selection.id);
  });
  protected readonly hasTemplate = computed(() => (this.store.document()?.template ?? null) !== null);
  protected readonly chosenRow = computed(() => {
    const id = this.chosenBend()?.id;
    return this.part()?.figures?.bendTable.find((row) => row.bendId === id) ?? null;
  });
  protected readonly what = computed(() => {
    const layout = this.layout();
    const selection = this.editor.selection();
    if (this.editor.editor().tool !== 'select') return ['Two points', 'across the sheet'];
    if (layout === null || selection === null) return ['Nothing chosen', 'tap a bend or an edge'];
    const { name, detail } = describeEntity(layout, selection);
    return [name, detail];
  });
  protected readonly chosenName = computed(() => this.what()[0] ?? '');
  protected readonly verbs = computed(() => {
    if (!this.store.canEdit() || !this.isLayout()) return [];
    const { selection, tool } = this.editor.editor();
    return bendVerbs(tool === 'select' ? selection : null, this.openField(), tool);
  });
  protected readonly label = computed(() => {
    const name = this.store.detail()?.name ?? 'the part';
    const bends = this.layout()?.bends.length ?? 0;
    return this.isLayout()
      ? `Layout of ${name}, ${bends} bends`
      : `Flat pattern of ${name} in ${this.part()?.stockLabel ?? ''}`;
  });

  constructor() {
    this.editor.enterStep(['bend', 'edge']);
  }

  protected act(event: EditorEvent): void {
    if (event.kind === 'key') {
      if (event.key === 'Enter') return this.focusField();
      const verb = verbOfKey(this.verbs(), event.key);
      if (verb !== null) return this.doVerb(verb);
    }
    if (event.kind === 'press') this.frame.chooseFinding(null);
    const before = this.store.document();
    this.editor.act(event, this.frame.viewport().pxPerMm);
    if (this.store.document() !== before) this.announceSelection();
  }

  protected doVerb(id: string): void {
    const bend = this.chosenBend();
    switch (id as BendVerb | 'undo' | 'redo' | 'fit') {
      case 'undo':
        return this.store.undo();
      case 'redo':
        return this.store.redo();
      case 'fit':
        return this.board()?.fit();
      case 'bend-line-tool':
        return this.editor.take('bend-line');
      case 'turn-over':
        if (bend === null) return;
        return this.changeBend({ ...bend, direction: bend.direction === 'towards' ? 'away' : 'towards' });
      case 'take-away': {
        const selection = this.editor.selection();
        const command = selection === null ? null : removeCommand(selection);
        return this.change(command === null ? [] : [command]);
      }
      default:
        this.openField.set(id as BendField);
        return this.focusField();
    }
  }

  protected changeBend(bend: BendDeclaration): void {
    this.change([{ kind: 'changeBend', bendId: bend.id, bend }]);
    // The next bend is most often made the same way.
    const { id: _id, line: _line, override: _override, ...rest } = bend;
    this.editor.changeSettings({ bend: { ...rest, override: null } });
  }

  protected bendBeside(distanceMm: number): void {
    const layout = this.store.document()?.layout;
    const selection = this.editor.selection();
    if (layout === undefined || selection?.kind !== 'edge') return;
    const line = creaseBesideEdge(layout, selection.id, distanceMm);
    if (line === null) return this.announcement.set('No bend fits there: that line misses the sheet.');
    const id = newEntityId();
    this.change([{ kind: 'addBend', bend: { ...this.editor.settings().bend, id, line } }]);
    this.editor.select({ kind: 'bend', id });
  }

  protected slideBend(byMm: number): void {
    const layout = this.store.document()?.layout;
    const bend = this.chosenBend();
    if (layout === undefined || bend === null) return;
    const ref = { kind: 'bend', id: bend.id } as const;
    const handle = handleOf(layout, ref);
    if (handle === null) return;
    const normal = turnLeft(unit(subtract(bend.line.to, bend.line.from)));
    this.change(moveHandleTo(layout, ref, along(handle, normal, byMm)));
  }

  protected changeStock(role: StockRole, stock: SheetStock): void {
    this.change([{ kind: 'setStock', role, stock }]);
  }

  protected mend(commands: readonly PartCommand[], label: string): void {
    this.store.apply(commands, { label });
    this.frame.chooseFinding(null);
  }

  protected showView(id: string): void {
    this.view.set(id === 'trial' || id === 'production' ? id : 'layout');
    this.editor.select(null);
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

  protected selectBend(id: string): void {
    this.view.set('layout');
    this.editor.select({ kind: 'bend', id });
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
}
