import { describe, expect, test } from 'vitest';
import { measure } from '../../output/index.ts';
import { type Making, makeRecording } from './recordings.ts';

/** Covers with 0.02 1/s: 1e-5 m/s of 10 kg/m3 onto 5 g/m2. */
const deposit = { flux_m_s: 1e-5, solids_kg_m3: 10, layer_kg_m2: 0.005, above_Pa: 0.5, clears_s: 0.2, start: 1 };
const COVERS_1_S = 0.02;
const CLEARS_1_S = 5;

const covers = (shear: NonNullable<Making['shear']>, making: Making = {}) => {
  const found = measure(makeRecording({ samples: 200, every_s: 0.01, deposit, shear, ...making })).deposit.left;
  if (found === null) throw new Error('no deposit');
  return found;
};

describe('a deposit', () => {
  test('grows to full cover by an exponential where no shear takes it off', () => {
    const { fromStart, settled } = covers(() => 0.5, { deposit: { ...deposit, start: 0 } });
    // threshold itself is not above
    fromStart.forEach((covered, i) => {
      expect(covered).toBeCloseTo(1 - Math.exp(-COVERS_1_S * 0.01 * (i + 1)), 12);
    });
    for (const covered of settled) expect(covered).toBeCloseTo(1, 9);
  });

  test('falls under steady strong shear to where covering and clearing balance', () => {
    const { fromStart, settled } = covers(() => -0.6);
    const balance = COVERS_1_S / (COVERS_1_S + CLEARS_1_S);
    fromStart.forEach((covered, i) => {
      expect(covered).toBeCloseTo(balance + (1 - balance) * Math.exp(-(COVERS_1_S + CLEARS_1_S) * 0.01 * (i + 1)), 12);
    });
    for (const covered of settled) expect(covered).toBeCloseTo(balance, 12);
  });

  test('settles between gusts into the cycle that a long run of them ends in', () => {
    // strong during the last tenth of a recording of 2 s
    const shear: NonNullable<Making['shear']> = (_, s) => (s % 200 >= 180 ? 0.9 : 0.1);
    const { settled } = covers(shear);
    // twenty thousand seconds of the same, sample by sample, in closed form over one cycle: 1.8 s of covering, 0.2 s of clearing
    const balance = COVERS_1_S / (COVERS_1_S + CLEARS_1_S);
    let c = 1;
    for (let cycle = 0; cycle < 1e4; cycle++) {
      c = 1 + (c - 1) * Math.exp(-COVERS_1_S * 1.8);
      c = balance + (c - balance) * Math.exp(-(COVERS_1_S + CLEARS_1_S) * 0.2);
    }
    expect(settled[199]).toBeCloseTo(c, 12);
    expect(settled[179]).toBeCloseTo(1 + (c - 1) * Math.exp(-COVERS_1_S * 1.8), 12);
    const long = covers(shear, { samples: 200 * 400 }).fromStart;
    expect(long[long.length - 1]).toBeCloseTo(c, 9);
  });

  test('is the mean over the elements: what is swept becomes clean, what is not stays covered', () => {
    const recording = makeRecording({
      samples: 200,
      deposit: { ...deposit, flux_m_s: 0 },
      shear: (side, _, e) => (side === 'left' && e >= 1 && e < 3 ? 0.8 : 0.2),
    });
    const { deposit: found, answers } = measure(recording);
    // 2 of 8 open elements, cleared for 2 s at 5 1/s
    expect(found.left?.fromStart.at(-1)).toBeCloseTo(6 / 8 + (2 / 8) * Math.exp(-10), 12);
    expect(found.right?.fromStart.at(-1)).toBe(1);
    expect(found.together?.fromStart.at(-1)).toBeCloseTo(14 / 16 + (2 / 16) * Math.exp(-10), 12);
    // without flux nothing comes back, and what never feels strong shear stays as it was at the start
    expect(answers.find(({ name }) => name === 'settled_cover_left')?.value).toBeCloseTo(6 / 8, 12);
    expect(answers.find(({ name }) => name === 'settled_cover_right')).toMatchObject({ value: 1, low: null, high: null });
  });

  test('is off unless the case asks for it', () => {
    const { deposit: found, answers } = measure(makeRecording({ shear: () => 1 }));
    expect(found).toEqual({ left: null, right: null, together: null });
    expect(answers.find(({ name }) => name === 'settled_cover_left')).toEqual({
      name: 'settled_cover_left',
      value: null,
      low: null,
      high: null,
    });
  });
});
