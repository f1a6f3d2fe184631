import { DomainError } from '../errors.ts';
import { LENGTH, LIQUID, MASS, VOLUME } from './units/amounts.ts';
import type { Unit, WaterContext } from './units/linear.ts';
import { CALCIUM, MAGNESIUM, NITRATE, PHOSPHATE, POTASSIUM, STRONTIUM } from './units/solutes.ts';
import { ALKALINITY, PH, SALINITY, TEMPERATURE } from './units/water.ts';

export { MEQ_PER_DKH } from './units/water.ts';
export { PARAMETERS, PARAMETER_CODES, type Parameter, type ParameterCode } from './units/parameters.ts';
export type { Unit, WaterContext } from './units/linear.ts';

/** Every quantity with its units; the first unit of each is the canonical one that is stored. */
export const UNITS = {
  alkalinity: ALKALINITY,
  calcium: CALCIUM,
  magnesium: MAGNESIUM,
  potassium: POTASSIUM,
  strontium: STRONTIUM,
  nitrate: NITRATE,
  phosphate: PHOSPHATE,
  salinity: SALINITY,
  temperature: TEMPERATURE,
  ph: PH,
  volume: VOLUME,
  liquid: LIQUID,
  mass: MASS,
  length: LENGTH,
} as const satisfies Record<string, Record<string, Unit>>;

export type Quantity = keyof typeof UNITS;

/** The names of a quantity's units, canonical first. */
export function unitsOf(quantity: Quantity): string[] {
  return Object.keys(UNITS[quantity]);
}

/** The names of the units that testers on a farm read in, canonical first. */
export function everydayUnitsOf(quantity: Quantity): string[] {
  return unitsOf(quantity).filter((unit) => unitOf(quantity, unit).rare !== true);
}

/** A unit by name. @throws {DomainError} `input.invalid` when the quantity has no such unit */
export function unitOf(quantity: Quantity, unit: string): Unit {
  const units: Record<string, Unit> = UNITS[quantity];
  const found = Object.hasOwn(units, unit) ? units[unit] : undefined;
  if (!found) {
    throw new DomainError('input.invalid', `Choose one of these units: ${unitsOf(quantity).join(', ')}.`, {
      details: { quantity, unit },
    });
  }
  return found;
}

/**
 * A value in the unit that a person chose, as it is stored.
 *
 * @param water the water it was measured in, for units that depend on it; salinity 35 and 25 °C when left out
 * @throws {DomainError} `input.invalid` for a unit it does not have, `domain.out_of_range` for no value of seawater
 */
export function toCanonical(quantity: Quantity, value: number, unit: string, water?: WaterContext): number {
  return unitOf(quantity, unit).toCanonical(value, water);
}

/** A stored value in the unit that a person chose; the inverse of {@link toCanonical}. */
export function fromCanonical(quantity: Quantity, value: number, unit: string, water?: WaterContext): number {
  return unitOf(quantity, unit).fromCanonical(value, water);
}
