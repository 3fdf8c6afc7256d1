import { chmodSync } from 'node:fs';

/** After the compiler: the file that the name `swathe` stands for may be executed. */
chmodSync(new URL('../.build/cli/main.js', import.meta.url), 0o755);
