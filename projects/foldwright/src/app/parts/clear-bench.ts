import { ChangeDetectionStrategy, Component, inject, input } from '@angular/core';
import { MatButtonModule } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { EmptyBench } from '@foldwright/ui/empty-bench/empty-bench';
import { Pictogram } from '@foldwright/ui/pictogram/pictogram';
import { PhotosApi } from '../api/photos-api';
import { SheetSketch } from './sheet-sketch';

/** The list of parts before there is one: what to do first, and how it is done. */
@Component({
  selector: 'fw-clear-bench',
  imports: [EmptyBench, MatButtonModule, Pictogram, RouterLink, SheetSketch],
  templateUrl: './clear-bench.html',
  styleUrl: './clear-bench.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ClearBench {
  private readonly photos = inject(PhotosApi);

  /** Whether this person may start parts. */
  readonly canMake = input.required<boolean>();

  protected readonly sheetA4 = this.photos.scaleSheetUrl('A4', 'light');
  protected readonly sheetLetter = this.photos.scaleSheetUrl('Letter', 'light');
}
