import { existsSync, readFileSync } from 'node:fs';

/** The version in package.json, which lies one folder above the sources and two above the built files. */
export function version(): string {
  const file = ['../package.json', '../../package.json'].map((path) => new URL(path, import.meta.url)).find((url) => existsSync(url));
  if (file === undefined) throw new Error(`package.json is missing beside ${import.meta.url}; install swathe anew`);
  return (JSON.parse(readFileSync(file, 'utf8')) as { version: string }).version;
}
