import fs from 'node:fs';
import path from 'node:path';

/** Files by their path, each with the files it imports when it is loaded. Imports made later, on demand, are left out. */
export type ImportGraph = ReadonlyMap<string, readonly string[]>;

/** Folders by the beginning of the import path that leads there. */
export type Aliases = Readonly<Record<string, string>>;

const STATIC_IMPORT = /^(?:import|export)\b[^'"`;]*?from\s*['"]([^'"]+)['"]|^import\s*['"]([^'"]+)['"]/gm;

/**
 * Read which file imports which.
 * @param roots folders to read, with everything below them
 * @param aliases import paths that lead into the repository without being relative
 */
export function readImportGraph(roots: readonly string[], aliases: Aliases): ImportGraph {
  const files = roots.flatMap((root) => typescriptFiles(root));
  const known = new Set(files);
  return new Map(
    files.map((file) => {
      const targets = [...fs.readFileSync(file, 'utf8').matchAll(STATIC_IMPORT)]
        .map((match) => resolveImport(file, match[1] ?? match[2] ?? '', aliases))
        .filter((target) => target !== undefined)
        .filter((target) => known.has(target));
      return [file, targets];
    }),
  );
}

/** One cycle per knot of files that import each other, as the path that leads back to its beginning; [] when none. */
export function findCycles(graph: ImportGraph): string[][] {
  const cycles: string[][] = [];
  const finished = new Set<string>();
  const visit = (file: string, trail: readonly string[]): void => {
    const at = trail.indexOf(file);
    if (at !== -1) {
      cycles.push([...trail.slice(at), file]);
      return;
    }
    if (finished.has(file)) return;
    for (const target of graph.get(file) ?? []) visit(target, [...trail, file]);
    finished.add(file);
  };
  for (const file of graph.keys()) visit(file, []);
  return cycles;
}

function typescriptFiles(folder: string): string[] {
  if (!fs.existsSync(folder)) return [];
  return fs.readdirSync(folder, { withFileTypes: true }).flatMap((entry) => {
    const at = path.join(folder, entry.name);
    if (entry.isDirectory()) return typescriptFiles(at);
    return entry.name.endsWith('.ts') ? [at] : [];
  });
}

function resolveImport(from: string, specifier: string, aliases: Aliases): string | undefined {
  if (specifier.startsWith('.')) return `${path.resolve(path.dirname(from), specifier)}.ts`;
  const alias = Object.keys(aliases).find((beginning) => specifier.startsWith(beginning));
  const folder = alias === undefined ? undefined : aliases[alias];
  return alias === undefined || folder === undefined
    ? undefined
    : `${path.join(folder, specifier.slice(alias.length))}.ts`;
}
