import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import type { BendRow } from '@foldwright/shared/bending/development';
import type { Severity } from '@foldwright/shared/rules/finding';
import type { PartDocument, StockRole } from '@foldwright/shared/part/part-document';
import type { Money } from '@foldwright/shared/units/money';
import { FindingSign, severityWords } from '@foldwright/ui/finding-note/finding-sign';
import { MoneyText } from '@foldwright/ui/money-text/money-text';
import { PartCardFrame } from '@foldwright/ui/part-card-frame/part-card-frame';
import { Pictogram } from '@foldwright/ui/pictogram/pictogram';
import { KSource } from './k-source';
import type { PartInStock } from '../computed-parts';
import { referenceWords } from '../reference-words';
import { RunningNumber } from './running-number';
import { holeLines } from './hole-lines';

/** What one piece costs at a quantity, once the cutting service has said so. */
export interface KnownPrice {
  readonly role: StockRole;
  readonly quantity: number;
  readonly each: Money;
}

interface StockColumn {
  readonly role: StockRole;
  readonly label: string;
  readonly radiusMm: number | null;
  readonly widthMm: number | null;
  readonly heightMm: number | null;
  readonly massG: number | null;
  readonly price: KnownPrice | null;
}

const SEVERITIES: readonly Severity[] = ['blocker', 'caution', 'hint'];

/** The card at the part's side: sheets, blank, mass, price, bends with their source, holes, findings, revision. */
@Component({
  selector: 'fw-part-card',
  imports: [FindingSign, MoneyText, PartCardFrame, KSource, Pictogram, RunningNumber],
  templateUrl: './part-card.html',
  styleUrl: './part-card.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { '[class.open]': 'isOpen()' },
})
export class PartCard {
  readonly number = input.required<string>();
  /** "draft of A", "revision A, released". */
  readonly state = input.required<string>();
  readonly document = input.required<PartDocument>();
  readonly trial = input.required<PartInStock>();
  readonly production = input.required<PartInStock>();
  readonly prices = input<readonly KnownPrice[]>([]);
  /** Said at the foot of the card, on green: what was released or fitted. */
  readonly foot = input<string | null>(null);
  /** On a phone the card comes up from below. */
  readonly isOpen = input(false);
  readonly openToggled = output<void>();

  protected readonly columns = computed(() => [this.column(this.trial()), this.column(this.production())]);
  protected readonly bends = computed<readonly BendRow[]>(() => this.production().figures?.bendTable ?? []);
  protected readonly reference = computed(() => this.bends()[0]?.deductionReference ?? 'outsideApex');
  protected readonly holes = computed(() => holeLines(this.document().layout.features));
  protected readonly findings = computed(() => {
    const seen = new Map(
      [...this.trial().findings, ...this.production().findings].map((finding) => [finding.id, finding]),
    );
    return SEVERITIES.map((severity) => ({
      severity,
      word: severityWords(severity),
      count: [...seen.values()].filter((finding) => finding.severity === severity).length,
    }));
  });
  protected readonly worst = computed(() => this.findings().find(({ count }) => count > 0) ?? null);

  protected readonly referenceOf = referenceWords;

  private column(part: PartInStock): StockColumn {
    const { figures } = part;
    const radii = [...new Set(figures?.bendTable.map((row) => row.insideRadiusMm) ?? [])];
    const bounds = figures?.flat.bounds;
    return {
      role: part.role,
      label: part.stockLabel,
      radiusMm: radii.length === 1 ? (radii[0] ?? null) : null,
      widthMm: bounds === undefined ? null : bounds.max.x - bounds.min.x,
      heightMm: bounds === undefined ? null : bounds.max.y - bounds.min.y,
      massG: figures === null ? null : figures.flat.massKg * 1000,
      price: this.prices().find((price) => price.role === part.role) ?? null,
    };
  }
}
