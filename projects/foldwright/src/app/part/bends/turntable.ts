import { ChangeDetectionStrategy, Component, computed, input, signal } from '@angular/core';
import type { Development } from '@foldwright/shared/bending/development';
import { layOutMesh } from '@foldwright/shared/bending/formed-mesh';
import type { PartDocument } from '@foldwright/shared/part/part-document';
import { FormedPreview } from '@foldwright/ui/formed-preview/formed-preview';
import { FoldArc, type FoldChange } from '@foldwright/ui/part-viewer/fold-arc';
import { PartViewer } from '@foldwright/ui/part-viewer/part-viewer';

/** Chord error of what turns on the disc, mm: a third of a pixel at its usual size. */
const CHORD_MM = 0.25;

/** The part on its disc with the arc that folds it, and one formed size in words. */
@Component({
  selector: 'fw-turntable',
  imports: [FoldArc, FormedPreview, PartViewer],
  templateUrl: './turntable.html',
  styleUrl: './turntable.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Turntable {
  readonly development = input.required<Development>();
  readonly document = input.required<PartDocument>();
  readonly name = input.required<string>();

  protected readonly fold = signal(1);
  protected readonly isHeld = signal(false);
  protected readonly mesh = computed(() => layOutMesh(this.development(), CHORD_MM));
  protected readonly hasBends = computed(() => this.development().bendTable.length > 0);
  protected readonly label = computed(() => {
    const { min, max } = this.development().formedBox;
    const sizes = [max.x - min.x, max.y - min.y, max.z - min.z].map((size) => size.toFixed(1)).join(' by ');
    return `${this.name()} on the turntable, formed ${sizes} mm`;
  });
  protected readonly sizeWords = computed(() => {
    const size = this.development().formedSizes[0];
    if (size === undefined) return null;
    return `${size.label} ${size.valueMm.toFixed(1)} ± ${size.spreadMm.toFixed(1)}. Most of it is ${size.mostlyFrom}.`;
  });

  protected take({ fold, isHeld }: FoldChange): void {
    this.isHeld.set(isHeld);
    this.fold.set(fold);
  }
}
