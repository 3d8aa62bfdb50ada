import { solveSymmetric } from '@foldwright/shared/fitting/least-squares';
import type { GroundPlan } from './ground';
import { boxMean, dilate, erode, labelPatches, maskOf } from './mask-shapes';
import type { PageRaster } from './rectify';
import { spreadField, type Field } from './smooth-field';
import { TraceRefusal } from './trace-refusal';

/** Where the template lies on the squared-up page. */
export interface TemplateMask {
  /** One on the template, openings left zero. */
  readonly mask: Uint8Array;
  /** How far template and ground differ, in spreads of both. Under five is doubtful. */
  readonly contrast: number;
}

/** Steps over four cells, more than a millimetre, that a soft shadow can make and an edge cannot (logarithms). */
const MAX_LIGHT_STEP = 0.1;
const MAX_TINT_STEP = 0.06;
/** Tint that still counts as the ground's own. */
const MAX_TINT_OFF = 0.12;
/** Spreads that are always allowed for: light by shadows on the ground, tint by print and lamp. */
const SHADOW_SPREAD = 0.25;
/** Where tint alone tells template from ground, shadows of any depth are allowed for. */
const DEEP_SHADOW_SPREAD = 1;
const TINT_TELLS = 2.2;
const LIGHT_SPREAD = 0.08;
const TINT_SPREAD = 0.012;
const MIN_CONTRAST = 2.2;
const MIN_TEMPLATE_MM2 = 150;
const MIN_OPENING_MM2 = 3;
const SECOND_TEMPLATE_SHARE = 0.25;
const SECOND_TEMPLATE_MM2 = 400;

/** Lightness and two tints of every cell; a change of light moves the first alone. */
function lightAndTint(raster: PageRaster): Field {
  const cells = raster.columns * raster.rows;
  const values = new Float32Array(cells * 3);
  for (let cell = 0; cell < cells; cell++) {
    const r = raster.logRgb[cell * 3] ?? 0;
    const g = raster.logRgb[cell * 3 + 1] ?? 0;
    const b = raster.logRgb[cell * 3 + 2] ?? 0;
    values[cell * 3] = (r + g + b) / 3;
    values[cell * 3 + 1] = r - g;
    values[cell * 3 + 2] = b - g;
  }
  return { columns: raster.columns, rows: raster.rows, channels: 3, values };
}

function smoothed(field: Field, reach: number): Field {
  const cells = field.columns * field.rows;
  const values = new Float32Array(field.values.length);
  for (let channel = 0; channel < field.channels; channel++) {
    const plane = new Float32Array(cells);
    for (let cell = 0; cell < cells; cell++) plane[cell] = field.values[cell * field.channels + channel] ?? 0;
    const mean = boxMean(plane, field.columns, field.rows, reach);
    for (let cell = 0; cell < cells; cell++) values[cell * field.channels + channel] = mean[cell] ?? 0;
  }
  return { ...field, values };
}

function medianOf(field: Field, mask: Uint8Array, channel: number): number {
  const values: number[] = [];
  for (let cell = 0; cell < mask.length; cell += 3) {
    if (mask[cell] === 1) values.push(field.values[cell * field.channels + channel] ?? 0);
  }
  values.sort((a, b) => a - b);
  return values[values.length >> 1] ?? 0;
}

/** A step that noise alone hardly ever makes on bare ground, at least `least`. */
function stepLimit({ columns, values }: Field, seeds: Uint8Array, channel: number, least: number): number {
  const steps: number[] = [];
  for (let cell = 0; cell + 4 < seeds.length; cell += 5) {
    if (seeds[cell] !== 1 || seeds[cell + 4] !== 1 || cell % columns > columns - 5) continue;
    steps.push(Math.abs((values[(cell + 4) * 3 + channel] ?? 0) - (values[cell * 3 + channel] ?? 0)));
  }
  steps.sort((a, b) => a - b);
  return Math.max(least, 7 * (steps[steps.length >> 1] ?? 0));
}

