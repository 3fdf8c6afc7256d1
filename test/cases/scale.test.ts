import { describe, expect, it } from 'vitest';
import { type Case, layOut, readCase } from '../../cases/index.ts';

const text = `
channel: {gap: 8 mm, height: 100 mm, tilt: 20 deg, membranes: [right], return: {loss: 2}}
liquid: {kind: water, temperature: 20 degC}
gas: {supply: 0.4 m3/(m2 h), serves: 1 m, bubble: {diameter: 5 mm}, softened: {density: 20 kg/m3, viscosity: 2e-4 Pa s}}
`;
const read = (...sets: string[]): Case => readCase(text, 'scale.yaml', sets);

/** Dimensionless numbers are pure ratios, so only round-off may stand between the two sides. */
const ROUND_OFF = 1e-12;
const relative = (a: number, b: number): number => Math.abs(a / b - 1);

describe('the lattice box of a case', () => {
  it.each(['grid.across=40', 'grid.across=75', 'grid.speed=0.7 m/s'])('keeps Re, Eo and Mo (%s)', (set) => {
    const panel = read(set);
    const { setup, derived } = layOut(panel);
    const { liquid, gas, gravity, surfaceTension, buoyancy } = setup;
    if (gas === undefined || gravity === undefined || surfaceTension === undefined || buoyancy === undefined) throw new Error('incomplete');
    const g = Math.hypot(gravity.x, gravity.y);
    const d = derived.cellsPerBubble;
    // the pull on the gas: lattice density difference times its buoyancy factor stands for liquid less true air
    const difference = (liquid.density - gas.density) * buoyancy;
    expect(relative((difference * g * d ** 2) / surfaceTension, derived.Eo)).toBeLessThan(ROUND_OFF);
    expect(relative((g * liquid.viscosity ** 4 * difference) / (liquid.density ** 2 * surfaceTension ** 3), derived.Mo)).toBeLessThan(
      ROUND_OFF,
    );
    const speed_m_s = 0.1;
    const ReSI = (panel.liquid.density_kg_m3 * speed_m_s * panel.gas.bubble.diameter_m) / panel.liquid.viscosity_Pa_s;
    expect(relative(((speed_m_s / derived.unit.velocity_m_s) * d * liquid.density) / liquid.viscosity, ReSI)).toBeLessThan(ROUND_OFF);
    expect(relative(gas.viscosity / liquid.viscosity, 2e-4 / panel.liquid.viscosity_Pa_s)).toBeLessThan(ROUND_OFF);
  });

  it('has the Eotvos and Morton numbers of a 5 mm bubble in water at 20 degC', () => {
    // (998.207 - 1.204) 9.80665 0.005^2 / 0.072736 = 3.3605; Mo of water is 2.6e-11 (common practice)
    const { derived } = layOut(read());
    expect(derived.Eo).toBeCloseTo(3.3605, 3);
    expect(derived.Mo * 1e11).toBeCloseTo(2.57, 2);
  });

  it('turns gravity by the tilt so that gas is driven up and to the right wall', () => {
    const { gravity } = layOut(read()).setup;
    const angle = (20 * Math.PI) / 180;
    expect((gravity?.y ?? 0) / (gravity?.x ?? 1)).toBeCloseTo(Math.tan(angle), 12);
    expect(gravity?.x).toBeLessThan(0);
    expect(gravity?.y).toBeLessThan(0);
    expect(layOut(read('channel.tilt=-20 deg')).setup.gravity?.y).toBeGreaterThan(0);
    expect(layOut(read('channel.tilt=0 deg')).setup.gravity?.y).toBe(0);
  });

  it('puts 0.02 cells a step at the speed the grid names, and half the step for twice the speed', () => {
    const { derived } = layOut(read());
    expect(0.3 / derived.unit.velocity_m_s).toBeCloseTo(0.02, 12);
    expect(layOut(read('grid.speed=0.6 m/s')).derived.dt_s).toBeCloseTo(derived.dt_s / 2, 15);
  });

  it('rounds the height to whole cells', () => {
    const { derived } = layOut(read('channel.height=100.09 mm'));
    expect(derived.nx).toBe(500);
    expect(derived.nx * derived.dx_m).toBeCloseTo(0.1, 12);
    expect(derived.ny).toBe(40);
  });

  it('drives the loop by the loss coefficient over the height, or by the given upflow', () => {
    // -K rho U|U|/(2 height): per lattice volume K/(2 nx)
    expect(layOut(read()).setup.drive).toEqual({ kind: 'loss', coefficient: 2 / 1000 });
    const { setup, derived } = layOut(read('channel.return={upflow: 0.15 m/s}'));
    if (setup.drive?.kind !== 'upflow') throw new Error('no pump');
    expect(setup.drive.target * derived.unit.velocity_m_s).toBeCloseTo(0.15, 12);
  });

  it('records whole samples: settling and span are counted in them', () => {
    const { derived } = layOut(read('record={settle: 1 s, span: 2 s, every: 2 ms}'));
    expect(derived.sampleEvery * derived.dt_s).toBeCloseTo(2e-3, 12);
    expect(derived.steps).toBe(1500 * derived.sampleEvery);
  });

  it('skims within the band at the top only, at most two per cent of the gas a step, with no edge', () => {
    const { setup, derived } = layOut(read());
    const skim = setup.skim ?? new Float64Array(0);
    expect(Math.max(...skim)).toBeLessThanOrEqual(0.02);
    expect(Math.max(...skim)).toBeGreaterThan(0.002);
    const first = skim.findIndex((share) => share > 0);
    expect(first * derived.dx_m).toBeCloseTo(derived.skim.from_m, 6);
    for (let x = 1; x < skim.length; x++) expect(Math.abs((skim[x] ?? 0) - (skim[x - 1] ?? 0))).toBeLessThan(0.002);
    // a bubble passing at 0.5 m/s keeps exp(-6) of its gas
    const passes = 0.5 / derived.unit.velocity_m_s;
    expect(skim.reduce((sum, share) => sum + share, 0) / passes).toBeCloseTo(6, 2);
  });

  it('supplies gas for the membranes it serves', () => {
    // 0.4 m3/(m2 h), one membrane, 1 m served, 8 mm: 14 mm/s
    expect(layOut(read()).derived.gasVelocity_m_s).toBeCloseTo(0.4 / 3600 / 0.008, 12);
    expect(layOut(read('channel.membranes=[left, right]')).derived.gasVelocity_m_s).toBeCloseTo((2 * 0.4) / 3600 / 0.008, 12);
  });

  it('starts the bubbles of the case with their profile and the Laplace pressure sigma/R', () => {
    const { setup, derived } = layOut(read('gas.start=[{across: 4 mm, along: 50 mm, diameter: 5 mm}]'));
    const { initial, surfaceTension = 0 } = setup;
    const radius = 2.5e-3 / derived.dx_m;
    expect(initial?.phi?.(249.5, 19.5)).toBeLessThan(1e-3);
    expect(initial?.phi?.(249.5 + radius, 19.5)).toBeCloseTo(0.5, 12);
    expect(initial?.phi?.(100, 20)).toBeCloseTo(1, 12);
    expect(initial?.pressure?.(249.5, 19.5)).toBeCloseTo(surfaceTension / radius, 6);
    expect((surfaceTension / radius) * derived.unit.stress_Pa).toBeCloseTo(0.072736 / 2.5e-3, 2);
  });
});
