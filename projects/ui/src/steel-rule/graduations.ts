/** One graduation of a rule. `xPx` from the rule's left end. */
export interface Graduation {
  readonly xPx: number;
  readonly heightPx: number;
}

export interface GraduationLabel {
  readonly xPx: number;
  readonly text: string;
}

/** A rule graduated to a drawing: ticks, figures and how far apart the figures are in mm. */
export interface Graduations {
  readonly ticks: readonly Graduation[];
  readonly labels: readonly GraduationLabel[];
  readonly labelStepMm: number;
}

const STEPS_MM = [1, 2, 5, 10, 20, 50, 100, 200, 500, 1000, 2000] as const;
const LABEL_APART_PX = 28;
const TICK_APART_PX = 3;
const TALL_PX = 11;
const MIDDLE_PX = 8;
const SHORT_PX = 5;

/**
 * Graduates a rule so that its figures stand at least 28 px and its ticks at least 3 px apart. Figures left of zero are
 * left out, as on a rule whose end is its zero; their ticks stay, so that the steel doesn't look worn off.
 * @param widthPx length of the rule
 * @param pxPerMm scale of the drawing beside it, above 0
 * @param zeroPx where 0 lies, from the rule's left end; may lie outside
 */
export function graduate(widthPx: number, pxPerMm: number, zeroPx: number): Graduations {
  if (!(pxPerMm > 0) || !(widthPx > 0)) return { ticks: [], labels: [], labelStepMm: 10 };
  const labelStepMm = STEPS_MM.find((step) => step * pxPerMm >= LABEL_APART_PX) ?? 5000;
  const parts = [10, 5, 2, 1].find((count) => (labelStepMm / count) * pxPerMm >= TICK_APART_PX) ?? 1;
  const tickStepMm = labelStepMm / parts;
  const first = Math.ceil(-zeroPx / (tickStepMm * pxPerMm));
  const last = Math.floor((widthPx - zeroPx) / (tickStepMm * pxPerMm));
  const ticks: Graduation[] = [];
  const labels: GraduationLabel[] = [];
  for (let index = first; index <= last; index++) {
    const xPx = Math.round((zeroPx + index * tickStepMm * pxPerMm) * 100) / 100;
    const isLabelled = index % parts === 0;
    const isMiddle = parts === 10 && index % 5 === 0;
    ticks.push({ xPx, heightPx: isLabelled ? TALL_PX : isMiddle ? MIDDLE_PX : SHORT_PX });
    if (isLabelled && index >= 0) labels.push({ xPx, text: String((index / parts) * labelStepMm) });
  }
  return { ticks, labels, labelStepMm };
}
