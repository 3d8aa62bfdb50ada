import { ChangeDetectionStrategy, Component, computed, input, signal } from '@angular/core';
import { layOutMesh } from '@foldwright/shared/bending/formed-mesh';
import { developPart } from '@foldwright/shared/part/develop-part';
import type { PartDocument } from '@foldwright/shared/part/part-document';
import { FormedPreview } from '@foldwright/ui/formed-preview/formed-preview';
import { FoldArc, type FoldChange } from '@foldwright/ui/part-viewer/fold-arc';
import { PartViewer } from '@foldwright/ui/part-viewer/part-viewer';

/** Chord error of what turns on the disc, mm. */
const CHORD_MM = 0.25;

/** A bracket on a disc that a customer can turn, fold flat and fold up again. */
@Component({
  selector: 'fw-piece-turntable',
  imports: [FoldArc, FormedPreview, PartViewer],
  template: `
    @if (mesh(); as mesh) {
      <fw-part-viewer [mesh]="mesh" [fold]="fold()" [isHeld]="isHeld()" [label]="name() + ' on the turntable'">
        <fw-formed-preview [document]="document()" madeOf="alloy" [pxPerMm]="1" [label]="name()" />
      </fw-part-viewer>
      <fw-fold-arc [fold]="fold()" (changed)="take($event)" />
    }
  `,
  styles: `
    :host {
      display: grid;
      gap: 8px;
      justify-items: center;
      padding: 12px 20px 20px;
    }

    fw-part-viewer {
      width: min(520px, 100%);
      height: 360px;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PieceTurntable {
  readonly document = input.required<PartDocument>();
  readonly name = input.required<string>();

  protected readonly fold = signal(1);
  protected readonly isHeld = signal(false);
  protected readonly mesh = computed(() => {
    const developed = developPart(this.document(), 'production');
    return developed.ok ? layOutMesh(developed.development, CHORD_MM) : null;
  });

  protected take({ fold, isHeld }: FoldChange): void {
    this.isHeld.set(isHeld);
    this.fold.set(fold);
  }
}
