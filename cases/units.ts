/**
 * Quantities as people write them ("0.4 m3/(m2 h)", "20 °C", "15 %") turned into SI numbers.
 * Units are parsed by the unit class of mathjs, loaded alone: the whole of mathjs takes more than half a second to start.
 */
import { createRequire } from 'node:module';
import { dirname, join } from 'node:path';
import { closest } from 'fastest-levenshtein';
import { type Memory, remembered } from './memory.ts';

/** What went wrong with one value; the place is added by whoever knows it. */
export interface Finding {
  problem: string;
  allowed?: string;
  remedy?: string;
}

interface UnitValue {
  /** in SI */
  value: number;
  /** powers of the base dimensions */
  dimensions: number[];
  equalBase(other: UnitValue): boolean;
  toNumeric(unit: string): number;
}
interface UnitClass {
  new (value: number | null, unit: string): UnitValue;
  parse(text: string): UnitValue;
}

/** The SI unit each kind of quantity is computed in, and an example to show; '' stands for a pure number. */
export const MEASURES = {
  length: { si: 'm', named: 'a length', example: '8 mm' },
  angle: { si: 'rad', named: 'an angle', example: '20 deg' },
  time: { si: 's', named: 'a time', example: '2 s' },
  speed: { si: 'm/s', named: 'a speed', example: '0.1 m/s' },
  supply: { si: 'm/s', named: 'a gas flow per membrane area', example: '0.4 m3/(m2 h)' },
  flux: { si: 'm/s', named: 'a flow of permeate per membrane area', example: '25 L/(m2 h)' },
  stress: { si: 'Pa', named: 'a stress', example: '0.5 Pa' },
  temperature: { si: 'K', named: 'a temperature', example: '20 degC' },
  density: { si: 'kg/m^3', named: 'a density', example: '998 kg/m3' },
  viscosity: { si: 'Pa s', named: 'a dynamic viscosity', example: '1 mPa s' },
  tension: { si: 'N/m', named: 'a surface tension', example: '72 mN/m' },
  load: { si: 'kg/m^2', named: 'a mass per area', example: '5 g/m2' },
  share: { si: '', named: 'a share', example: '15 %' },
} as const;

export type Measure = keyof typeof MEASURES;

const KNOWN_UNITS = [
  'mm',
  'cm',
  'm',
  'um',
  'deg',
  'rad',
  's',
  'ms',
  'min',
  'h',
  'Pa',
  'mPa',
  'degC',
  'K',
  'kg/m3',
  'g/L',
  'g/m2',
  'Pa s',
  'mPa s',
]
  .concat(['mN/m', 'N/m', 'm/s', 'mm/s', 'cm/s', 'm3/(m2 h)', 'L/(m2 h)', '%'])
  .concat(['m3/m2/h', 'N/mm', 'kg/L', 'L', 'g', 'kg']);

