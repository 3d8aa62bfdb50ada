import type { Finding } from '@foldwright/shared/rules/finding';
import { mergeFindings, sheetWords } from './merged-findings';

const finding = (id: string, severity: Finding['severity']): Finding => ({
  id,
  rule: 'flangeTooShort',
  severity,
  title: id,
  detail: '',
  foundMm: null,
  requiredMm: null,
  why: { text: '', source: '', confidence: 'common-practice' },
  ids: [],
  at: null,
  advice: '',
  mend: null,
});

describe('mergeFindings', () => {
  const labels = { trial: 'DC01 1.5', production: '5052 3.0' };

  it('tells one finding of both sheets once, as the worse of the two', () => {
    const [only, ...rest] = mergeFindings([finding('a', 'caution')], [finding('a', 'blocker')]);
    expect(rest).toEqual([]);
    expect(only?.finding.severity).toBe('blocker');
    expect(only === undefined ? '' : sheetWords(only, labels)).toBe('in both sheets');
  });

  it('puts the worst first and names the sheet', () => {
    const merged = mergeFindings([finding('t', 'blocker')], [finding('p', 'hint')]);
    expect(merged.map((row) => [row.finding.id, sheetWords(row, labels)])).toEqual([
      ['t', 'in DC01 1.5'],
      ['p', 'in 5052 3.0'],
    ]);
  });
});
