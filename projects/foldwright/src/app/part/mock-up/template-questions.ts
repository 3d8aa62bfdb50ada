import { ChangeDetectionStrategy, Component, input, output } from '@angular/core';
import type { TemplateAnswers } from './template-answers';

/** One pictured answer: paths by what they draw. Drawn for this page on a grid of 80 by 60. */
interface PicturedAnswer {
  readonly value: string;
  readonly label: string;
  readonly paths: readonly {
    readonly kind: 'card' | 'line' | 'wave' | 'liner' | 'machine' | 'bears';
    readonly d: string;
  }[];
}

interface PicturedQuestion {
  readonly id: keyof TemplateAnswers;
  readonly legend: string;
  readonly answers: readonly PicturedAnswer[];
}

const QUESTIONS: readonly PicturedQuestion[] = [
  {
    id: 'showing',
    legend: 'Which face shows?',
    answers: [
      {
        value: 'inside',
        label: 'The inside, flanges fold up',
        paths: [
          { kind: 'card', d: 'M16 22v24a4 4 0 0 0 4 4h40a4 4 0 0 0 4-4V22' },
          { kind: 'line', d: 'M40 8v24m-5-6 5 6 5-6' },
        ],
      },
      {
        value: 'outside',
        label: 'The outside, flanges fold down',
        paths: [
          { kind: 'card', d: 'M16 52V30a4 4 0 0 1 4-4h40a4 4 0 0 1 4 4v22' },
          { kind: 'line', d: 'M40 4v14m-5-5 5 5 5-5' },
        ],
      },
    ],
  },
  {
    id: 'bearing',
    legend: 'Which face sits on the machine?',
    answers: [
      {
        value: 'showing',
        label: 'The one that shows',
        paths: [
          { kind: 'machine', d: 'M24 10h32v34H24z' },
          { kind: 'card', d: 'M17 18v28a4 4 0 0 0 4 4h38a4 4 0 0 0 4-4V18' },
          { kind: 'bears', d: 'M26 46.500h28' },
        ],
      },
      {
        value: 'hidden',
        label: 'The one on the table',
        paths: [
          { kind: 'card', d: 'M17 12v22a4 4 0 0 0 4 4h38a4 4 0 0 0 4-4V12' },
          { kind: 'machine', d: 'M14 42h52v14H14z' },
          { kind: 'bears', d: 'M18 41h44' },
        ],
      },
    ],
  },
  {
    id: 'crease',
    legend: 'How did you crease it?',
    answers: [
      {
        value: 'scored',
        label: 'Scored, liner whole',
        paths: [
          { kind: 'liner', d: 'M10 50h26q5 0 5-5V12M10 42h18M33 37V12' },
          { kind: 'wave', d: 'M10 46q2-5 4 0t4 0t4 0t4 0t4 0M37 36q-5-2 0-4t0-4t0-4t0-4t0-4' },
        ],
      },
      {
        value: 'crushed',
        label: 'Crushed',
        paths: [
          { kind: 'liner', d: 'M10 50h24q7 0 7-8V12M10 42h17q6 0 6-6V12' },
          { kind: 'wave', d: 'M10 46q2-5 4 0t4 0t4 0M37 32q-5-2 0-4t0-4t0-4t0-4' },
          { kind: 'line', d: 'M52 53l-9-8m1 6-1-6 6 .5' },
        ],
      },
      {
        value: 'half-cut',
        label: 'Cut half through',
        paths: [
          { kind: 'liner', d: 'M10 42h27V12M10 50h24M45 40V12' },
          { kind: 'wave', d: 'M10 46q2-5 4 0t4 0t4 0t4 0t4 0M41 38q-5-2 0-4t0-4t0-4t0-4t0-4' },
          { kind: 'line', d: 'M56 58 40 46' },
        ],
      },
    ],
  },
];

/** Three pictured questions about the template. Each answer is one click and may be changed until the outline is taken. */
@Component({
  selector: 'fw-template-questions',
  templateUrl: './template-questions.html',
  styleUrl: './template-questions.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class TemplateQuestions {
  readonly answers = input.required<TemplateAnswers>();
  readonly disabled = input(false);
  readonly answered = output<Partial<TemplateAnswers>>();

  protected readonly questions = QUESTIONS;

  protected choose(id: keyof TemplateAnswers, value: string): void {
    if (id === 'showing' && (value === 'inside' || value === 'outside')) this.answered.emit({ showing: value });
    if (id === 'bearing' && (value === 'showing' || value === 'hidden')) this.answered.emit({ bearing: value });
    if (id === 'crease' && (value === 'scored' || value === 'crushed' || value === 'half-cut')) {
      this.answered.emit({ crease: value });
    }
  }
}