const NUMBER = /^([+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?)\s*(.*)$/;

let loaded: UnitClass | undefined;

/** mathjs offers its unit class only together with everything else, so the file is taken out of the package by its path. */
function unitClass(): UnitClass {
  if (loaded !== undefined) return loaded;
  const require = createRequire(import.meta.url);
  const folder = dirname(require.resolve('mathjs'));
  const { createUnitClass } = require(join(folder, 'type/unit/Unit.js')) as { createUnitClass: (parts: object) => UnitClass };
  const absent = class {};
  loaded = createUnitClass({
    config: { number: 'number', predictable: false },
    addScalar: (a: number, b: number) => a + b,
    subtractScalar: (a: number, b: number) => a - b,
    multiplyScalar: (a: number, b: number) => a * b,
    divideScalar: (a: number, b: number) => a / b,
    equal: (a: number, b: number) => a === b,
    pow: Math.pow,
    abs: Math.abs,
    fix: Math.trunc,
    round: Math.round,
    isNumeric: (a: unknown) => typeof a === 'number',
    format: String,
    number: Number,
    Complex: absent,
    BigNumber: absent,
    Fraction: absent,
  });
  return loaded;
}

/** One spelling for what looks alike: full-width and raised digits, the micro sign, the degree sign, the long minus. */
export function plainText(text: string): string {
  return text
    .replaceAll('°C', 'degC')
    .replaceAll('°', ' deg')
    .normalize('NFKC')
    .replaceAll('μ', 'u')
    .replaceAll('−', '-')
    .replaceAll('·', ' ')
    .trim();
}

/** Texts and limits that were read before. */
const known: { quantities: Memory<{ value: number } | Finding>; limits: Memory<number> } = { quantities: new Map(), limits: new Map() };

/** The SI value of `text`, or what is wrong with it. */
export function readQuantity(text: string, measure: Measure): { value: number } | Finding {
  return remembered(known.quantities, `${measure} ${text}`, () => parseQuantity(text, measure));
}

function parseQuantity(text: string, measure: Measure): { value: number } | Finding {
  const { si, named, example } = MEASURES[measure];
  const parts = NUMBER.exec(plainText(text));
  const remedy = `Write ${named} as in "${example}"`;
  if (parts === null) return { problem: 'is not a number with a unit', remedy };
  const [, digits, unit] = parts as unknown as [string, string, string];
  const number = Number(digits);
  if (!Number.isFinite(number)) return { problem: 'is not finite', remedy };
  if (/^,\d/.test(unit)) return { problem: 'has a decimal comma', remedy: `Write a point: "${text.replace(',', '.')}"` };
  if (si === '') {
    if (unit === '') return { value: number };
    if (unit === '%') return { value: number / 100 };
    return { problem: `has the unit "${unit}", but ${named} is a plain number or per cent`, remedy };
  }
  if (unit === '') return { problem: 'has no unit', remedy };
  if (unit === '%') return { problem: `is a share, not ${named}`, remedy };
  return convert(number, unit, measure);
}

function convert(number: number, unit: string, measure: Measure): { value: number } | Finding {
  const { si, named, example } = MEASURES[measure];
  const Unit = unitClass();
  let quantity: UnitValue;
  try {
    quantity = new Unit(number, unit);
  } catch {
    const near = closest(unit, KNOWN_UNITS);
    return { problem: `has an unknown unit "${unit}"`, remedy: `Did you mean "${near}"? ${capital(named)} is written as in "${example}"` };
  }
  if (!quantity.equalBase(Unit.parse(si)))
    return { problem: `has the unit "${unit}", which does not measure ${named}`, remedy: `Write ${named} as in "${example}"` };
  const value = quantity.toNumeric(si);
  if (!Number.isFinite(value)) return { problem: 'is not finite', remedy: `Write ${named} as in "${example}"` };
  return { value };
}

/** A number and the unit it was written with, '' for none; or what is wrong with it. */
export function readAmount(text: string): { value: { number: number; unit: string } } | Finding {
  const parts = NUMBER.exec(plainText(text));
  const remedy = 'Write it as in "8 mm"';
  if (parts === null) return { problem: 'is not a number with a unit', remedy };
  const [, digits, unit] = parts as unknown as [string, string, string];
  const number = Number(digits);
  if (!Number.isFinite(number)) return { problem: 'is not finite', remedy };
  if (/^,\d/.test(unit)) return { problem: 'has a decimal comma', remedy: `Write a point: "${text.replace(',', '.')}"` };
  return { value: { number, unit } };
}

/** A number of one unit as number of another; undefined where the two do not measure the same, or one is unknown. */
export function converted(number: number, from: string, to: string): number | undefined {
  if (from === to) return number;
  if (from === '' || to === '') return undefined;
  const Unit = unitClass();
  try {
    const quantity = new Unit(number, from);
    return quantity.equalBase(Unit.parse(to)) ? quantity.toNumeric(to) : undefined;
  } catch {
    return undefined;
  }
}

/** SI value and dimensions of one of a unit, as in "mm" or "m3"; undefined for an unknown unit. Temperatures have an origin and are refused. */
export function unitScale(unit: string): { value: number; dimensions: readonly number[] } | undefined {
  try {
    const one = new (unitClass())(1, unit);
    const zero = new (unitClass())(0, unit);
    return zero.value === 0 ? { value: one.value, dimensions: one.dimensions } : undefined;
  } catch {
    return undefined;
  }
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}

/** SI value of a number in a unit the code itself names; for limits and messages. */
export function inSI(number: number, unit: string, measure: Measure): number {
  const { si } = MEASURES[measure];
  if (si === '') return unit === '%' ? number / 100 : number;
  return remembered(known.limits, `${measure} ${number} ${unit}`, () => new (unitClass())(number, unit).toNumeric(si));
}

/** A length in mm with four figures at most, for messages. */
export function mm(length_m: number): string {
  return `${Number((1000 * length_m).toPrecision(4))} mm`;
}
