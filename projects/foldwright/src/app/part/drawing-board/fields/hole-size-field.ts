import { ChangeDetectionStrategy, Component, computed, effect, inject, input, output } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule } from '@angular/forms';
import type { HolePurpose } from '@foldwright/shared/bending/layout';
import { findHoleDiameterMm, threadsFor } from '@foldwright/shared/stock/hole-diameter';
import {
  CLEARANCE_SOURCE,
  COUNTERSINK_SOURCE,
  RIVET_NUT_SOURCE,
  TAP_DRILL_SOURCE,
} from '@foldwright/shared/stock/fastener-tables';
import { formatDecimal } from '@foldwright/shared/units/length';
import { confidenceWords } from '@foldwright/ui/provenance/provenance-note';
import { LengthField } from './length-field';

type PurposeKind = HolePurpose['kind'];
type ThreadedKind = 'clearance' | 'tapped' | 'rivet-nut' | 'countersunk';
type Fit = 'close' | 'medium' | 'coarse';

const KIND_WORDS: readonly { readonly kind: PurposeKind; readonly word: string }[] = [
  { kind: 'clearance', word: 'A bolt passes through' },
  { kind: 'tapped', word: 'Tapped' },
  { kind: 'rivet-nut', word: 'Rivet nut' },
  { kind: 'countersunk', word: 'Countersunk screw' },
  { kind: 'pass-through', word: 'Hose or cable' },
  { kind: 'plain', word: 'Plain hole' },
  { kind: 'lightening', word: 'Lightening hole' },
];

const SOURCES = {
  clearance: CLEARANCE_SOURCE,
  tapped: TAP_DRILL_SOURCE,
  'rivet-nut': RIVET_NUT_SOURCE,
  countersunk: COUNTERSINK_SOURCE,
} as const;

/** What a hole is for. Thread and fit are chosen; the diameter follows from the fastener tables and says from which. */
@Component({
  selector: 'fw-hole-size-field',
  imports: [LengthField, ReactiveFormsModule],
  templateUrl: './hole-size-field.html',
  styleUrl: './form-card.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class HoleSizeField {
  private readonly builder = inject(NonNullableFormBuilder);

  readonly heading = input.required<string>();
  readonly purpose = input.required<HolePurpose>();
  readonly disabled = input(false);

  readonly changed = output<HolePurpose>();

  protected readonly kinds = KIND_WORDS;
  protected readonly form = this.builder.group({
    kind: this.builder.control<PurposeKind>('clearance'),
    thread: this.builder.control('M5'),
    fit: this.builder.control<Fit>('medium'),
  });
  protected readonly threads = computed(() => {
    const { kind } = this.purpose();
    return isThreaded(kind) ? metricThreads(kind) : [];
  });
  protected readonly diameterMm = computed(() => findHoleDiameterMm(this.purpose()) ?? 0);
  protected readonly diameterWords = computed(() => `Ø ${formatDecimal(this.diameterMm(), 2)}`);
  protected readonly source = computed(() => {
    const { kind } = this.purpose();
    if (!isThreaded(kind)) return null;
    const { source, confidence } = SOURCES[kind];
    return `${source} (${confidenceWords(confidence)})`;
  });

  constructor() {
    // The form is not a signal: it is told when the hole changes, by undo or by somebody else.
    effect(() => {
      const purpose = this.purpose();
      this.form.setValue(
        {
          kind: purpose.kind,
          thread: 'thread' in purpose ? purpose.thread : this.form.controls.thread.value,
          fit: purpose.kind === 'clearance' ? purpose.fit : this.form.controls.fit.value,
        },
        { emitEvent: false },
      );
    });
    effect(() => (this.disabled() ? this.form.disable({ emitEvent: false }) : this.form.enable({ emitEvent: false })));
  }

  protected change(): void {
    this.changed.emit(this.purposeOf(this.diameterMm()));
  }

  protected changeDiameter(diameterMm: number): void {
    this.changed.emit(this.purposeOf(diameterMm));
  }

  private purposeOf(diameterMm: number): HolePurpose {
    const { kind, thread, fit } = this.form.getRawValue();
    if (!isThreaded(kind)) return { kind, diameterMm };
    const known = metricThreads(kind);
    const chosen = known.includes(thread) ? thread : (known[0] ?? 'M5');
    return kind === 'clearance' ? { kind, thread: chosen, fit } : { kind, thread: chosen };
  }
}

/** Documents hold metric threads. */
function metricThreads(kind: ThreadedKind): readonly string[] {
  return threadsFor(kind).filter((thread) => thread.startsWith('M'));
}

function isThreaded(kind: PurposeKind): kind is ThreadedKind {
  return kind in SOURCES;
}