/** Cells across which lightness or tint jumps: thick lines, so that nothing slips through a gap. */
function edgeCells(field: Field, seeds: Uint8Array): Uint8Array {
  const { columns, rows, values } = field;
  const isEdge = new Uint8Array(columns * rows);
  const lightLimit = stepLimit(field, seeds, 0, MAX_LIGHT_STEP);
  const redLimit = stepLimit(field, seeds, 1, MAX_TINT_STEP);
  const blueLimit = stepLimit(field, seeds, 2, MAX_TINT_STEP);
  const jumps = (a: number, b: number): boolean =>
    Math.abs((values[a * 3] ?? 0) - (values[b * 3] ?? 0)) > lightLimit ||
    Math.abs((values[a * 3 + 1] ?? 0) - (values[b * 3 + 1] ?? 0)) > redLimit ||
    Math.abs((values[a * 3 + 2] ?? 0) - (values[b * 3 + 2] ?? 0)) > blueLimit;
  for (let row = 2; row + 2 < rows; row++) {
    for (let column = 2; column + 2 < columns; column++) {
      const cell = row * columns + column;
      if (jumps(cell - 2, cell + 2) || jumps(cell - 2 * columns, cell + 2 * columns)) isEdge[cell] = 1;
    }
  }
  return isEdge;
}

/** Ground reached from the seeds without crossing an edge. */
function floodGround(field: Field, plan: GroundPlan): Uint8Array {
  const { columns, values } = field;
  const tint1 = medianOf(field, plan.seeds, 1);
  const tint2 = medianOf(field, plan.seeds, 2);
  const light = medianOf(field, plan.seeds, 0);
  const isOwnTint = (cell: number): boolean =>
    Math.abs((values[cell * 3 + 1] ?? 0) - tint1) < MAX_TINT_OFF &&
    Math.abs((values[cell * 3 + 2] ?? 0) - tint2) < MAX_TINT_OFF;
  const ground = new Uint8Array(plan.region.length);
  const stack: number[] = [];
  for (let cell = 0; cell < ground.length; cell++) {
    const isSeed = plan.seeds[cell] === 1 && isOwnTint(cell) && Math.abs((values[cell * 3] ?? 0) - light) < 1.1;
    if (isSeed) {
      ground[cell] = 1;
      stack.push(cell);
    }
  }
  const isEdge = edgeCells(field, plan.seeds);
  const visit = (to: number): void => {
    if (plan.region[to] !== 1 || plan.printed[to] === 1 || ground[to] === 1 || isEdge[to] === 1 || !isOwnTint(to))
      return;
    ground[to] = 1;
    stack.push(to);
  };
  for (let at = stack.pop(); at !== undefined; at = stack.pop()) {
    const column = at % columns;
    if (column > 0) visit(at - 1);
    if (column + 1 < columns) visit(at + 1);
    if (at >= columns) visit(at - columns);
    if (at + columns < ground.length) visit(at + columns);
  }
  return ground;
}

interface Spread {
  readonly mean: readonly [number, number, number];
  /** Row-major 3 x 3. */
  readonly covariance: readonly number[];
  readonly count: number;
}

