import type { Point } from '@foldwright/shared/geometry/point';
import { applyCommands } from '@foldwright/shared/part/apply-command';
import type { PartCommand } from '@foldwright/shared/part/commands';
import type { PartDocument } from '@foldwright/shared/part/part-document';
import type { EntityKind, EntityRef } from '../geometry/entity';
import { withBendsKept } from '../geometry/keep-bends';
import { EMPTY_EDITOR, type EditorState, forgetMissing, selectEntity, stepEditor, takeTool } from '../tools/editor';
import {
  type Commit,
  type EditorEvent,
  type Modifiers,
  NO_MODIFIERS,
  type PointerKind,
  type ToolName,
  type ToolSettings,
} from '../tools/tool';

const PX_PER_MM = 4;

const SETTINGS: ToolSettings = {
  hole: { kind: 'clearance', thread: 'M6', fit: 'medium' },
  slot: { lengthMm: 20, widthMm: 6.6 },
  bend: {
    bendAngleDeg: 90,
    direction: 'towards',
    lengths: { from: 'reference', reference: 'outsideApex' },
    insideRadiusMm: null,
    override: null,
    sideEdges: 'trimmed',
  },
};

/** Press, drag, type and undo on a document without a page: gestures as a test's sentences. */
export class EditorDriver {
  editor: EditorState = EMPTY_EDITOR;
  pointer: PointerKind = 'mouse';
  readonly commits: Commit[] = [];
  private readonly past: PartDocument[] = [];
  private future: PartDocument[] = [];
  private lastFold: string | null = null;
  private idCount = 0;

  constructor(
    public document: PartDocument,
    private readonly selectable: readonly EntityKind[] = ['vertex', 'edge', 'hole', 'slot', 'bend'],
    private readonly canEdit = true,
  ) {}

  take(tool: ToolName): this {
    this.editor = takeTool(this.editor, tool);
    return this;
  }

  select(ref: EntityRef | null): this {
    this.editor = selectEntity(this.editor, ref);
    return this;
  }

  press(at: Point, modifiers: Partial<Modifiers> = {}): this {
    return this.point('press', at, modifiers);
  }

  moveTo(at: Point, modifiers: Partial<Modifiers> = {}): this {
    return this.point('move', at, modifiers);
  }

  release(at: Point, modifiers: Partial<Modifiers> = {}): this {
    return this.point('release', at, modifiers);
  }

  click(at: Point, modifiers: Partial<Modifiers> = {}): this {
    return this.press(at, modifiers).release(at, modifiers);
  }

  /** A press, a way in two moves, a release. */
  drag(from: Point, to: Point, modifiers: Partial<Modifiers> = {}): this {
    const half = { x: (from.x + to.x) / 2, y: (from.y + to.y) / 2 };
    return this.press(from).moveTo(half, modifiers).moveTo(to, modifiers).release(to, modifiers);
  }

  key(key: string, modifiers: Partial<Modifiers> = {}): this {
    return this.send({ kind: 'key', key, modifiers: { ...NO_MODIFIERS, ...modifiers } });
  }

  escape(): this {
    return this.send({ kind: 'cancel' });
  }

  undo(): this {
    const before = this.past.pop();
    if (before === undefined) return this;
    this.future.push(this.document);
    return this.goTo(before);
  }

  redo(): this {
    const after = this.future.pop();
    if (after === undefined) return this;
    this.past.push(this.document);
    return this.goTo(after);
  }

  /** What is drawn: the document with the gesture's draft on top. */
  get drawn(): PartDocument {
    return applyCommands(this.document, this.editor.draft);
  }

  get lastCommands(): readonly PartCommand[] {
    return this.commits.at(-1)?.commands ?? [];
  }

  private goTo(document: PartDocument): this {
    this.document = document;
    this.lastFold = null;
    this.editor = forgetMissing(this.editor, document);
    return this;
  }

  private point(kind: 'press' | 'move' | 'release', at: Point, modifiers: Partial<Modifiers>): this {
    const atPx = { xPx: at.x * PX_PER_MM, yPx: -at.y * PX_PER_MM };
    return this.send({ kind, at, atPx, pointer: this.pointer, modifiers: { ...NO_MODIFIERS, ...modifiers } });
  }

  private send(event: EditorEvent): this {
    const { editor, commit } = stepEditor(this.editor, event, {
      document: this.document,
      pxPerMm: PX_PER_MM,
      settings: SETTINGS,
      selectable: this.selectable,
      canEdit: this.canEdit,
      newId: () => `new-${(this.idCount += 1)}`,
    });
    this.editor = editor;
    if (commit !== null) this.keep(commit);
    return this;
  }

  private keep(commit: Commit): void {
    const commands = withBendsKept(this.document, commit.commands);
    const folds = commit.fold !== null && commit.fold === this.lastFold;
    if (!folds) this.past.push(this.document);
    this.document = applyCommands(this.document, commands);
    this.future = [];
    this.lastFold = commit.fold;
    this.commits.push({ ...commit, commands });
    this.editor = forgetMissing(this.editor, this.document);
  }
}
