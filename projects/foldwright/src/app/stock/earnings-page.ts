import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { MoneyText } from '@foldwright/ui/money-text/money-text';
import { RouterLink } from '@angular/router';
import { StockApi } from '../api/stock-api';

/** What each part costs and earns, without tax; where a figure comes from stands under it. */
@Component({
  selector: 'fw-earnings-page',
  imports: [MoneyText, RouterLink],
  template: `
    @if (list.problem(); as problem) {
      <p role="alert">
        <b>{{ problem.details.title }}.</b> {{ problem.details.detail }}
      </p>
    }
    <p class="fw-read">Money without tax. The cost is what the cutting service asks; coating is not in it.</p>
    <div class="fw-scroll" tabindex="0" role="region" aria-label="Costs and earnings">
      <table class="fw-table">
        <thead>
          <tr>
            <th scope="col">Part</th>
            <th scope="col">Cutting, each</th>
            <th scope="col">Hardware</th>
            <th scope="col">Price, alone</th>
            <th scope="col">Left</th>
            <th scope="col">Sold alone</th>
            <th scope="col">Earned</th>
          </tr>
        </thead>
        <tbody>
          @for (row of rows(); track row.partId) {
            <tr>
              <th scope="row">
                <a [routerLink]="['/parts', row.partId, 'release']">{{ row.partNumber }} {{ row.partName }}</a>
              </th>
              <td>
                @if (row.cost.each; as each) {
                  <fw-money-text [amount]="each" />
                }
                <small>{{ row.cost.source }}</small>
              </td>
              <td>
                @if (row.hardwareCost; as hardwareCost) {
                  <fw-money-text [amount]="hardwareCost" />
                } @else {
                  in several currencies
                }
                <small>{{ row.with }}</small>
              </td>
              <td>
                @if (row.price; as price) {
                  <fw-money-text [amount]="price" />
                } @else {
                  not sold alone
                }
              </td>
              <td>
                @if (row.margin; as margin) {
                  <fw-money-text [amount]="margin" />
                } @else {
                  unknown
                }
              </td>
              <td class="fw-figure">{{ row.sold }}</td>
              <td><fw-money-text [amount]="row.earned" /></td>
            </tr>
          }
        </tbody>
      </table>
    </div>
  `,
  styles: `
    p {
      margin-bottom: 14px;
    }

    small {
      display: block;
      font: var(--fw-note);
      color: var(--fw-ink-soft);
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class EarningsPage {
  protected readonly list = inject(StockApi).earnings();
  protected readonly rows = computed(() =>
    (this.list.value()?.earnings ?? []).map((row) => ({
      ...row,
      with: row.hardware.map(({ hardware, quantity }) => `${quantity} × ${hardware.name}`).join(', '),
    })),
  );
}