function spreadOf(field: Field, reference: Field, mask: Uint8Array): Spread {
  const sums = [0, 0, 0];
  const squares: number[] = new Array<number>(9).fill(0);
  let count = 0;
  for (let cell = 0; cell < mask.length; cell++) {
    if (mask[cell] !== 1) continue;
    count++;
    for (let i = 0; i < 3; i++) {
      const a = (field.values[cell * 3 + i] ?? 0) - (reference.values[cell * 3 + i] ?? 0);
      sums[i] = (sums[i] ?? 0) + a;
      for (let j = 0; j <= i; j++) {
        const b = (field.values[cell * 3 + j] ?? 0) - (reference.values[cell * 3 + j] ?? 0);
        squares[i * 3 + j] = (squares[i * 3 + j] ?? 0) + a * b;
      }
    }
  }
  const mean = sums.map((sum) => sum / Math.max(count, 1));
  const covariance = squares.map((_, index) => {
    const i = Math.floor(index / 3);
    const j = index % 3;
    const sum = squares[Math.max(i, j) * 3 + Math.min(i, j)] ?? 0;
    return sum / Math.max(count, 1) - (mean[i] ?? 0) * (mean[j] ?? 0);
  });
  return { mean: [mean[0] ?? 0, mean[1] ?? 0, mean[2] ?? 0], covariance, count };
}

interface Discriminant {
  readonly weights: readonly [number, number, number];
  readonly contrast: number;
}

/** Fisher's linear discriminant between the ground (about zero) and the template, scaled so that they are one apart. */
function discriminant(ground: Spread, template: Spread, shadowSpread: number): Discriminant | null {
  const floors = [LIGHT_SPREAD ** 2 + shadowSpread ** 2 / 2, TINT_SPREAD ** 2, TINT_SPREAD ** 2];
  const covariance = ground.covariance.map((value, index) => {
    const isDiagonal = index % 4 === 0;
    return (value + (template.covariance[index] ?? 0)) / 2 + (isDiagonal ? (floors[index / 4] ?? 0) : 0);
  });
  const direction = solveSymmetric(covariance, template.mean);
  if (!direction) return null;
  const [a = 0, b = 0, c = 0] = direction;
  const squared = a * template.mean[0] + b * template.mean[1] + c * template.mean[2];
  return squared > 0 ? { weights: [a / squared, b / squared, c / squared], contrast: Math.sqrt(squared) } : null;
}

/** Zero on the ground, one on the template, against a field that says what ground would look like here. */
function scoreCells(
  field: Field,
  reference: Field,
  offset: readonly [number, number, number],
  d: Discriminant,
): Float32Array {
  const score = new Float32Array(field.columns * field.rows);
  for (let cell = 0; cell < score.length; cell++) {
    let sum = 0;
    for (let k = 0; k < 3; k++) {
      sum +=
        (d.weights[k] ?? 0) *
        ((field.values[cell * 3 + k] ?? 0) - (reference.values[cell * 3 + k] ?? 0) + (offset[k] ?? 0));
    }
    score[cell] = Math.min(Math.max(sum, -1), 2);
  }
  return score;
}

/** The patch with its inner gaps closed. */
function filled(patch: Uint8Array, columns: number, rows: number): Uint8Array {
  const outside = labelPatches(patch, columns, rows, 0);
  const rim = new Set<number>();
  for (const { label, minColumn, maxColumn, minRow, maxRow } of outside.patches) {
    if (minColumn === 0 || minRow === 0 || maxColumn === columns - 1 || maxRow === rows - 1) rim.add(label);
  }
  return maskOf(patch.length, (cell) => patch[cell] === 1 || !rim.has(outside.labels[cell] ?? 0));
}

function refuseOffSheet(patch: Uint8Array, plan: GroundPlan, columns: number): void {
  let touching = 0;
  for (let cell = 0; cell < patch.length; cell++) {
    if (patch[cell] !== 1) continue;
    const isAtRim =
      plan.region[cell - 1] !== 1 ||
      plan.region[cell + 1] !== 1 ||
      plan.region[cell - columns] !== 1 ||
      plan.region[cell + columns] !== 1;
    if (isAtRim) touching++;
  }
  if (touching > 8) throw new TraceRefusal('templateOffSheet', 'The template reaches over the edge of the sheet.');
}

