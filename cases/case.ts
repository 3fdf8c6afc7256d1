/** A liquid that thins under shear: eta = K rate^(n - 1) + yield stress / rate, not less than `least_Pa_s`. */
export interface Rheology {
  consistency_Pa_sn: number;
  index: number;
  yieldStress_Pa: number;
  least_Pa_s: number;
}

/** A case in SI: what the text of a case file says, checked and with every default filled in. Angles in radians. */
export interface Case {
  title: string;
  channel: {
    gap_m: number;
    height_m: number;
    /** from the vertical; positive: the right wall faces down and gas rides along it */
    tilt_rad: number;
    /** walls that carry a membrane */
    membranes: WallSide[];
    return: { loss: number } | { upflow_m_s: number };
  };
  /** closed outlines of all fins, [across, along] in m, groups resolved to single fins */
  fins: Outline[];
  liquid: {
    kind: 'water' | 'sludge' | 'thinning' | 'custom';
    temperature_K?: number;
    density_kg_m3: number;
    /** apparent viscosity at 100 1/s where there is a rheology */
    viscosity_Pa_s: number;
    rheology?: Rheology;
  };
  /** of the liquid against the gas */
  surfaceTension_N_m: number;
  /** at membranes and fins, measured in the liquid */
  contactAngle_rad: number;
  gas: {
    /** per membrane area: m3/(m2 s); while the air is on */
    supply_m_s: number;
    /** air on and off in turn, from the start; always on without it */
    pulse?: { on_s: number; off_s: number };
    /** membrane height this air serves */
    serves_m: number;
    /** mean diameter of all bubbles let in, and the kinds there are */
    bubble: { diameter_m: number; kinds: BubbleKind[] };
    /** centres of release across the gap, drawn from evenly; anywhere across it; or as near to a wall as may be */
    across: { at_m: number[] } | 'even' | WallSide;
    /** bubbles that are there at the start, [across, along] */
    start: { across_m: number; along_m: number; diameter_m: number }[];
    seed: number;
    /** as computed: softened where the case says so */
    density_kg_m3: number;
    viscosity_Pa_s: number;
    /** of real air at the temperature; buoyancy always uses it */
    airDensity_kg_m3: number;
    softened: boolean;
  };
  grid: {
    /** cells across the gap */
    across: number;
    /** speed that shall stand at the lattice velocity of the time-step rule */
    speed_m_s: number;
  };
  record: {
    settle_s: number;
    /** with `until` the least time recorded */
    span_s: number;
    every_s: number;
    /** goes on until these answers are sure: half of the 95 % interval is `within` of the value, relative */
    until?: { sure: { name: string; within: number }[]; atMost_s: number };
  };
  swept: { above_Pa: number; within_s: number };
  air: {
    /** of the nozzles below the surface; losses as height of liquid */
    depth_m: number;
    losses_m: number;
    /** of blower, drive and motor together, 0 to 1 */
    efficiency: number;
    /** of the air that the blower takes in */
    inlet_K: number;
    /** permeate per membrane area: m3/(m2 s) */
    flux_m_s?: number;
  };
  /** for back-transport: membrane along the flow, and particles at the wall over those in the bulk, by volume */
  particles: { length_m: number; wallToBulk: number };
  /** asked for where it is there; `clears_s`: time constant; `start`: covered share when the recording starts */
  deposit?: { flux_m_s: number; solids_kg_m3: number; layer_kg_m2: number; above_Pa: number; clears_s: number; start: number };
}

/** Bubbles with normally distributed diameters. */
export interface BubbleKind {
  /** mean */
  diameter_m: number;
  /** standard deviation over the mean */
  spread: number;
  /** of the number of bubbles let in; all kinds together 1 */
  share: number;
}

export type WallSide = 'left' | 'right';

/** A closed polygon, [across, along] pairs in m. */
export type Outline = [number, number][];
