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
  liquid: { kind: 'water' | 'custom'; temperature_K?: number; density_kg_m3: number; viscosity_Pa_s: number };
  /** of the liquid against the gas */
  surfaceTension_N_m: number;
  /** at membranes and fins, measured in the liquid */
  contactAngle_rad: number;
  gas: {
    /** per membrane area: m3/(m2 s) */
    supply_m_s: number;
    /** membrane height this air serves */
    serves_m: number;
    bubble: { diameter_m: number /** relative standard deviation */; spread: number };
    /** centre of release across the gap, or drawn evenly */
    across: { at_m: number } | 'even';
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
  record: { settle_s: number; span_s: number; every_s: number };
  swept: { above_Pa: number; within_s: number };
}

export type WallSide = 'left' | 'right';

/** A closed polygon, [across, along] pairs in m. */
export type Outline = [number, number][];