/** The largest patch of the mask, after refusing what is no single template. */
function singleTemplate(mask: Uint8Array, raster: PageRaster): Uint8Array {
  const { columns, rows, perMm } = raster;
  const { labels, patches } = labelPatches(mask, columns, rows, 1);
  const [largest, second] = patches;
  const areaMm2 = (patch: { cells: number } | undefined): number => (patch?.cells ?? 0) / (perMm * perMm);
  if (!largest || areaMm2(largest) < MIN_TEMPLATE_MM2) {
    throw new TraceRefusal('noTemplate', 'No template stands out from the sheet. Pale card needs the dark sheet.');
  }
  if (areaMm2(second) > Math.max(SECOND_TEMPLATE_MM2, SECOND_TEMPLATE_SHARE * areaMm2(largest))) {
    throw new TraceRefusal('twoTemplates', 'There is more than one template on the sheet.');
  }
  return maskOf(labels.length, (cell) => labels[cell] === largest.label);
}

/**
 * Finds the one template on the page by what tells it from the ground: lightness, tint, and an edge all round. The
 * ground's own look is learnt from where it must be bare and carried under the template; then the template's own look
 * decides about its openings, since both stand in the same light.
 *
 * @throws TraceRefusal noTemplate, twoTemplates, templateOffSheet
 */
export function findTemplate(raster: PageRaster, plan: GroundPlan): TemplateMask {
  const { columns, rows, perMm } = raster;
  const raw = lightAndTint(raster);
  const soft = smoothed(raw, 1);
  const flooded = floodGround(soft, plan);
  const groundLook = spreadField(soft, flooded, 2);
  const rough = maskOf(
    flooded.length,
    (cell) => plan.region[cell] === 1 && flooded[cell] !== 1 && plan.printed[cell] !== 1,
  );
  const reach = Math.max(1, Math.round(0.75 * perMm));
  const opened = dilate(erode(rough, columns, rows, reach), columns, rows, reach);
  const first = singleTemplate(opened, raster);
  const core = erode(first, columns, rows, Math.round(perMm));
  const template = spreadOf(soft, groundLook, core);
  const bare = spreadOf(soft, groundLook, flooded);
  const byTint = discriminant(bare, template, DEEP_SHADOW_SPREAD);
  const separating = byTint && byTint.contrast > TINT_TELLS ? byTint : discriminant(bare, template, SHADOW_SPREAD);
  if (template.count < MIN_TEMPLATE_MM2 / 3 || !separating || separating.contrast < MIN_CONTRAST) {
    throw new TraceRefusal('noTemplate', 'No template stands out from the sheet. Pale card needs the dark sheet.');
  }
  const outside = scoreCells(soft, groundLook, [0, 0, 0], separating);
  const isTemplate = (score: Float32Array, cell: number): boolean =>
    plan.region[cell] === 1 && plan.printed[cell] !== 1 && (score[cell] ?? 0) > 0.5;
  let mask = singleTemplate(
    maskOf(outside.length, (cell) => isTemplate(outside, cell)),
    raster,
  );
  for (let round = 0; round < 2; round++) {
    const body = filled(mask, columns, rows);
    const inner = erode(mask, columns, rows, 2);
    const templateLook = spreadField(soft, inner, 5);
    const inside = scoreCells(soft, templateLook, template.mean, separating);
    const score = outside.slice();
    for (let cell = 0; cell < score.length; cell++) if (body[cell] === 1) score[cell] = inside[cell] ?? 0;
    mask = singleTemplate(
      maskOf(score.length, (cell) => isTemplate(score, cell)),
      raster,
    );
  }
  refuseOffSheet(mask, plan, columns);
  const openings = labelPatches(mask, columns, rows, 0);
  const tooSmall = new Set(
    openings.patches.filter((p) => p.cells < MIN_OPENING_MM2 * perMm * perMm).map((p) => p.label),
  );
  return {
    mask: maskOf(mask.length, (cell) => mask[cell] === 1 || tooSmall.has(openings.labels[cell] ?? 0)),
    contrast: separating.contrast,
  };
}
