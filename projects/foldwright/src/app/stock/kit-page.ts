import { ChangeDetectionStrategy, Component, computed, effect, inject, input, untracked } from '@angular/core';
import {
  FormArray,
  type FormControl,
  type FormGroup,
  NonNullableFormBuilder,
  ReactiveFormsModule,
  Validators,
} from '@angular/forms';
import { MatButtonModule } from '@angular/material/button';
import { Router } from '@angular/router';
import type { Kit, KitInput } from '@foldwright/shared/contracts/kits';
import { FINISHES } from '@foldwright/shared/stock/finishes';
import { finishWords } from '@foldwright/ui/formed-preview/finish-look';
import { OnceCall } from '../api/once-call';
import { SessionApi } from '../api/session-api';
import { StockApi } from '../api/stock-api';

type LineForm = FormGroup<{ what: FormControl<string>; finishId: FormControl<string>; quantity: FormControl<number> }>;
/** Stands for a finish that the customer chooses. */
const CHOICE = '';

/** A kit and its bill of materials: a new one, or one to change. */
@Component({
  selector: 'fw-kit-page',
  imports: [MatButtonModule, ReactiveFormsModule],
  templateUrl: './kit-page.html',
  styleUrl: './kit-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class KitPage {
  private readonly api = inject(StockApi);
  private readonly router = inject(Router);
  private readonly builder = inject(NonNullableFormBuilder);
  protected readonly canMake = inject(SessionApi).canMake;

  /** Id of the kit, or “new”. */
  readonly kitId = input.required<string>();

  private readonly kits = this.api.kits();
  private readonly released = this.api.brackets();
  private readonly stock = this.api.stock();
  protected readonly kit = computed(() => this.kits.value()?.kits.find(({ id }) => id === this.kitId()) ?? null);
  protected readonly brackets = computed(() => this.released.value()?.brackets ?? []);
  protected readonly hardware = computed(() => (this.stock.value()?.hardware ?? []).map((row) => row.hardware));
  protected readonly finishes = FINISHES.map(({ id }) => ({ id, words: finishWords(id) }));
  protected readonly once = new OnceCall();
  protected readonly lines = new FormArray<LineForm>([]);
  protected readonly form = this.builder.group({
    name: ['', [Validators.required, Validators.maxLength(80)]],
    note: ['', Validators.maxLength(500)],
  });
  private filledFor: string | null = null;

  constructor() {
    effect(() => {
      const kit = this.kit();
      const isNew = this.kitId() === 'new';
      untracked(() => {
        if (isNew && this.lines.length === 0) this.addLine();
        // A form that somebody types into is filled once, not again with every reading.
        if (kit !== null && this.filledFor !== kit.id) this.fill(kit);
      });
    });
  }

  protected addLine(): void {
    this.lines.push(this.lineForm('', CHOICE, 1));
  }

  protected takeOut(at: number): void {
    this.lines.removeAt(at);
  }

  protected isBracket(line: LineForm): boolean {
    return line.controls.what.value.startsWith('b:');
  }

  protected async save(): Promise<void> {
    this.form.markAllAsTouched();
    this.lines.markAllAsTouched();
    if (this.form.invalid || this.lines.invalid || this.lines.length === 0) return;
    const body: KitInput = { ...this.form.getRawValue(), lines: this.lines.controls.map(lineInput) };
    const kit = this.kit();
    const kept = await this.once.run((key) =>
      kit === null ? this.api.addKit(body, key) : this.api.changeKit(kit.id, body, kit.revision),
    );
    if (kept !== undefined) await this.router.navigate(['/stock/kits']);
  }

  private fill(kit: Kit): void {
    this.filledFor = kit.id;
    this.form.setValue({ name: kit.name, note: kit.note });
    this.lines.clear();
    for (const line of kit.lines) {
      const form =
        line.kind === 'bracket'
          ? this.lineForm(`b:${line.bracket.revisionId}`, line.finishId ?? CHOICE, line.quantity)
          : this.lineForm(`h:${line.hardware.id}`, CHOICE, line.quantity);
      this.lines.push(form);
    }
  }

  private lineForm(what: string, finishId: string, quantity: number): LineForm {
    return this.builder.group({
      what: [what, Validators.required],
      finishId: [finishId],
      quantity: [quantity, [Validators.required, Validators.min(1), Validators.pattern(/^\d+$/)]],
    });
  }
}

function lineInput(line: LineForm): KitInput['lines'][number] {
  const { what, finishId, quantity } = line.getRawValue();
  const id = what.slice(2);
  return what.startsWith('b:')
    ? { kind: 'bracket', revisionId: id, finishId: finishId === CHOICE ? null : finishId, quantity }
    : { kind: 'hardware', hardwareId: id, quantity };
}
