import { describe, expect, test } from 'vitest';
import { measure } from '../../output/index.ts';
import { blowerPower, overpressure_Pa } from '../../output/measures/air.ts';
import { type Making, makeRecording } from './recordings.ts';

const answersOf = (making: Making) => {
  const { answers, air } = measure(makeRecording(making));
  return { air, answer: (name: string) => answers.find((one) => one.name === name) };
};

describe('the power of the blower', () => {
  // worked example [V from published inputs]: 9000 m2 of membrane, 54 Nm3/min (1.293 kg/m3), nozzles 2.5 m deep, 1.0 m of losses, e 0.6
  const air = { depth_m: 2.5, losses_m: 1, efficiency: 0.6, inlet_K: 293.15 };
  const flow_kg_s = (54 / 60) * 1.293;
  const over_Pa = overpressure_Pa(air, 1000);

  test('of the worked example is 29.8 kW ideal, 49.6 kW drawn, 5.5 W/m2', () => {
    // printed to three digits; seen 1.1637 kg/s, 34.32 kPa, 29.77 kW, 49.62 kW, 5.514 W/m2
    expect(flow_kg_s).toBeCloseTo(1.163, 2);
    expect(over_Pa / 1000).toBeCloseTo(34.3, 1);
    expect(blowerPower(flow_kg_s, over_Pa, { ...air, efficiency: 1 }) / 29_800).toBeCloseTo(1, 2);
    const power_W = blowerPower(flow_kg_s, over_Pa, air);
    expect(power_W / 49_600).toBeCloseTo(1, 2);
    expect(power_W / 9000).toBeCloseTo(5.5, 1);
    // 25 L/(m2 h) make 225 m3/h
    expect(power_W / 1000 / 225).toBeCloseTo(0.22, 2);
  });

  test('is that of isothermal compression for a small overpressure: flow times pressure over density', () => {
    // p dV = w R T / M ln(1 + dp/p), which is w dp/rho for small dp: 100 Pa of 101325, relative error 4e-4
    const density_kg_m3 = (101_325 * 0.02897) / (8.314 * 293.15);
    expect(blowerPower(1, 100, { ...air, efficiency: 1 }) / (100 / density_kg_m3)).toBeCloseTo(1, 3);
  });

  test('follows from the case: supply at the atmosphere, depth and losses of the liquid', () => {
    const { air: found, answer } = answersOf({ air: { flux_m_s: 25e-3 / 3600 } });
    expect(found.overpressure_Pa).toBeCloseTo(1000 * 9.80665 * 3.5, 6);
    // 1e-4 m3/(m2 s) of 1.2 kg/m3; 1.2e-4 kg/(m2 s) at 42.641 kJ/kg, by hand
    expect(found.power_W_m2).toBeCloseTo(5.117, 3);
    expect(answer('air_power_W_m2')).toEqual({
      name: 'air_power_W_m2',
      value: found.power_W_m2,
      low: found.power_W_m2,
      high: found.power_W_m2,
    });
    expect(found.energy_J_m3).toBeCloseTo((found.power_W_m2 * 3600) / 25e-3, 6);
    expect(answersOf({}).air.energy_J_m3).toBeNull();
    expect(answersOf({}).answer('air_energy_J_m3')?.value).toBeNull();
  });
});

describe('what a watt buys', () => {
  // elements are above the threshold in turns: a quarter of them in each window of one sample
  const making: Making = {
    elements: 10,
    samples: 400,
    swept: { above_Pa: 0.5, within_s: 0.01 },
    shear: (_, s, e) => ((s + e) % 4 === 0 || (s * 7 + e * 3) % 11 === 0 ? 1 : 0.1),
  };

  test.each(['swept', 'mean_shear'])('is %s over the power, its interval too', (stem) => {
    const { air, answer } = answersOf(making);
    const unit = stem === 'swept' ? '' : '_Pa';
    for (const place of ['left', 'right', 'together']) {
      const plain = answer(`${stem}_${place}${unit}`);
      const per = answer(`${stem}_per_power_${place}${unit}_m2_W`);
      for (const end of ['value', 'low', 'high'] as const) {
        expect(plain?.[end]).toBeGreaterThan(0);
        expect(per?.[end]).toBeCloseTo((plain?.[end] as number) / air.power_W_m2, 12);
      }
    }
  });

  test('is not to be had without air', () => {
    const recording = makeRecording(making);
    const { answers } = measure({ ...recording, derived: { ...recording.derived, meanSupply_m_s: 0 } });
    const found = answers.filter(({ name }) => name.includes('per_power')).map(({ value }) => value);
    expect(found).toEqual(found.map(() => null));
    expect(answers.find(({ name }) => name === 'air_power_W_m2')?.value).toBe(0);
  });
});
