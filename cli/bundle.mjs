/**
 * After the compiler: the command line and the packages it uses become a few files, one for what all commands share and one for each
 * command, for Node.js takes longer to find several hundred small files than to run them. Written over main.js, which may be executed.
 * Processor time to start, Node.js itself included (0.13 s): --version 0.36 -> 0.23 s, gallery 0.81 -> 0.44 s, run 0.99 -> 0.38 s,
 * sweep 1.13 -> 0.46 s. Packages imported as a whole (`import * as z`) leave out what nobody calls: half of the largest file.
 */
import { chmodSync, readFileSync, rmSync } from 'node:fs';
import { dirname, join, relative } from 'node:path';
import { fileURLToPath } from 'node:url';
import { build } from 'esbuild';

const built = fileURLToPath(new URL('../.build/', import.meta.url));
const main = join(built, 'cli/main.js');
const parts = join(built, 'parts');

/** Modules go on looking for their neighbours on the disk (the kernel, threads, ready-made cases) from where the compiler put them. */
const places = {
  name: 'places',
  setup({ onLoad }) {
    onLoad({ filter: /\.js$/ }, ({ path }) => {
      if (!path.startsWith(built)) return undefined;
      const place = JSON.stringify(relative(parts, path));
      const contents = readFileSync(path, 'utf8').replaceAll('import.meta.url', `new URL(${place}, import.meta.url).href`);
      return { contents, resolveDir: dirname(path) };
    });
  },
};

/** What packages in the older module format find around them. */
const OLDER_FORMAT = [
  "import { createRequire as makeRequire } from 'node:module';",
  "import { fileURLToPath as pathOfThis } from 'node:url';",
  'const require = makeRequire(import.meta.url);',
  'const __filename = pathOfThis(import.meta.url);',
].join(' ');

rmSync(parts, { recursive: true, force: true });
await build({
  entryPoints: [main],
  outdir: built,
  outbase: built,
  // beside the rooms, so that a place is the same way off from here as from cli/main.js
  chunkNames: 'parts/[name]-[hash]',
  allowOverwrite: true,
  bundle: true,
  splitting: true,
  format: 'esm',
  platform: 'node',
  target: 'node20',
  minifyWhitespace: true,
  sourcemap: 'linked',
  banner: { js: OLDER_FORMAT },
  plugins: [places],
  logLevel: 'warning',
});
chmodSync(main, 0o755);
