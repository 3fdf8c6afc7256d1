/**
 * The text of a case as a tree that knows where each value stands. Everything stays text (YAML's failsafe schema): the
 * table of keys decides what is a number. Aliases, tags and keys that are not plain words are refused.
 */
import { Alias, type Document, isMap, isScalar, isSeq, LineCounter, type Node, type Pair, parseDocument, Scalar, YAMLMap } from 'yaml';
import { CaseError, type CaseFault } from '../solver/index.ts';

export type Path = readonly (string | number)[];

/** Where a node was read. */
interface Origin {
  file: string;
  lines: LineCounter;
}

/** A case text with its overrides applied. */
export interface CaseTree {
  file: string;
  document: Document;
  origins: Map<Node, Origin>;
}

/** Longest text taken for a case file, characters. */
const LONGEST = 1_000_000;

/**
 * Parses `text` and applies `sets`, each `path=value` with the value in YAML.
 * @throws CaseError for anything that is not one plain map
 */
export function parseTree(text: string, file: string, sets: readonly string[]): CaseTree {
  const origins = new Map<Node, Origin>();
  const document = parseText(text, file, origins);
  if (document.contents === null || (isScalar(document.contents) && document.contents.value === '')) {
    refuse(file, 1, 1, '', '', 'the file is empty', 'Start from a ready-made case of the gallery');
  }
  if (!isMap(document.contents)) {
    const what = isSeq(document.contents) ? 'list' : 'single value';
    refuse(file, 1, 1, '', '', `the file holds a ${what}, not keys with values`, 'Start with a line such as "title: My panel"');
  }
  const tree = { file, document, origins };
  for (const set of sets) applySet(tree, set);
  return tree;
}

function parseText(text: string, file: string, origins: Map<Node, Origin>): Document {
  if (text.length > LONGEST)
    refuse(file, 1, 1, '', `${text.length} characters`, 'the text is too long', `Keep it below ${LONGEST} characters`);
  const lines = new LineCounter();
  let document: Document;
  try {
    document = parseDocument(text, { schema: 'failsafe', lineCounter: lines, prettyErrors: false });
  } catch (cause) {
    if (!(cause instanceof RangeError)) throw cause;
    refuse(file, 1, 1, '', '', 'the text is nested too deeply', 'A case needs no more than four levels');
  }
  const faults = [...document.errors, ...document.warnings].map((error): CaseFault => {
    const { line, col } = lines.linePos(error.pos[0]);
    return { file, line, column: col, path: '', value: '', problem: spoken(error.code, error.message) };
  });
  if (faults.length > 0) throw new CaseError(faults);
  register(document.contents as Node | null, { file, lines }, origins, [], 0);
  return document;
}

function spoken(code: string, message: string): string {
  if (code === 'DUPLICATE_KEY') return 'a key stands here for the second time';
  if (code === 'MULTIPLE_DOCS') return 'a second document starts here; a file holds one case';
  if (code === 'TAG_RESOLVE_FAILED') return 'tags (words starting with "!") are not used in case files';
  if (code === 'TAB_AS_INDENT') return 'a tab indents this line; indent with spaces';
  return `this is not valid YAML: ${message.replace(/\s+/g, ' ').replace(/ and end with a /, ' and end with ')}`;
}

/** Notes where every node stands and refuses what a case file does not use. */
function register(node: Node | null, origin: Origin, origins: Map<Node, Origin>, path: Path, depth: number): void {
  if (node === null) return;
  origins.set(node, origin);
  if (node instanceof Alias)
    refuseAt(node, origin, path, `*${node.source}`, 'is an alias, which case files do not use', 'Write the value out');
  if (depth > 20) refuseAt(node, origin, path.slice(0, 1), '', 'is nested too deeply', 'A case needs no more than four levels');
  if (node.tag?.startsWith('!') === true)
    refuseAt(node, origin, path, node.tag, 'has a tag, which case files do not use', 'Leave the tag out');
  if (isSeq(node)) node.items.forEach((item, i) => void register(item as Node | null, origin, origins, [...path, i], depth + 1));
  if (!isMap(node)) return;
  for (const pair of node.items as Pair<Node, Node | null>[]) {
    const key: unknown = isScalar(pair.key) ? pair.key.value : undefined;
    if (typeof key !== 'string' || key === '__proto__' || key === '') {
      refuseAt(pair.key, origin, path, '', 'has a key that is not a plain word', 'Write keys as words, followed by a colon and a blank');
    }
    origins.set(pair.key, origin);
    register(pair.value, origin, origins, [...path, key], depth + 1);
  }
}

