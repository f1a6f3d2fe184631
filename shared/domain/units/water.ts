import { salinityFromSpecificGravity, specificGravity } from '../seawater.ts';
import { multiple, type Unit } from './linear.ts';

/** 1 dKH is 10 mg of calcium oxide (56.077 g/mol, two equivalents) in a litre. The one factor in the product. */
export const MEQ_PER_DKH = 20 / 56.077;

/** Grams of calcium carbonate in one equivalent, so mg/L as CaCO₃ for each meq/L (CIAAW weights, 100.086 / 2). */
const CACO3_MG_PER_MEQ = 50.043;

export const ALKALINITY = {
  'meq/L': multiple('meq/L', 1, 2),
  dKH: multiple('dKH', MEQ_PER_DKH, 1),
  ppm: multiple('ppm CaCO₃', 1 / CACO3_MG_PER_MEQ, 0),
} as const satisfies Record<string, Unit>;

export const SALINITY = {
  ppt: multiple('ppt', 1, 1),
  sg: { label: 'SG 25/25 °C', decimals: 4, toCanonical: salinityFromSpecificGravity, fromCanonical: specificGravity },
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

/** Calcium and magnesium; a figure in ppm is taken as mg/L, as test kits mean it. */
export const MAJOR_ION = { 'mg/L': multiple('mg/L', 1, 0) } as const satisfies Record<string, Unit>;

export const NITRATE = { 'mg/L': multiple('mg/L', 1, 1) } as const satisfies Record<string, Unit>;

export const PHOSPHATE = { 'mg/L': multiple('mg/L', 1, 3) } as const satisfies Record<string, Unit>;
