import { ChangeDetectionStrategy, Component, computed, inject, input, output, signal } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButtonModule } from '@angular/material/button';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatSelectModule } from '@angular/material/select';
import type { TemplateKind } from '@foldwright/shared/part/part-document';
import { TEMPLATE_KINDS } from '@foldwright/shared/stock/template-kinds';
import { LengthInput } from '@foldwright/ui/length-input/length-input';
import { Pictogram } from '@foldwright/ui/pictogram/pictogram';
import type { PhotoFacts } from '../../api/photos-api';
import type { UploadState } from './mock-up-store';

/** Largest file the server takes; told before a phone sends it in vain. */
const LARGEST_BYTES = 25 * 1024 * 1024;
const TAKEN_TYPES: readonly string[] = ['image/jpeg', 'image/png', 'image/webp'];

/** Where a photo comes in: what to print and lay out first, what the template is made of, then drop, choose or take one. */
@Component({
  selector: 'fw-photo-intake',
  imports: [LengthInput, MatButtonModule, MatFormFieldModule, MatSelectModule, Pictogram, ReactiveFormsModule],
  templateUrl: './photo-intake.html',
  styleUrl: './photo-intake.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PhotoIntake {
  private readonly forms = inject(NonNullableFormBuilder);

  readonly a4Url = input.required<string>();
  readonly letterUrl = input.required<string>();
  readonly upload = input<UploadState | null>(null);
  /** Whether a photo is the next thing to do; then the button wears chalk. */
  readonly isNext = input(true);

  readonly sent = output<{ readonly facts: PhotoFacts; readonly file: File }>();
  readonly stopped = output<void>();

  protected readonly kinds = TEMPLATE_KINDS;
  protected readonly isOver = signal(false);
  protected readonly refusal = signal<string | null>(null);
  protected readonly percent = computed(() => Math.round((this.upload()?.share ?? 0) * 100));

  protected readonly form = this.forms.group({
    templateKind: this.forms.control<TemplateKind>('single-wall'),
    thicknessMm: this.forms.control<number | null>(3, [Validators.required]),
    rulerXMm: this.forms.control<number | null>(100, [Validators.required]),
    rulerYMm: this.forms.control<number | null>(100, [Validators.required]),
  });

  /** Another kind brings its usual thickness; what a person measured since is theirs to type again. */
  protected takeUsualThickness(kind: TemplateKind): void {
    const usual = TEMPLATE_KINDS.find(({ id }) => id === kind)?.usualThicknessMm ?? null;
    this.form.controls.thicknessMm.setValue(usual);
  }

  protected over(event: DragEvent): void {
    event.preventDefault();
    this.isOver.set(true);
  }

  protected drop(event: DragEvent): void {
    event.preventDefault();
    this.isOver.set(false);
    this.take(event.dataTransfer?.files[0]);
  }

  protected choose(field: HTMLInputElement): void {
    this.take(field.files?.[0]);
    // The same file can be chosen again after it was refused.
    field.value = '';
  }

  private take(file: File | undefined): void {
    if (file === undefined) return;
    const { templateKind, thicknessMm, rulerXMm, rulerYMm } = this.form.getRawValue();
    if (this.form.invalid || thicknessMm === null || rulerXMm === null || rulerYMm === null) {
      this.form.markAllAsTouched();
      this.refusal.set('Say first how thick the template is and what the rulers measure. The photo was not sent.');
      return;
    }
    const reason = refuse(file);
    this.refusal.set(reason);
    if (reason === null) {
      this.sent.emit({ facts: { templateKind, templateThicknessMm: thicknessMm, rulerXMm, rulerYMm }, file });
    }
  }
}

function refuse(file: File): string | null {
  if (!TAKEN_TYPES.includes(file.type)) {
    return `${file.name} is no JPEG, PNG or WebP. Export it as one of these and choose it again.`;
  }
  if (file.size > LARGEST_BYTES) {
    return `${file.name} has ${Math.ceil(file.size / (1024 * 1024))} MB; 25 MB is the most. Send a smaller copy; a phone’s own JPEG is enough.`;
  }
  return null;
}
