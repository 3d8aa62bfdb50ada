import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { findCycles, readImportGraph } from './import-graph';

const ROOT = path.resolve(__dirname, '../..');
const ALIASES = {
  '@foldwright/shared/': path.join(ROOT, 'shared/src'),
  '@foldwright/server/': path.join(ROOT, 'server/src'),
  '@foldwright/ui/': path.join(ROOT, 'projects/ui/src'),
};

describe('imports', () => {
  it('never lead back to where they began', () => {
    const roots = ['shared/src', 'server/src', 'projects', 'test'].map((folder) => path.join(ROOT, folder));
    const graph = readImportGraph(roots, ALIASES);
    expect(graph.size).toBeGreaterThan(100);
    expect([...graph.values()].flat().length).toBeGreaterThan(graph.size);

    const cycles = findCycles(graph).map((cycle) => cycle.map((file) => path.relative(ROOT, file)).join(' → '));
    expect(cycles).toEqual([]);
  });

  describe('in a planted tree', () => {
    let folder: string;

    beforeEach(() => {
      folder = fs.mkdtempSync(path.join(os.tmpdir(), 'imports-'));
      fs.mkdirSync(path.join(folder, 'inner'));
    });
    afterEach(() => fs.rmSync(folder, { recursive: true }));

    const plant = (files: Record<string, string>): string[][] => {
      for (const [name, code] of Object.entries(files)) fs.writeFileSync(path.join(folder, name), code);
      const cycles = findCycles(readImportGraph([folder], { '@planted/': folder }));
      return cycles.map((cycle) => cycle.map((file) => path.relative(folder, file)));
    };

    it('lead back through other folders, aliases, types and re-exports, and are found', () => {
      expect(
        plant({
          'a.ts': "import {\n  b,\n} from './inner/b';\nb();\n",
          'inner/b.ts': "import type { C } from '@planted/c';\nexport const b = (c: C) => c;\n",
          'c.ts': "export { a as C } from './a';\n",
        }),
      ).toEqual([['a.ts', 'inner/b.ts', 'c.ts', 'a.ts']]);
    });

    it('may meet again further down, and may be made on demand', () => {
      expect(
        plant({
          'a.ts': "import { b } from './inner/b';\nimport { c } from './c';\nb(c);\n",
          'inner/b.ts': "import { c } from '../c';\nexport const b = () => c;\n",
          'c.ts': "export const c = () => import('./a');\n",
        }),
      ).toEqual([]);
    });
  });
});
