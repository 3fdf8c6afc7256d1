/**
 * When and where gas is let in. While the air is on, gas is due at the constant rate q = superficial velocity * gap (area of the plane
 * section per time).
 * Bubble n is let in while the gas due passes through its own share: at a time drawn evenly between the moments at which the
 * gas let in so far, and that plus its own area, are due. So intervals scatter, and the long-run rate is exact, because the books
 * are kept in gas really let in. A release whose place is not free of gas waits, if need be until the air comes back; the books then
 * make the next ones come sooner.
 */
import type { Simulation } from '../solver/index.ts';
import { largestBubble_m } from './bands.ts';
import type { BubbleKind, Case } from './case.ts';
import { CLEAR_CELLS } from './gas.ts';
import { WIDEST_DRAW } from './mixture.ts';
import { nextAir_s, onShare, timeWithAir_s } from './pulse.ts';
import { type Generator, next, nextNormal, seeded } from './random.ts';
import type { Derived } from './scale.ts';

/** Plain data, so that a checkpoint can hold it. */
export interface SupplyState {
  generator: Generator;
  /** gas let in since the start */
  released_m2: number;
  /** the bubble that comes next */
  diameter_m: number;
  across_m: number;
  /** step of its next try; Infinity without supply is written as null by JSON, hence -1 */
  step: number;
  /** tries that found the place taken by gas */
  waits: number;
}

/** Time after which a release that had to wait is tried again. */
const RETRY_s = 1e-3;

export class Supply {
  readonly state: SupplyState;
  readonly #panel: Case;
  readonly #derived: Derived;
  /** gas area due per time with air */
  readonly #rate_m2_s: number;

  constructor(panel: Case, derived: Derived, state?: SupplyState) {
    this.#panel = panel;
    this.#derived = derived;
    this.#rate_m2_s = (derived.gasVelocity_m_s * panel.channel.gap_m) / onShare(panel.gas);
    this.state = state ?? { generator: seeded(panel.gas.seed), released_m2: 0, diameter_m: 0, across_m: 0, step: -1, waits: 0 };
    if (state === undefined && this.#rate_m2_s > 0) this.#draw();
  }

  /** The step before which gas is to be let in next; -1 without supply. */
  get step(): number {
    return this.state.step;
  }

  /** Lets the next bubble in, or puts it off where its place is not free. */
  release(simulation: Simulation): void {
    const { dx_m, dt_s, release, unit } = this.#derived;
    const circle = {
      x: (release.from_m + release.to_m) / 2 / dx_m - 0.5,
      y: this.state.across_m / dx_m - 0.5,
      radius: this.state.diameter_m / 2 / dx_m,
    };
    if (!free(simulation, circle)) {
      this.state.waits++;
      const again = simulation.step + Math.max(1, Math.round(RETRY_s / dt_s));
      this.state.step = Math.ceil(nextAir_s(this.#panel.gas, again * dt_s) / dt_s - 1e-9);
      return;
    }
    this.state.released_m2 += simulation.placeGas(circle) * unit.area_m2;
    this.#draw();
    this.state.step = Math.max(this.state.step, simulation.step + 1);
  }

  #draw(): void {
    const { gas, channel } = this.#panel;
    const { generator } = this.state;
    const diameter_m = drawDiameter_m(this.#panel, generator);
    const clear_m = diameter_m / 2 + CLEAR_CELLS * this.#derived.dx_m;
    const wanted_m = place_m(gas.across, clear_m, channel.gap_m, next(generator));
    this.state.diameter_m = diameter_m;
    this.state.across_m = Math.min(Math.max(wanted_m, clear_m), channel.gap_m - clear_m);
    const due_m2 = this.state.released_m2 + next(generator) * Math.PI * (diameter_m / 2) ** 2;
    this.state.step = Math.ceil(timeWithAir_s(gas, due_m2 / this.#rate_m2_s) / this.#derived.dt_s);
  }
}

/** Of a kind drawn by its share: normally distributed, drawn anew outside two deviations and where the bubble would not fit. */
function drawDiameter_m(panel: Case, generator: Generator): number {
  const { diameter_m, spread } = drawKind(panel.gas.bubble.kinds, generator);
  const most_m = largestBubble_m(panel) * (1 + 1e-12);
  for (;;) {
    const deviation = nextNormal(generator);
    const drawn_m = diameter_m * (1 + spread * deviation);
    if (Math.abs(deviation) <= WIDEST_DRAW && drawn_m <= most_m) return drawn_m;
  }
}

/** One kind needs no draw. */
function drawKind(kinds: readonly BubbleKind[], generator: Generator): BubbleKind {
  const last = kinds.at(-1) as BubbleKind;
  if (kinds.length === 1) return last;
  const drawn = next(generator);
  let upTo = 0;
  for (const kind of kinds) {
    upTo += kind.share;
    if (drawn < upTo) return kind;
  }
  return last;
}

/** Where the centre is wanted; `drawn` lies in [0, 1). What is nearer to a wall than `clear_m` is moved there. */
function place_m(across: Case['gas']['across'], clear_m: number, gap_m: number, drawn: number): number {
  if (across === 'left') return clear_m;
  if (across === 'right') return gap_m - clear_m;
  if (across === 'even') return clear_m + drawn * (gap_m - 2 * clear_m);
  return across.at_m[Math.floor(drawn * across.at_m.length)] as number;
}

/** Whether the circle and a margin around it hold liquid only. */
function free({ phi, setup }: Simulation, circle: { x: number; y: number; radius: number }): boolean {
  const reach = circle.radius + CLEAR_CELLS;
  for (let y = Math.max(0, Math.ceil(circle.y - reach)); y <= Math.min(setup.ny - 1, circle.y + reach); y++) {
    for (let x = Math.ceil(circle.x - reach); x <= circle.x + reach; x++) {
      if (Math.hypot(x - circle.x, y - circle.y) <= reach && phi.get((x + setup.nx) % setup.nx, y) < 0.5) return false;
    }
  }
  return true;
}
