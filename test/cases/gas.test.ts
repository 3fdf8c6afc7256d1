import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type Case, layOut, readCase } from '../../cases/index.ts';
import { meanArea_m2, sharesByNumber } from '../../cases/mixture.ts';
import { nextAir_s, onShare, timeWithAir_s } from '../../cases/pulse.ts';
import { Supply } from '../../cases/release.ts';
import { createReference } from '../../solver/index.ts';
import { schedule } from './schedule.ts';

const text = `
channel: {gap: 8 mm, height: 80 mm, membranes: [right]}
gas: {supply: 0.4 m3/(m2 h), serves: 1 m}
grid: {across: 20}
`;
const read = (...sets: string[]): Case => readCase(text, 'gas.yaml', sets);
const sum = (values: readonly number[]): number => values.reduce((total, value) => total + value, 0);

describe('a mixture of bubbles', () => {
  const kinds = '[{diameter: 5 mm, spread: 5 %, share: 60 %}, {diameter: 2 mm, spread: 5 %, share: 40 %}]';
  const areasOf = (shares: string) => schedule(read(`gas.bubble.mixture=${kinds}`, `gas.bubble.shares=${shares}`), 400).areas_m2;
  const large = (area: number): boolean => area > Math.PI * 0.00175 ** 2;

  it('has its shares in the gas let in, or in the number of bubbles, as the case says', () => {
    const byGas = areasOf('gas');
    const byNumber = areasOf('number');
    expect(byGas.length).toBeGreaterThan(4000);
    // 7129 and 3458 bubbles, seen 0.590 and 0.590; over twelve seeds 0.599 and 0.597, with deviations of 0.006 and 0.008
    expect(Math.abs(sum(byGas.filter(large)) / sum(byGas) - 0.6)).toBeLessThan(0.025);
    expect(Math.abs(byNumber.filter(large).length / byNumber.length - 0.6)).toBeLessThan(0.03);
  });

  it('lets in as much gas as is due all the same', () => {
    const panel = read(`gas.bubble.mixture=${kinds}`);
    const { areas_m2, due_m2 } = schedule(panel, 400);
    expect(Math.abs(sum(areas_m2) - due_m2)).toBeLessThan(Math.max(...areas_m2));
    // the number of bubbles is random; seen 1.8 % more
    expect(Math.abs(areas_m2.length / 400 / layOut(panel).derived.bubblesPerSecond - 1)).toBeLessThan(0.05);
  });

  it('of equal kinds is one kind, with another stream of random numbers', () => {
    const twice = read('gas.bubble.mixture=[{diameter: 4 mm, share: 50 %}, {diameter: 4 mm, share: 50 %}]').gas.bubble;
    const once = read('gas.bubble.diameter=4 mm').gas.bubble;
    expect(twice.diameter_m).toBeCloseTo(once.diameter_m, 15);
    expect(twice.kinds.map((kind) => kind.share)).toEqual([0.5, 0.5]);
  });

  it('turns shares of gas into shares of number by the mean area of a kind', () => {
    // a bubble of twice the diameter holds four times the gas
    const [a, b] = sharesByNumber(
      [
        { diameter_m: 0.004, spread: 0, share: 0.8 },
        { diameter_m: 0.002, spread: 0, share: 0.2 },
      ],
      0.01,
    );
    expect(a?.share).toBeCloseTo(0.5, 12);
    expect(b?.share).toBeCloseTo(0.5, 12);
    // normal distribution cut at two deviations: variance 1 - 4 phi(2)/(2 Phi(2) - 1) = 0.7737413 [V]
    const expected = ((Math.PI * 0.004 ** 2) / 4) * (1 + 0.04 * 0.7737413);
    expect(meanArea_m2({ diameter_m: 0.004, spread: 0.2 }, 0.01) / expected - 1).toBeLessThan(1e-8);
    // cut at the mean as well: E z = (phi(2) - phi(0))/(Phi(2) - 1/2), and E z^2 as before [V]
    const halfMean = (0.05399096651 - 0.3989422804) / 0.4772498681;
    const half = ((Math.PI * 0.004 ** 2) / 4) * (1 + 0.4 * halfMean + 0.04 * 0.7737413);
    expect(Math.abs(meanArea_m2({ diameter_m: 0.004, spread: 0.2 }, 0.004) / half - 1)).toBeLessThan(1e-7);
  });

  it('draws no other numbers than before where there is one kind', () => {
    // recorded before mixtures were there: a seeded run must stay the same
    const { times_s, areas_m2 } = schedule(read('gas.bubble={diameter: 4 mm, spread: 20 %}', 'gas.across=even'), 1);
    expect(times_s.slice(0, 3).map((t) => Number(t.toPrecision(6)))).toEqual(FIRST_TIMES_s);
    expect(areas_m2.slice(0, 3).map((a) => Number((1e6 * a).toPrecision(6)))).toEqual(FIRST_AREAS_mm2);
  });
});

const FIRST_TIMES_s = [0.00949333, 0.168613, 0.321973];
const FIRST_AREAS_mm2 = [13.9016, 14.1005, 9.49776];

