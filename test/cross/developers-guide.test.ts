import { readFileSync } from 'node:fs';
import path from 'node:path';

const ROOT = path.resolve(__dirname, '../..');
const read = (file: string): string => readFileSync(path.join(ROOT, file), 'utf8');

describe('DEVELOPERS.md', () => {
  it('shows the example that the tests use', () => {
    const shown = /```json\n([\s\S]*?)\n```/.exec(read('DEVELOPERS.md'))?.[1] ?? '';
    expect(JSON.parse(shown)).toEqual(JSON.parse(read('test/fixtures/parts/two-bend-bracket.json')));
  });

  it('names only files that are there', () => {
    const named = [...read('DEVELOPERS.md').matchAll(/`((?:server|shared|projects|test)\/[\w./-]+\.\w+)`/g)].map(
      ([, file]) => file,
    );
    expect(named.length).toBeGreaterThan(10);
    for (const file of named) expect(() => read(file ?? '')).not.toThrow();
  });
});
