/**
 * Channel of half width h under a pressure gradient P cos(w t): wall shear Re{P h tanh(lam h)/(lam h) e^(iwt)}, lam = sqrt(i w/nu),
 * for Womersley numbers Wo = h sqrt(w/nu) of 1, 2, 4 [V].
 *
 * The flow is linear, so one run answers for every frequency: a steady force set on at rest gives the wall shear s(t) of a step,
 * and the shear under P cos(w t) has the complex amplitude P int_0^inf s'(t) e^(-iwt) dt (Duhamel).
 */
import { createSimulation } from '../../../solver/index.ts';
import { CHANNEL } from '../channel.ts';
import { type Check, row } from '../row.ts';

const NU = 0.1;
export const ANSWERS = [
  { Wo: 1, amplitude: 0.930795, phase_deg: -17.958 },
  { Wo: 2, amplitude: 0.55956, phase_deg: -42.907 },
  { Wo: 4, amplitude: 0.248589, phase_deg: -45.235 },
];

/** Wall shear of the step over its final value G h, after 1, 2, ... steps; 2h = N cells. */
export async function stepResponse(N: number): Promise<number[]> {
  const h = N / 2;
  const force = { x: (0.02 * 2 * NU) / (h * h), y: 0 };
  const s = await createSimulation({ nx: 4, ny: N, sides: CHANNEL, liquid: { density: 1, viscosity: NU }, force, precision: 'f64' });
  // the slowest part decays with exp(-(pi/2)^2 nu t/h^2): 14 of its times
  const steps = Math.ceil((14 * h * h) / (NU * (Math.PI / 2) ** 2));
  s.advance(steps, 1);
  const { shear } = s.takeSamples();
  return Array.from({ length: steps }, (_, n) => shear.left.get(n, 1) / (force.x * h));
}

/** Complex amplitude of the wall shear under a unit oscillation: its size and its phase in degrees. */
export function oscillation(response: number[], N: number, Wo: number): { amplitude: number; phase_deg: number } {
  const w = (Wo * Wo * NU) / (N / 2) ** 2;
  let [re, im] = [0, 0];
  response.forEach((shear, n) => {
    const rise = shear - (n === 0 ? 0 : response[n - 1]);
    re += rise * Math.cos(w * (n + 0.5));
    im -= rise * Math.sin(w * (n + 0.5));
  });
  return { amplitude: Math.hypot(re, im), phase_deg: (Math.atan2(im, re) * 180) / Math.PI };
}

export const check: Check = {
  name: 'oscillating',
  async run() {
    const flows: { cells: number; response: number[] }[] = [];
    for (const cells of [16, 32, 64]) flows.push({ cells, response: await stepResponse(cells) });
    return ANSWERS.flatMap(({ Wo, amplitude, phase_deg }) => {
      const part = { check: this.name, source: 'exact solution, tanh(lam h)/(lam h) [V]' };
      const seen = flows.map(({ cells, response }) => ({ cells, ...oscillation(response, cells, Wo) }));
      const [sizes, phases] = [seen.map((s) => ({ ...s, value: s.amplitude })), seen.map((s) => ({ ...s, value: s.phase_deg }))];
      return [
        row({ ...part, quantity: `Wo ${Wo}: shear amplitude / (P h)`, reference: amplitude, ours: sizes, gate: 1 }),
        row({ ...part, quantity: `Wo ${Wo}: phase, deg`, reference: phase_deg, ours: phases, scale: { absolute: 'deg' }, gate: 1 }),
      ];
    });
  },
};
