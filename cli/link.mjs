import { chmodSync, mkdirSync, rmSync, symlinkSync } from 'node:fs';
import { fileURLToPath } from 'node:url';

/**
 * After the compiler: the file that the name `swathe` stands for may be executed, and `npx swathe` finds it among the project's own
 * commands. Without the link npx keeps a folder of its own for the project, which one interrupted first call leaves unusable.
 */
const at = (path) => fileURLToPath(new URL(path, import.meta.url));
chmodSync(at('../.build/cli/main.js'), 0o755);
mkdirSync(at('../node_modules/.bin'), { recursive: true });
rmSync(at('../node_modules/.bin/swathe'), { force: true });
symlinkSync('../../.build/cli/main.js', at('../node_modules/.bin/swathe'));
