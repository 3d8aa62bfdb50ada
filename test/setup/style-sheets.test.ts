import fs from 'node:fs';
import path from 'node:path';

const ROOT = path.resolve(__dirname, '../..');
const THEME = 'projects/ui/src/theme/';

/** What no style sheet may say, and where it may all the same. */
const FORBIDDEN: readonly { readonly name: string; readonly pattern: RegExp; readonly exceptIn?: string }[] = [
  { name: 'reaching into another component', pattern: /::ng-deep/ },
  { name: 'shouting down another rule', pattern: /!important/ },
  {
    name: 'naming a colour outside the theme',
    pattern:
      /#[0-9a-f]{3,8}\b|\b(?:rgba?|hsla?|hwb|lab|lch|oklab|oklch)\(|:\s*(?:white|black|red|green|blue|gr[ae]y)\b/i,
    exceptIn: THEME,
  },
];

/** Translucent black and white make shadow and gloss on whatever colour lies below; they are none themselves. */
const LIGHT_AND_SHADE = /rgb\((?:0 0 0|255 255 255) \/ [\d.]+\)/g;

function styleSheets(folder: string): string[] {
  return fs.readdirSync(path.join(ROOT, folder), { withFileTypes: true }).flatMap((entry) => {
    const at = `${folder}/${entry.name}`;
    if (entry.isDirectory()) return styleSheets(at);
    return /\.s?css$/.test(entry.name) ? [at] : [];
  });
}

function complaints(file: string, text: string): string[] {
  return FORBIDDEN.filter(({ exceptIn }) => exceptIn === undefined || !file.startsWith(exceptIn)).flatMap(
    ({ name, pattern }) =>
      text
        .split('\n')
        .map((line) => line.replace(/\/\/.*$/, '').replace(LIGHT_AND_SHADE, ''))
        .flatMap((line, index) => (pattern.test(line) ? [`${file}:${index + 1} ${name}: ${line.trim()}`] : [])),
  );
}

describe('style sheets', () => {
  it('keep to their own component and take their colours from the theme', () => {
    const files = styleSheets('projects');
    expect(files.length).toBeGreaterThan(10);
    expect(files.flatMap((file) => complaints(file, fs.readFileSync(path.join(ROOT, file), 'utf8')))).toEqual([]);
  });

  it.each([
    'color: #c05a2e;',
    'background: rgb(10 20 30);',
    'color: white;',
    'border: 0 !important;',
    ':host ::ng-deep p { margin: 0; }',
  ])('are told about %s', (line) => {
    expect(complaints('projects/foldwright/src/app/part/part-page.scss', line)).toHaveLength(1);
  });

  it('may name colours in the theme, and shadow anywhere', () => {
    expect(complaints(`${THEME}_tokens.scss`, '--kraft: #c9a26b;')).toEqual([]);
    expect(complaints('projects/ui/src/x/x.scss', 'box-shadow: 0 1px 2px rgb(0 0 0 / 0.4);')).toEqual([]);
    expect(
      complaints('projects/foldwright/src/app/part/part-page.scss', 'color: var(--ink); // white on paper'),
    ).toEqual([]);
  });
});
