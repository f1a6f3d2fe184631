import type { SupplyInterval } from '../reservoir-use.ts';

/** One test of a level: alkalinity in meq/L, calcium or magnesium in mg/L. */
export interface LevelReading {
  /** Epoch ms. */
  at: number;
  value: number;
  /** Standard deviation of the test, in the unit of the level, above zero. */
  sd: number;
}

/** Part of the water replaced at an instant by water of another level. */
export interface WaterChange {
  at: number;
  /** 0 to 1. */
  fraction: number;
  /** Level of the new water. */
  value: number;
}

/** All that moves a level. Everything is in one unit: meq/L of alkalinity, or mg/L of calcium or magnesium. */
export interface DemandInputs {
  readings: readonly LevelReading[];
  /** All that was added, per litre of the system over stretches of time (a single dose has from = to). */
  supply: readonly SupplyInterval[];
  waterChanges: readonly WaterChange[];
  /**
   * Relative coral mass over time, where it is known: demand is then k × mass, and k is what drifts. Left out it is 1 at
   * all times.
   */
  massAt?: (at: number) => number;
}

/** How uncertain what is not measured is. Rates are of the level's unit; the defaults suit alkalinity in meq/L. */
export interface DemandNoise {
  /** Demand wanders by so much in a day (standard deviation): √q_D, unit a day per √day. */
  drift: number;
  /** Part by which a day's real supply differs from the logged one (standard deviation). */
  supplyError: number;
  /** What else moves the level in a day (standard deviation): √q_A. */
  levelNoise: number;
}