describe('bubbles are let in', () => {
  const clear_m = (area_m2: number): number => Math.sqrt(area_m2 / Math.PI) + 2 * 0.0004;

  it('two cells clear of the wall they are let in at, whatever their size', () => {
    for (const side of ['left', 'right']) {
      const { places_m, areas_m2 } = schedule(read(`gas.across=${side}`), 20);
      expect(places_m.length).toBeGreaterThan(80);
      places_m.forEach((place, i) => {
        const clear = clear_m(areas_m2[i] as number);
        expect(place).toBeCloseTo(side === 'left' ? clear : 0.008 - clear, 12);
      });
    }
  });

  it('at each of several nozzles as often as at the others', () => {
    const { places_m } = schedule(read('gas.across=[2 mm, 4 mm, 5.8 mm]', 'gas.bubble={diameter: 2 mm, spread: 10 %}'), 100);
    const counts = [0.002, 0.004, 0.0058].map((at) => places_m.filter((place) => Math.abs(place - at) < 1e-12).length);
    expect(sum(counts)).toBe(places_m.length);
    // 3539 bubbles, deviation of a share 0.008; seen 0.323 to 0.343
    for (const count of counts) expect(Math.abs(count / places_m.length - 1 / 3)).toBeLessThan(0.035);
  });

  it('in their own order of chance for the same seed', () => {
    const sets = ['gas.across=[2.5 mm, 5.5 mm]', 'gas.bubble={mixture: [{diameter: 2 mm, share: 30 %}, {diameter: 3 mm, share: 70 %}]}'];
    expect(schedule(read(...sets), 5)).toEqual(schedule(read(...sets), 5));
    expect(schedule(read(...sets, 'gas.seed=2'), 5).places_m).not.toEqual(schedule(read(...sets), 5).places_m);
  });
});

describe('air on and off in turn', () => {
  const pulsed = read('gas.pulse={on: 2 s, off: 3 s}');

  it('comes at the asked supply while it is on, not at all while it is off, and in the mean by the share of time', () => {
    const { times_s, areas_m2 } = schedule(pulsed, 200);
    const { derived } = layOut(pulsed);
    for (const time_s of times_s) expect(time_s % 5).toBeLessThan(2 + 2 * derived.dt_s);
    const rate_m2_s = (0.4 / 3600) * 1;
    expect(Math.abs(sum(areas_m2) - 80 * rate_m2_s)).toBeLessThan(2 * Math.max(...areas_m2));
    expect(derived.meanSupply_m_s).toBeCloseTo((0.4 / 3600) * 0.4, 15);
    expect(layOut(read()).derived.meanSupply_m_s).toBe(read().gas.supply_m_s);
    expect(derived.bubblesPerSecond / layOut(read()).derived.bubblesPerSecond).toBeCloseTo(0.4, 12);
  });

  it('is the steady schedule with the pauses put in', () => {
    const steady = schedule(read(), 6);
    const { times_s, areas_m2 } = schedule(pulsed, 15);
    expect(areas_m2.slice(0, 20)).toEqual(steady.areas_m2.slice(0, 20));
    const dt_s = layOut(pulsed).derived.dt_s;
    times_s.forEach((time_s, i) => {
      const without_s = time_s - Math.floor((time_s + dt_s) / 5) * 3;
      expect(Math.abs(without_s - (steady.times_s[i] ?? Number.NaN))).toBeLessThan(2 * dt_s);
    });
  });

  it('counts time with air back and forth for any lengths', () => {
    const length = fc.double({ min: 0.01, max: 100, noNaN: true });
    fc.assert(
      fc.property(
        length,
        fc.double({ min: 0, max: 100, noNaN: true }),
        fc.double({ min: 0, max: 1e4, noNaN: true }),
        (on_s, off_s, air_s) => {
          const pulse = { pulse: { on_s, off_s } };
          const time_s = timeWithAir_s(pulse, air_s);
          const period_s = on_s + off_s;
          // with air at that moment, and as long with it before as asked
          const into_s = time_s - Math.floor((time_s + 1e-9) / period_s) * period_s;
          expect(into_s).toBeLessThan(on_s + 1e-7);
          expect(Math.floor((time_s + 1e-9) / period_s) * on_s + into_s).toBeCloseTo(air_s, 6);
          // what comes in a pause waits for its end, and not longer
          const later_s = nextAir_s(pulse, time_s + off_s / 2);
          expect(later_s).toBeGreaterThanOrEqual(time_s + off_s / 2);
          expect(later_s).toBeLessThanOrEqual(time_s + period_s);
        },
      ),
      { seed: 3, numRuns: 500 },
    );
    expect(onShare({ pulse: { on_s: 2, off_s: 3 } })).toBe(0.4);
  });

  it('that finds its place taken when it goes off comes when it is on again', () => {
    const panel = read('gas.pulse={on: 0.01 s, off: 1 s}', 'gas.start=[{across: 4 mm, along: 5 mm, diameter: 5 mm}]');
    const { setup, derived } = layOut(panel);
    const simulation = createReference(setup);
    const supply = new Supply(panel, derived);
    const late = Math.floor(0.0095 / derived.dt_s);
    Object.defineProperty(simulation, 'step', { value: late });
    supply.release(simulation);
    expect(supply.state.waits).toBe(1);
    expect(supply.step * derived.dt_s).toBeGreaterThanOrEqual(1.01 - 1e-9);
    expect(supply.step * derived.dt_s).toBeLessThan(1.01 + 2 * derived.dt_s);
  });
});
