// Lints samples of code, given as JSON on standard input, as if each stood in the file it names. A process of its own,
// because ESLint loads its configuration as ES modules.
import { readFileSync } from 'node:fs';
import path from 'node:path';
import { ESLint } from 'eslint';

const eslint = new ESLint({ cwd: path.resolve(import.meta.dirname, '../..') });
const samples = JSON.parse(readFileSync(0, 'utf8'));
const complaints = [];
for (const { file, code } of samples) {
  const [result] = await eslint.lintText(code, { filePath: file });
  complaints.push((result?.messages ?? []).map(({ ruleId, message }) => ({ rule: ruleId, message })));
}
process.stdout.write(JSON.stringify(complaints));
