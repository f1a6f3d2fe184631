import { conductivityOf, salinityFromConductivity } from '../conductivity.ts';
import { salinityFromSpecificGravity, type SgScale, specificGravity } from '../seawater.ts';
import { multiple, rare, STANDARD_WATER, type Unit } from './linear.ts';
import { perKilogram } from './solutes.ts';

/** 1 dKH is 10 mg of calcium oxide (56.077 g/mol, two equivalents) in a litre. The one factor in the product. */
export const MEQ_PER_DKH = 20 / 56.077;

/** Grams of calcium carbonate in one equivalent, so mg/L as CaCO₃ for each meq/L (CIAAW weights, 100.086 / 2). */
const CACO3_MG_PER_MEQ = 50.043;

export const ALKALINITY = {
  'meq/L': multiple('meq/L', 1, 2),
  dKH: multiple('dKH', MEQ_PER_DKH, 1),
  ppm: multiple('ppm CaCO₃', 1 / CACO3_MG_PER_MEQ, 0),
  'umol/kg': perKilogram(1 / 1000, 0),
} as const satisfies Record<string, Unit>;

function specificGravityOn(scale: SgScale, label: string): Unit {
  return {
    label,
    decimals: 4,
    toCanonical: (value) => salinityFromSpecificGravity(value, scale),
    fromCanonical: (value) => specificGravity(value, scale),
  };
}

/** Practical salinity; grams in a kilogram ("ppt") is the same within 0.5 %, and the word people use. */
export const SALINITY = {
  ppt: multiple('ppt', 1, 1),
  sg: specificGravityOn('25/25', 'SG 25/25 °C'),
  'sg 60F': rare(specificGravityOn('60F/60F', 'SG 60/60 °F')),
  'sg 20/4': rare(specificGravityOn('20/4', 'SG 20/4 °C')),
  'mS/cm': {
    label: 'mS/cm',
    decimals: 1,
    note: `at ${STANDARD_WATER.temperatureC} °C`,
    toCanonical: (value, { temperatureC } = STANDARD_WATER) => salinityFromConductivity(value, temperatureC),
    fromCanonical: (value, { temperatureC } = STANDARD_WATER) => conductivityOf(value, temperatureC),
  },
} as const satisfies Record<string, Unit>;

export const TEMPERATURE = {
  C: multiple('°C', 1, 1),
  F: {
    label: '°F',
    decimals: 1,
    toCanonical: (fahrenheit: number) => (fahrenheit - 32) / 1.8,
    fromCanonical: (celsius: number) => celsius * 1.8 + 32,
  },
} as const satisfies Record<string, Unit>;

export const PH = { pH: multiple('pH', 1, 2) } as const satisfies Record<string, Unit>;
