import { DomainError } from '../../errors.ts';
import { assertInput } from '../ranges.ts';
import type { BoronRatio } from './composition.ts';
import type { PhScale } from './ph-scales.ts';

/** Two of alkalinity, DIC, pH and pCO₂, and the water they were measured in. */
export interface CarbonateInput {
  /** Practical salinity (PSS-78), 19–43. */
  salinity: number;
  /** °C, 2–35. */
  temperatureC: number;
  /** Total alkalinity, µmol/kg. */
  alkalinityUmolKg?: number | undefined;
  /** Dissolved inorganic carbon, µmol/kg. */
  dicUmolKg?: number | undefined;
  ph?: number | undefined;
  /** Scale of `ph`; total when left out. */
  phScale?: PhScale | undefined;
  /** Partial pressure of carbon dioxide, µatm. */
  pco2Uatm?: number | undefined;
  /** Measured calcium, mg/L; by salinity when left out. */
  calciumMgL?: number | undefined;
  /** Phosphate as µmol/kg of phosphorus; none when left out. */
  phosphateUmolKg?: number | undefined;
  /** Boron by salinity; Uppström 1974 when left out. */
  boron?: BoronRatio | undefined;
}

/** In a flat list, since this runs a hundred thousand times a second. */
const LIMITS: readonly (readonly [input: NumericInput, name: string, min: number, max: number])[] = [
  ['salinity', 'Salinity', 19, 43],
  ['temperatureC', 'Temperature (°C)', 2, 35],
  ['alkalinityUmolKg', 'Alkalinity (µmol/kg)', 1, 100_000],
  ['dicUmolKg', 'DIC (µmol/kg)', 1, 100_000],
  ['ph', 'pH', 3, 12],
  ['pco2Uatm', 'pCO₂ (µatm)', 0.001, 1_000_000],
  ['calciumMgL', 'Calcium (mg/L)', 0, 10_000],
  ['phosphateUmolKg', 'Phosphate (µmol/kg)', 0, 10_000],
];
type NumericInput = Exclude<keyof CarbonateInput, 'phScale' | 'boron'>;

const PAIR = ['alkalinityUmolKg', 'dicUmolKg', 'ph', 'pco2Uatm'] as const;

/** Refuses what no seawater can be, naming the input. @throws {DomainError} `domain.out_of_range`, `input.invalid` */
export function assertCarbonateInput(input: CarbonateInput): void {
  for (const [path, name, min, max] of LIMITS) {
    const value = input[path];
    if (value !== undefined) assertInput(path, name, value, min, max);
  }
  const given = PAIR.filter((name) => input[name] !== undefined);
  if (given.length !== 2) {
    throw new DomainError('input.invalid', 'Give two of alkalinity, DIC, pH and pCO₂.', { details: { given } });
  }
}
