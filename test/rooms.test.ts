import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { importCircles, missingImports, ROOMS, readSources, type Source, wrongDirections } from './rooms.ts';

const LONGEST = 350;

describe('the house', () => {
  const root = join(import.meta.dirname, '..');
  let sources: Source[] = [];
  beforeAll(() => {
    sources = readSources(root, [...ROOMS, 'test']);
  });

  it('has files and an index in every room', () => {
    for (const room of ROOMS) expect(sources.filter(({ path }) => path.startsWith(`${room}/`)).length, room).toBeGreaterThan(0);
    const indexes = sources.map(({ path }) => path).filter((path) => /^\w+\/index\.ts$/.test(path));
    expect(indexes).toEqual(expect.arrayContaining(['solver/index.ts', 'cases/index.ts', 'output/index.ts']));
  });

  it('imports only towards the left, and only through the index of a room', () => {
    expect(wrongDirections(sources)).toEqual([]);
  });

  it('holds no circle of imports', () => {
    expect(importCircles(sources)).toEqual([]);
  });

  it('imports only files that are there', () => {
    expect(missingImports(root, sources)).toEqual([]);
  });

  it(`has no file of more than ${LONGEST} lines`, () => {
    expect(sources.filter(({ lines }) => lines > LONGEST).map(({ path, lines }) => `${path}: ${lines} lines`)).toEqual([]);
  });
});

describe('the checker of the house', () => {
  let root = '';
  let sources: Source[] = [];

  beforeAll(() => {
    root = mkdtempSync(join(tmpdir(), 'house-'));
    const files: Record<string, string> = {
      'solver/index.ts': "export { a } from './a.ts';\n",
      'solver/a.ts': "import { b } from './b.ts';\nexport const a = b;\n",
      'solver/b.ts': "import type { C } from './deep/c.ts';\nexport const b = 1 as unknown as C;\n",
      'solver/deep/c.ts': "export type C = import('../a.ts').A;\n",
      'solver/kernel/k.ts': "import { d } from './constants';\nexport function k(): number { return d; }\n",
      'solver/kernel/constants.ts': 'export const d = 1.0;\n',
      'cases/index.ts': "export * from '../solver/index.ts';\nexport { late } from './late.ts';\n",
      'cases/inner.ts': "import { a } from '../solver/a.ts';\nexport { a };\n",
      'cases/late.ts': 'export async function late() {\n  return await import(`../output/index.ts`);\n}\n',
      'cases/text.ts':
        "// import '../cli/main.ts'\nexport const text = \"import x from '../cli/main.ts'\";\nexport const more = `import '../cli/main.ts'`;\n",
      'output/index.ts': "export { late } from '../cases/index.ts';\nexport const self = () => import('./index.ts');\n",
      'output/stray.ts':
        "import { help } from '../test/help.ts';\nimport yaml from 'yaml';\nimport { gone } from './gone.ts';\nexport { gone, help, yaml };\n",
      'cli/main.ts': "import '../output/index.ts';\n",
      'cli/tool.mjs': "import { layOut } from '../cases/scale.ts';\nconsole.log(layOut);\n",
      'test/help.ts': "import { a } from '../solver/a.ts';\nexport const help = a;\n",
    };
    for (const [path, text] of Object.entries(files)) {
      mkdirSync(dirname(join(root, path)), { recursive: true });
      writeFileSync(join(root, path), text);
    }
    sources = readSources(root, [...ROOMS, 'test']);
  });

  afterAll(() => rmSync(root, { recursive: true }));

  it('names each import to the right, past an index or out of the rooms, and none in comments or texts', () => {
    expect(wrongDirections(sources)).toEqual([
      'cases/inner.ts imports solver/a.ts past the index of solver',
      'cases/late.ts imports output/index.ts, to the right of it',
      'output/stray.ts imports test/help.ts, which stands in no room',
      'cli/tool.mjs imports cases/scale.ts past the index of cases',
    ]);
  });

  it('names circles, through imports of types and late imports too, and a file that imports itself', () => {
    expect(importCircles(sources)).toEqual([
      'cases/index.ts -> cases/late.ts -> output/index.ts -> cases/index.ts',
      'output/index.ts -> output/index.ts',
      'solver/a.ts -> solver/b.ts -> solver/deep/c.ts -> solver/a.ts',
    ]);
  });

  it('names imports of files that are not there, and follows kernel imports without an ending', () => {
    expect(missingImports(root, sources)).toEqual([
      'output/stray.ts imports output/gone.ts, which is not there',
      'cli/tool.mjs imports cases/scale.ts, which is not there',
    ]);
    expect(sources.find(({ path }) => path === 'solver/kernel/k.ts')?.imports).toEqual(['solver/kernel/constants.ts']);
  });

  it('counts lines as an editor shows them', () => {
    expect(sources.find(({ path }) => path === 'cases/text.ts')?.lines).toBe(3);
  });
});
