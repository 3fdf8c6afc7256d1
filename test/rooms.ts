import { existsSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join, relative, resolve, sep } from 'node:path';
import { API } from 'typescript/unstable/sync';

/** The rooms in the order in which the data passes; a room imports only what stands before it. */
export const ROOMS = ['solver', 'cases', 'output', 'cli'];

/** A source file with the files of the tree it imports, as paths from the root with forward slashes. */
export interface Source {
  path: string;
  lines: number;
  imports: string[];
}

/**
 * Reads every source file under `folders` of `root`. The compiler parses them, so that imports of types, re-exports and `import()`
 * count and comments and texts do not. Imports of packages are left out; a relative import of no file is kept as written.
 */
export function readSources(root: string, folders: string[]): Source[] {
  const files = folders.flatMap((folder) => sourceFiles(join(root, folder)));
  const scratch = mkdtempSync(join(tmpdir(), 'rooms-'));
  const api = new API({ cwd: scratch });
  try {
    const project = join(scratch, 'tsconfig.json');
    const compilerOptions = { noResolve: true, noLib: true, allowJs: true, types: [], module: 'nodenext', target: 'es2023' };
    writeFileSync(project, JSON.stringify({ compilerOptions, files }));
    const program = api.updateSnapshot({ openProject: project }).getProjects()[0].program;
    return files.map((file) => {
      const parsed = program.getSourceFile(file);
      if (parsed === undefined) throw new Error(`${file}: not read by the compiler`);
      const specifiers = parsed.imports.map((node) => ('text' in node ? String(node.text) : ''));
      const imports = specifiers.filter((text) => text.startsWith('.')).map((text) => resolveImport(file, text));
      return { path: fromRoot(root, file), lines: lineCount(file), imports: imports.map((target) => fromRoot(root, target)) };
    });
  } finally {
    api.close();
    rmSync(scratch, { recursive: true });
  }
}

/** Imports that point to the right, past an index, or out of the rooms; one sentence each. */
export function wrongDirections(sources: Source[]): string[] {
  const wrong: string[] = [];
  for (const { path, imports } of sources) {
    const from = roomOf(path);
    if (from === -1) continue;
    for (const target of imports) {
      const to = roomOf(target);
      if (to === from) continue;
      if (to === -1) wrong.push(`${path} imports ${target}, which stands in no room`);
      else if (to > from) wrong.push(`${path} imports ${target}, to the right of it`);
      else if (target !== `${ROOMS[to]}/index.ts`) wrong.push(`${path} imports ${target} past the index of ${ROOMS[to]}`);
    }
  }
  return wrong;
}

/** Circles of imports, each once, as `a -> b -> a`, starting at the name that sorts first. Imports of types count. */
export function importCircles(sources: Source[]): string[] {
  const importsOf = new Map(sources.map(({ path, imports }) => [path, imports]));
  const circles = new Set<string>();
  const done = new Set<string>();
  const trail: string[] = [];
  const visit = (path: string): void => {
    const start = trail.indexOf(path);
    if (start !== -1) {
      circles.add(circleName(trail.slice(start)));
      return;
    }
    if (done.has(path)) return;
    trail.push(path);
    for (const target of importsOf.get(path) ?? []) visit(target);
    trail.pop();
    done.add(path);
  };
  for (const { path } of sources) visit(path);
  return [...circles].sort();
}

/** Relative imports that no file answers. */
export function missingImports(root: string, sources: Source[]): string[] {
  return sources.flatMap(({ path, imports }) =>
    imports.filter((target) => !existsSync(join(root, target))).map((target) => `${path} imports ${target}, which is not there`),
  );
}

function circleName(members: string[]): string {
  const first = members.indexOf([...members].sort()[0]);
  const turned = [...members.slice(first), ...members.slice(0, first)];
  return [...turned, turned[0]].join(' -> ');
}

function roomOf(path: string): number {
  return ROOMS.indexOf(path.split('/')[0]);
}

function fromRoot(root: string, file: string): string {
  return relative(root, file).split(sep).join('/');
}

function lineCount(file: string): number {
  return readFileSync(file, 'utf8').replace(/\n$/, '').split('\n').length;
}

function sourceFiles(folder: string): string[] {
  if (!existsSync(folder)) return [];
  return readdirSync(folder, { recursive: true, encoding: 'utf8' })
    .filter((name) => /\.(ts|mts|cts|tsx|js|mjs|cjs|jsx)$/.test(name) && !name.split(sep).includes('node_modules'))
    .map((name) => join(folder, name))
    .sort();
}

/** Kernel files leave the ending out, as their compiler wants it. */
function resolveImport(file: string, specifier: string): string {
  const bare = resolve(dirname(file), specifier);
  return [bare, `${bare}.ts`, join(bare, 'index.ts')].find((path) => /\.\w+$/.test(path) && existsSync(path)) ?? bare;
}
