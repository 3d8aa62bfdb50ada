import { ChangeDetectionStrategy, Component, computed, effect, inject, input, signal, untracked } from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { FormControl, NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButtonModule } from '@angular/material/button';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInputModule } from '@angular/material/input';
import { Router } from '@angular/router';
import { developPart } from '@foldwright/shared/part/develop-part';
import { StarterError } from '@foldwright/shared/part/folded-starters';
import { starterDocument } from '@foldwright/shared/part/starter-document';
import { findMaterial } from '@foldwright/shared/stock/materials';
import { formatDecimal } from '@foldwright/shared/units/length';
import { formatMass } from '@foldwright/shared/units/quantity';
import { drawPart } from '@foldwright/ui/formed-preview/draw-part';
import { FormedPreview } from '@foldwright/ui/formed-preview/formed-preview';
import { LengthInput } from '@foldwright/ui/length-input/length-input';
import { Pictogram } from '@foldwright/ui/pictogram/pictogram';
import { ScaleBar } from '@foldwright/ui/scale-bar/scale-bar';
import { newIdempotencyKey } from '../api/api-client';
import { ApiProblem } from '../api/api-problem';
import { PartsApi } from '../api/parts-api';
import { PhotosApi } from '../api/photos-api';
import { OriginChoice } from './origin-choice';
import { SheetSketch } from './sheet-sketch';
import { type Origin, hasAngle, isOrigin, sizeFieldsOf, starterFrom } from './starter-form';

const PREVIEW_ROOM_PX = { width: 420, height: 300 };
const LARGEST_PX_PER_MM = 4;

