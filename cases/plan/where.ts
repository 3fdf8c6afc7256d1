/**
 * Comparisons that every point of a plan must meet, such as `channel.gap >= 2 * gas.bubble.diameter`. Parsed by the parser of mathjs;
 * of what it reads only numbers, units, keys, + - * / and comparisons are taken, so a plan can compute nothing else. Values carry their
 * dimensions: 3 mm is not compared with 2 s.
 */
import type { Path } from '../text.ts';
import { converted, type Finding, MEASURES, plainText, unitScale } from '../units.ts';
import { measureAt, pathOf } from './keys.ts';

/** A number in SI with the powers of its base dimensions; a pure number has none. */
interface Amount {
  value: number;
  dimensions: readonly number[];
}

/** Reads SI values of a case by path; undefined: not there, or no quantity. */
export type Lookup = (path: Path) => number | undefined;

type Term = (lookup: Lookup) => number;

/** A parsed expression: what mathjs calls a node, as far as it is used here. */
interface ParsedNode {
  type: string;
  op?: string;
  fn?: string;
  args?: ParsedNode[];
  params?: ParsedNode[];
  conditionals?: string[];
  content?: ParsedNode;
  value?: unknown;
  name?: string;
  object?: ParsedNode;
  index?: { dimensions: ParsedNode[]; dotNotation: boolean };
  toString(): string;
}

const COMPARISONS: Record<string, (a: number, b: number) => boolean> = {
  smaller: (a, b) => a < b && !close(a, b),
  smallerEq: (a, b) => a <= b || close(a, b),
  larger: (a, b) => a > b && !close(a, b),
  largerEq: (a, b) => a >= b || close(a, b),
  equal: close,
  unequal: (a, b) => !close(a, b),
};

/** 2 * 3 mm and 6 mm differ in the last bit. */
function close(a: number, b: number): boolean {
  return Math.abs(a - b) <= 1e-9 * Math.max(Math.abs(a), Math.abs(b));
}

const EXAMPLE = 'Write it as in "channel.gap >= 2 * gas.bubble.diameter"';

class Refusal extends Error {}

/** A key that a comparison reads has no value in a case. */
export class NoValue extends Error {}

/** A comparison as a test of a case, or what is wrong with it. */
export async function comparison(text: string): Promise<{ holds: (lookup: Lookup) => boolean } | Finding> {
  const { parse } = await import('./parser.ts');
  try {
    return { holds: compile(parse(plainText(text)) as ParsedNode) };
  } catch (error) {
    if (error instanceof Refusal) return { problem: error.message, remedy: EXAMPLE };
    if (error instanceof SyntaxError) return { problem: `cannot be read: ${error.message}`, remedy: EXAMPLE };
    throw error;
  }
}

function compile(node: ParsedNode): (lookup: Lookup) => boolean {
  if (node.type === 'ParenthesisNode') return compile(node.content as ParsedNode);
  const compares = node.type === 'OperatorNode' && (node.fn as string) in COMPARISONS;
  if (node.type !== 'RelationalNode' && !compares) throw new Refusal('is no comparison');
  const operators = node.conditionals ?? [node.fn as string];
  const terms = (node.params ?? node.args ?? []).map(term);
  const [first] = terms;
  for (const { dimensions } of terms) if (!same(dimensions, first.dimensions)) throw new Refusal('compares values of different kinds');
  return (lookup) => {
    const values = terms.map(({ value }) => value(lookup));
    return operators.every((operator, i) => COMPARISONS[operator](values[i], values[i + 1]));
  };
}

interface Compiled {
  value: Term;
  dimensions: readonly number[];
}

function term(node: ParsedNode): Compiled {
  switch (node.type) {
    case 'ParenthesisNode':
      return term(node.content as ParsedNode);
    case 'ConstantNode': {
      const { value } = node;
      if (typeof value !== 'number') throw new Refusal(`has ${String(node)}, which is no number`);
      return { value: () => value, dimensions: [] };
    }
    case 'SymbolNode':
      return constant(unitNamed(node.name as string));
    case 'AccessorNode':
      return keyed(keyOf(node));
    case 'OperatorNode':
      return calculated(node);
    default:
      throw new Refusal(`has ${String(node)}; only numbers, units, keys, + - * / and comparisons are allowed`);
  }
}

function constant({ value, dimensions }: Amount): Compiled {
  return { value: () => value, dimensions };
}

function calculated(node: ParsedNode): Compiled {
  const [a, b] = (node.args as ParsedNode[]).map(term);
  const { op } = node;
  if (b === undefined) {
    if (op === '-') return { value: (lookup) => -a.value(lookup), dimensions: a.dimensions };
    throw new Refusal(`has the operator ${op}; only + - * / are allowed`);
  }
  if (op === '*') return { value: (lookup) => a.value(lookup) * b.value(lookup), dimensions: powers(a.dimensions, b.dimensions, 1) };
  if (op === '/') return { value: (lookup) => a.value(lookup) / b.value(lookup), dimensions: powers(a.dimensions, b.dimensions, -1) };
  if (op !== '+' && op !== '-') throw new Refusal(`has the operator ${op}; only + - * / are allowed`);
  if (!same(a.dimensions, b.dimensions)) throw new Refusal(`${op === '+' ? 'adds' : 'subtracts'} values of different kinds`);
  const sign = op === '+' ? 1 : -1;
  return { value: (lookup) => a.value(lookup) + sign * b.value(lookup), dimensions: a.dimensions };
}

function unitNamed(name: string): Amount {
  const unit = unitScale(name);
  if (unit !== undefined) return unit;
  if (converted(1, name, 'K') !== undefined) throw new Refusal(`has ${name}; write temperatures in K here`);
  throw new Refusal(`has "${name}", which is neither a unit nor a key (keys are written in full, as in channel.gap)`);
}

/** `gas.bubble.diameter` from nested accesses. */
function keyOf(node: ParsedNode): string {
  if (node.type === 'SymbolNode') return node.name as string;
  if (node.type !== 'AccessorNode' || node.index?.dotNotation !== true) throw new Refusal(`has ${String(node)}, which is no key`);
  return `${keyOf(node.object as ParsedNode)}.${String(node.index.dimensions[0].value)}`;
}

function keyed(key: string): Compiled {
  const path = pathOf(key);
  const measure = measureAt(path);
  if (measure === undefined) throw new Refusal(`has ${key}, which is no key with a number`);
  const { si } = MEASURES[measure];
  const value: Term = (lookup) => {
    const found = lookup(path);
    if (found === undefined) throw new NoValue(`reads ${key}, which has no number in a point`);
    return found;
  };
  return { value, dimensions: si === '' ? [] : (unitScale(si)?.dimensions ?? []) };
}

function powers(a: readonly number[], b: readonly number[], sign: number): number[] {
  return Array.from({ length: Math.max(a.length, b.length) }, (_, i) => (a[i] ?? 0) + sign * (b[i] ?? 0));
}

function same(a: readonly number[], b: readonly number[]): boolean {
  return powers(a, b, -1).every((power) => power === 0);
}
