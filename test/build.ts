import { execFileSync } from 'node:child_process';

/** Vitest's global set-up: the kernel and the command line are built before any test runs. */
export default function setup(): void {
  execFileSync('npm', ['run', '--silent', 'build'], { stdio: 'inherit' });
}
