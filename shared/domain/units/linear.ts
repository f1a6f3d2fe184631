/** The water that a conversion depends on, where it does. */
export interface WaterContext {
  /** Practical salinity. */
  salinity: number;
  temperatureC: number;
}

/** Taken where no water is given; a unit that depends on it says so in its note. */
export const STANDARD_WATER: WaterContext = { salinity: 35, temperatureC: 25 };

/** How one unit of a quantity relates to the canonical unit that is stored. */
export interface Unit {
  /** @param water the water that the value belongs to; {@link STANDARD_WATER} when left out */
  toCanonical: (value: number, water?: WaterContext) => number;
  fromCanonical: (value: number, water?: WaterContext) => number;
  label: string;
  /** Decimals that a reading in this unit is usually shown with. */
  decimals: number;
  /** What the conversion takes for granted, to stand behind the label where people choose a unit. */
  note?: string;
  /** Laboratories and papers use it, the testers on a farm hardly ever: nothing to guess that somebody meant. */
  rare?: boolean;
}

/** A unit that is a multiple of the canonical one. */
export function multiple(label: string, canonicalPerUnit: number, decimals: number): Unit {
  return {
    label,
    decimals,
    toCanonical: (value) => value * canonicalPerUnit,
    fromCanonical: (value) => value / canonicalPerUnit,
  };
}

/** The same unit, marked as one that farms hardly use. */
export function rare(unit: Unit): Unit {
  return { ...unit, rare: true };
}