/** The tree as plain maps, lists and texts. */
export function plain(node: unknown): unknown {
  if (isMap(node)) return Object.fromEntries(node.items.map((pair) => [keyOf(pair as Pair), plain(pair.value)]));
  if (isSeq(node)) return node.items.map(plain);
  return isScalar(node) ? String(node.value ?? '') : '';
}

function keyOf(pair: Pair): string {
  return isScalar(pair.key) ? String(pair.key.value) : '';
}

function applySet(tree: CaseTree, set: string): void {
  const cut = set.indexOf('=');
  const path = set.slice(0, Math.max(cut, 0)).trim();
  if (cut < 1 || path === '' || path.split('.').some((part) => part.trim() === '')) {
    refuse(`--set ${set}`, 1, 1, '', set, 'is not of the form path=value', 'Write for example "channel.tilt=25 deg"');
  }
  const file = `--set ${path}`;
  const value = parseText(set.slice(cut + 1), file, tree.origins).contents as Node | null;
  if (value === null) refuse(file, 1, 1, path, '', 'has no value', 'Write for example "channel.tilt=25 deg"');
  const parts = path.split('.').map((part) => part.trim());
  let place: unknown = tree.document.contents;
  parts.slice(0, -1).forEach((part, i) => {
    place = descend(tree, place, part, parts.slice(0, i), file);
  });
  const last = parts.at(-1) as string;
  if (isMap(place)) place.set(keyNode(tree, place, last, file), value);
  else if (isSeq(place) && /^\d+$/.test(last) && Number(last) <= place.items.length) place.set(Number(last), value);
  else refuse(file, 1, 1, path, set.slice(cut + 1), 'does not lead to a place in this case', 'Check the path against the case file');
}

function descend(tree: CaseTree, place: unknown, part: string, above: readonly string[], file: string): unknown {
  const inner: unknown = isMap(place)
    ? place.get(part, true)
    : isSeq(place) && /^\d+$/.test(part)
      ? place.get(Number(part), true)
      : undefined;
  if (isMap(inner) || isSeq(inner)) return inner;
  if (!isMap(place) || (inner !== undefined && !(isScalar(inner) && inner.value === ''))) {
    refuse(file, 1, 1, [...above, part].join('.'), '', 'does not lead to a place in this case', 'Check the path against the case file');
  }
  const made = new YAMLMap();
  tree.origins.set(made, { file, lines: new LineCounter() });
  place.set(keyNode(tree, place, part, file), made);
  return made;
}

/** The key that is there already, or a new one whose place is the command line. */
function keyNode(tree: CaseTree, map: YAMLMap, key: string, file: string): unknown {
  if (map.has(key)) return key;
  const node = new Scalar(key);
  tree.origins.set(node, { file, lines: new LineCounter() });
  return node;
}

/** Where a fault at `path` is to be shown: the value, the key for `atKey`, or the nearest thing around it. */
export function locate(tree: CaseTree, path: Path, atKey: boolean): { file: string; line: number; column: number } {
  let node = tree.document.contents as Node | null;
  let found: Node | null = node;
  path.forEach((part, i) => {
    const last = i === path.length - 1;
    const pair = isMap(node) ? (node.items as Pair<Node, Node | null>[]).find((item) => keyOf(item) === String(part)) : undefined;
    node = pair !== undefined ? pair.value : isSeq(node) ? ((node.items[Number(part)] as Node | undefined) ?? null) : null;
    const key = pair?.key ?? null;
    const empty = node === null || (isScalar(node) && node.value === '');
    found = (last && atKey) || (empty && key !== null) ? (key ?? found) : (node ?? found);
  });
  const origin = found === null ? undefined : tree.origins.get(found);
  if (found === null || origin === undefined) return { file: tree.file, line: 1, column: 1 };
  const at = (found as Node).range?.[0];
  if (at === undefined || origin.lines.lineStarts.length === 0) return { file: origin.file, line: 1, column: 1 };
  const { line, col } = origin.lines.linePos(at);
  return { file: origin.file, line, column: col };
}

/**
 * The case as run: the original text with the overrides put in, comments kept.
 * @throws CaseError as {@link parseTree}
 */
export function caseText(text: string, sets: readonly string[] = []): string {
  if (sets.length === 0) return text;
  return parseTree(text, 'case', sets).document.toString({ lineWidth: 0 });
}

function refuse(file: string, line: number, column: number, path: string, value: string, problem: string, remedy: string): never {
  throw new CaseError([{ file, line, column, path, value, problem, remedy }]);
}

function refuseAt(node: Node, origin: Origin, path: Path, value: string, problem: string, remedy: string): never {
  const { line, col } = origin.lines.linePos(node.range?.[0] ?? 0);
  const shown = path.length === 0 ? `the file ${problem}` : problem;
  refuse(origin.file, line, col, path.join('.'), value, shown, remedy);
}
