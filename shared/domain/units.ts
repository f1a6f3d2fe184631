import { DomainError } from '../errors.ts';
import { LENGTH, LIQUID, MASS, VOLUME } from './units/amounts.ts';
import type { Unit } from './units/linear.ts';
import { ALKALINITY, MAJOR_ION, NITRATE, PH, PHOSPHATE, SALINITY, TEMPERATURE } from './units/water.ts';

export { MEQ_PER_DKH } from './units/water.ts';
export { PARAMETERS, PARAMETER_CODES, type Parameter, type ParameterCode } from './units/parameters.ts';
export type { Unit } from './units/linear.ts';

/** Every quantity with its units; the first unit of each is the canonical one that is stored. */
export const UNITS = {
  alkalinity: ALKALINITY,
  calcium: MAJOR_ION,
  magnesium: MAJOR_ION,
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

/** A value in the unit that a person chose, as it is stored. */
export function toCanonical(quantity: Quantity, value: number, unit: string): number {
  return unitOf(quantity, unit).toCanonical(value);
}

/** A stored value in the unit that a person chose. */
export function fromCanonical(quantity: Quantity, value: number, unit: string): number {
  return unitOf(quantity, unit).fromCanonical(value);
}
