import { spawnSync } from 'node:child_process';
import path from 'node:path';

interface Complaint {
  readonly rule: string | null;
  readonly message: string;
}

interface Sample {
  readonly file: string;
  readonly code: string;
}

const importing = (file: string, from: string): Sample => ({ file, code: `import { x } from '${from}';\nx();\n` });

const APP = 'projects/foldwright/src/app';

/** Imports that the dependency table forbids. */
const BREACHES: readonly (readonly [string, string])[] = [
  // shared: a layer sees only those before it, and no foreign package
  ['shared/src/units/length.ts', '../geometry/point'],
  ['shared/src/geometry/point.ts', '../bending/layout'],
  ['shared/src/geometry/point.ts', 'zod/mini'],
  ['shared/src/bending/layout.ts', '../part/part-document'],
  ['shared/src/part/upgrades/from-version-1.ts', '../../rules/finding'],
  ['shared/src/rules/land-too-thin.ts', '../drawing/cut-plan'],
  ['shared/src/drawing/cut-plan.ts', '../pricing/quote'],
  ['shared/src/pricing/quote.ts', '../contracts/orders'],
  ['shared/src/contracts/orders.ts', 'zod'],
  ['shared/src/geometry/point.ts', 'node:fs'],
  ['shared/src/geometry/point.test.ts', 'express'],
  // nobody climbs out of a package
  ['shared/src/geometry/point.ts', '../../../server/src/env'],
  ['server/src/services/place-order.ts', '../../../shared/src/geometry/point'],
  ['server/src/env.ts', '../../projects/foldwright/src/app/app'],
  [`${APP}/app.ts`, '../../../../shared/src/geometry/point'],
  // server
  ['server/src/env.ts', '@angular/core'],
  ['server/src/env.ts', 'fs'],
  ['server/src/routes/parts.ts', '../models/part'],
  ['server/src/routes/parts.ts', 'sequelize'],
  ['server/src/services/place-order.ts', 'express'],
  ['server/src/services/place-order.ts', '../routes/orders'],
  ['server/src/services/place-order.ts', '../http/session'],
  ['server/src/policies/parts.ts', '../models/part'],
  ['server/src/presenters/parts.ts', '../services/place-order'],
  ['server/src/presenters/parts.ts', 'sequelize'],
  ['server/src/migrations/20270101-next.ts', '../models/part'],
  ['server/src/vision/photo-worker.ts', '../models/photo'],
  ['server/src/vision/photo-worker.ts', 'sequelize'],
  ['server/src/cli/main.ts', '../database/database'],
  ['server/src/cli/commands/unfold.ts', '../../services/place-order'],
  ['server/src/documents/dxf.ts', 'express'],
  ['server/src/fakes/cutting-service/prices.ts', '@foldwright/shared/pricing/quote'],
  ['server/src/fakes/cutting-service/prices.ts', '../../cutting/cutting-service'],
  // projects
  [`${APP}/app.ts`, 'express'],
  [`${APP}/parts/part-list.ts`, '../office/orders-page'],
  [`${APP}/parts/part-list.ts`, 'three'],
  [`${APP}/part/outline/outline-page.ts`, '../bends/bend-table'],
  [`${APP}/part/outline/panels/hole-list.ts`, '../../bends/bend-table'],
  [`${APP}/part/outline/outline-page.ts`, '../../office/orders-page'],
  [`${APP}/part/drawing-board/tools/move-tool.ts`, '@angular/core'],
  [`${APP}/part/drawing-board/snapping/snap.ts`, 'rxjs'],
  [`${APP}/api/orders-api.ts`, '../office/orders-page'],
  ['projects/ui/src/money/money.ts', 'zod/mini'],
  ['projects/ui/src/money/money.ts', '../../../foldwright/src/app/api/orders-api'],
];

/** Imports that it allows. */
const LEGAL: readonly (readonly [string, string])[] = [
  ['shared/src/geometry/point.ts', './tolerance'],
  ['shared/src/geometry/point.ts', '../units/length'],
  ['shared/src/geometry/polygon.ts', 'robust-predicates'],
  ['shared/src/geometry/point.test.ts', 'fast-check'],
  ['shared/src/part/testing/any-command.ts', 'fast-check'],
  ['shared/src/part/part-document.test.ts', '../contracts/part-document-schema'],
  ['shared/src/part/upgrades/from-version-1.ts', '../part-document'],
  ['shared/src/part/upgrades/from-version-1.ts', '../../geometry/point'],
  ['shared/src/rules/land-too-thin.ts', '../part/part-document'],
  ['shared/src/contracts/orders.ts', 'zod/mini'],
  ['shared/src/contracts/orders.ts', '../pricing/quote'],
  ['server/src/routes/parts.ts', '../services/open-part'],
  ['server/src/services/place-order.ts', '../models/order'],
  ['server/src/services/place-order.ts', '../http/problem'],
  ['server/src/services/place-order.ts', '@foldwright/shared/pricing/quote'],
  ['server/src/policies/access.ts', '../http/visitor'],
  ['server/src/presenters/parts.ts', '../models/part'],
  ['server/src/cli/commands/unfold.ts', '../../documents/dxf'],
  ['server/src/fakes/mail-server/list.ts', 'smtp-server'],
  [`${APP}/parts/part-list.ts`, '../api/parts-api'],
  [`${APP}/parts/part-list.ts`, '@foldwright/ui/money/money'],
  [`${APP}/part/outline/outline-page.ts`, '../part-store'],
  [`${APP}/part/outline/panels/hole-list.ts`, '../../part-store'],
  [`${APP}/part/outline/outline-page.ts`, '../drawing-board/viewport'],
  [`${APP}/part/outline/panels/hole-list.ts`, '../../../api/parts-api'],
  [`${APP}/part/drawing-board/tools/move-tool.ts`, '../viewport'],
  ['projects/ui/src/part-viewer/part-viewer.ts', 'three'],
];

