import { TestBed } from '@angular/core/testing';
import { SHEET_MATERIALS } from '@foldwright/shared/stock/materials';
import { figuresOf } from './material-figures';
import { MaterialsPage } from './materials-page';
import { TRADE_TABLES } from './trade-tables';

describe('materials and tooling', () => {
  it('names a source for every value of every material', () => {
    for (const material of SHEET_MATERIALS) {
      for (const figure of figuresOf(material)) {
        expect(figure.source).not.toBe('');
        expect(figure.value).not.toMatch(/NaN|undefined|Infinity/);
      }
    }
  });

  it('names a source for every column or row of every table', () => {
    for (const table of TRADE_TABLES) {
      expect(table.rows.length).toBeGreaterThan(0);
      for (const row of table.rows) {
        expect(row.cells).toHaveLength(table.columns.length);
        const figures = table.columns.filter((column) => column.isFigure);
        expect(row.source !== null || figures.every((column) => column.source !== undefined)).toBe(true);
      }
    }
  });

  it('shows how far each can be trusted', async () => {
    const fixture = TestBed.createComponent(MaterialsPage);
    await fixture.whenStable();
    const text = (fixture.nativeElement as HTMLElement).textContent ?? '';
    for (const words of ['published', 'common practice', 'from memory', 'ISO 273', 'DIN 6935'])
      expect(text).toContain(words);
  });
});
