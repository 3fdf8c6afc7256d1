import type { Path } from '../text.ts';
import type { CaseValue } from './values.ts';

/** Plain entries with another value at a path; the given ones stay as they are. Undefined: the path leads to no place in them. */
export function override(entries: unknown, path: Path, value: CaseValue): unknown {
  if (path.length === 0) return value;
  const [part, ...rest] = path;
  if (Array.isArray(entries)) {
    if (typeof part !== 'number' || part >= entries.length) return undefined;
    const inner = override(entries[part], rest, value);
    return inner === undefined ? undefined : entries.with(part, inner);
  }
  if (typeof part === 'number') return undefined;
  if (entries !== undefined && entries !== '' && typeof entries !== 'object') return undefined;
  const open = (entries === undefined || entries === '' ? {} : entries) as Record<string, unknown>;
  const inner = override(open[part], rest, value);
  return inner === undefined ? undefined : { ...open, [part]: inner };
}

/** What stands at a path. */
export function valueAt(entries: unknown, path: Path): unknown {
  return path.reduce<unknown>((value, part) => (value as Record<string | number, unknown> | undefined)?.[part], entries);
}