interface Habit extends Sample {
  readonly name: string;
  readonly rule: string;
}

/** Other habits of the house, each with the rule that guards it. */
const HABITS: readonly Habit[] = [
  {
    name: 'a tolerance without a name',
    file: 'shared/src/geometry/intersect.ts',
    code: 'export const isNear = (d: number) => d < 1e-9;',
    rule: 'no-restricted-syntax',
  },
  { name: 'a default export', file: 'server/src/env.ts', code: 'export default 1;', rule: 'no-restricted-syntax' },
  {
    name: 'a file that gathers others',
    file: 'shared/src/geometry/index.ts',
    code: "export { point } from './point';",
    rule: 'no-restricted-syntax',
  },
  {
    name: 'any',
    file: 'server/src/env.ts',
    code: 'export const env: any = 1;',
    rule: '@typescript-eslint/no-explicit-any',
  },
  { name: 'console', file: 'server/src/env.ts', code: "console.log('x');", rule: 'no-console' },
  {
    name: 'a cast by way of unknown',
    file: 'server/src/env.ts',
    code: 'export const n = (x: string) => x as unknown as number;',
    rule: 'no-restricted-syntax',
  },
  {
    name: 'a rule switched off in the file',
    file: 'server/src/env.ts',
    code: "/* eslint-disable no-console */\nconsole.log('x');",
    rule: 'no-console',
  },
  {
    name: 'a type check switched off',
    file: 'server/src/env.ts',
    code: "// @ts-ignore\nexport const n: number = '1';",
    rule: '@typescript-eslint/ban-ts-comment',
  },
  {
    name: 'a file of more than 400 lines',
    file: 'server/src/env.ts',
    code: 'export {};\n'.repeat(401),
    rule: 'max-lines',
  },
  {
    name: 'an inline style',
    file: `${APP}/part/part-page.html`,
    code: '<p style="color: red">x</p>',
    rule: '@angular-eslint/template/no-inline-styles',
  },
  {
    name: 'a picture without words',
    file: `${APP}/part/part-page.html`,
    code: '<img src="a.png" />',
    rule: '@angular-eslint/template/alt-text',
  },
  {
    name: 'a component that is looked at always',
    file: `${APP}/part/part-page.ts`,
    code: "import { Component } from '@angular/core';\n@Component({ selector: 'fw-part', template: '' })\nexport class PartPage {}",
    rule: '@angular-eslint/prefer-on-push-component-change-detection',
  },
];

function lint(samples: readonly Sample[]): Complaint[][] {
  const { stdout, stderr } = spawnSync(process.execPath, [path.join(__dirname, 'lint-samples.mjs')], {
    input: JSON.stringify(samples),
    encoding: 'utf8',
    timeout: 110_000,
    maxBuffer: 50_000_000,
  });
  if (stdout === '') throw new Error(stderr);
  return JSON.parse(stdout) as Complaint[][];
}

describe('the dependency table', () => {
  const samples = [
    ...BREACHES.map(([file, from]) => importing(file, from)),
    ...LEGAL.map(([file, from]) => importing(file, from)),
    ...HABITS,
  ];
  let answers: Map<Sample, Complaint[]>;

  beforeAll(() => {
    const complaints = lint(samples);
    answers = new Map(samples.map((sample, index) => [sample, complaints[index] ?? []]));
  }, 120_000);

  const complaintsAbout = (file: string, code: string) => {
    const sample = samples.find((each) => each.file === file && each.code === code);
    return sample === undefined ? undefined : answers.get(sample);
  };

  it.each(BREACHES)('%s may not import %s, and is told why', (file, from) => {
    const complaints = complaintsAbout(file, importing(file, from).code);
    expect(complaints).toContainEqual({
      rule: 'no-restricted-imports',
      message: expect.stringMatching(/is restricted from being used by a pattern\. .{20,}/),
    });
  });

  it.each(LEGAL)('%s may import %s', (file, from) => {
    const complaints = complaintsAbout(file, importing(file, from).code);
    expect(complaints).toEqual([]);
  });

  it.each(HABITS)('$name is refused', ({ file, code, rule }) => {
    expect(complaintsAbout(file, code)?.map((complaint) => complaint.rule)).toContain(rule);
  });
});