/** Starts a part: from a photo of a mock-up, or from the typed sizes of a shape that is drawn as it is typed. */
@Component({
  selector: 'fw-start-part',
  imports: [
    FormedPreview,
    LengthInput,
    MatButtonModule,
    MatFormFieldModule,
    MatInputModule,
    OriginChoice,
    Pictogram,
    ReactiveFormsModule,
    ScaleBar,
    SheetSketch,
  ],
  templateUrl: './start-part.html',
  styleUrl: './start-part.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class StartPart {
  private readonly partsApi = inject(PartsApi);
  private readonly router = inject(Router);
  private readonly builder = inject(NonNullableFormBuilder);
  private readonly photos = inject(PhotosApi);

  /** `mock-up`, a shape, or `dimensions` for the shape people start with most. */
  readonly from = input<string>();

  protected readonly form = this.builder.group({
    name: ['', [Validators.required, Validators.pattern(/\S/), Validators.maxLength(80)]],
    number: ['', [Validators.maxLength(24)]],
    sizes: this.builder.group({
      widthMm: new FormControl<number | null>(60),
      heightMm: new FormControl<number | null>(80),
      baseMm: new FormControl<number | null>(80),
      flangeMm: new FormControl<number | null>(40),
      leftFlangeMm: new FormControl<number | null>(30),
      rightFlangeMm: new FormControl<number | null>(30),
      webMm: new FormControl<number | null>(50),
      lowerFlangeMm: new FormControl<number | null>(40),
      upperFlangeMm: new FormControl<number | null>(40),
      topMm: new FormControl<number | null>(60),
      sideMm: new FormControl<number | null>(40),
      brimMm: new FormControl<number | null>(30),
      lengthMm: new FormControl<number | null>(140),
      gussetMm: new FormControl<number | null>(35),
      bendAngleDeg: new FormControl<number | null>(90, [Validators.required, Validators.min(5), Validators.max(165)]),
    }),
  });
  protected readonly origin = signal<Origin>('mock-up');
  protected readonly problem = signal<ApiProblem | null>(null);
  protected readonly isSending = signal(false);
  protected readonly sheetA4 = this.photos.scaleSheetUrl('A4', 'light');
  protected readonly sheetLetter = this.photos.scaleSheetUrl('Letter', 'light');
  /** One key per page: a second click, or a second try after a lost answer, starts no second part. */
  private idempotencyKey = newIdempotencyKey();

  private readonly sizes = toSignal(this.form.controls.sizes.valueChanges, { initialValue: null });
  protected readonly sizeFields = computed(() => sizeFieldsOf(this.origin()));
  protected readonly hasAngle = computed(() => hasAngle(this.origin()));
  protected readonly starter = computed(() => {
    // Read for its changes; the raw value is whole where the change may lack disabled fields.
    this.sizes();
    const sizes = this.form.controls.sizes;
    return this.origin() !== 'mock-up' && sizes.controls.bendAngleDeg.invalid
      ? null
      : starterFrom(this.origin(), sizes.getRawValue());
  });
  private readonly started = computed(() => {
    const starter = this.starter();
    if (starter === null) return { document: null, fault: null };
    try {
      return { document: starterDocument(starter), fault: null };
    } catch (error) {
      // Sizes that don't go together: the gusset taller than its flange, a tray too small for one.
      if (!(error instanceof StarterError)) throw error;
      return { document: null, fault: error.message };
    }
  });
  protected readonly document = computed(() => this.started().document);
  protected readonly pxPerMm = computed(() => {
    const document = this.document();
    if (document === null) return 1;
    const { widthPx, heightPx } = drawPart(document, 'blued');
    return Math.min(LARGEST_PX_PER_MM, PREVIEW_ROOM_PX.width / widthPx, PREVIEW_ROOM_PX.height / heightPx);
  });
  /** What the sizes come to in the sheet the part starts with; or why they don't. */
  protected readonly outcome = computed(() => {
    const { document, fault } = this.started();
    if (fault !== null) return { problem: fault, facts: null };
    if (document === null) return null;
    const result = developPart(document, 'production');
    if (!result.ok) return { problem: result.problems[0]?.message ?? 'These sizes can’t be unfolded.', facts: null };
    const { flat, stock } = result.development;
    const size = (extentMm: number): string => formatDecimal(extentMm, 1);
    const material = findMaterial(stock.materialId)?.shortName ?? stock.materialName;
    return {
      problem: null,
      facts: {
        blank: `${size(flat.bounds.max.x - flat.bounds.min.x)} × ${size(flat.bounds.max.y - flat.bounds.min.y)} mm`,
        mass: formatMass(flat.massKg),
        sheet: `${material}, ${formatDecimal(stock.thicknessMm, 2)} mm`,
      },
    };
  });
  protected readonly barMm = computed(() => (this.pxPerMm() > 1.6 ? 50 : 100));

  constructor() {
    effect(() => {
      const from = this.from();
      untracked(() => this.origin.set(isOrigin(from) ? from : from === 'dimensions' ? 'l-bracket' : 'mock-up'));
    });
  }

  protected choose(origin: Origin): void {
    this.origin.set(origin);
    this.idempotencyKey = newIdempotencyKey();
  }

  protected async start(): Promise<void> {
    this.form.markAllAsTouched();
    const starter = this.starter();
    const wantsSizes = this.origin() !== 'mock-up';
    if (this.form.controls.name.invalid || this.form.controls.number.invalid || this.isSending()) return;
    if (wantsSizes && (starter === null || this.outcome()?.problem !== null)) return;
    this.isSending.set(true);
    this.problem.set(null);
    try {
      const { name, number } = this.form.getRawValue();
      const wanted = number.trim() === '' ? {} : { number: number.trim() };
      const part = await this.partsApi.create({ name: name.trim(), ...wanted, starter }, this.idempotencyKey);
      await this.router.navigate(['/parts', part.id, wantsSizes ? 'outline' : 'mock-up']);
    } catch (error) {
      if (!(error instanceof ApiProblem)) throw error;
      this.problem.set(error);
      this.idempotencyKey = newIdempotencyKey();
    } finally {
      this.isSending.set(false);
    }
  }
}
