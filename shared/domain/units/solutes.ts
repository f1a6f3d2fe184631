import { ATOMIC_G_PER_MOL as ATOMIC } from '../atomic-weights.ts';
import { seawaterDensity } from '../seawater.ts';
import { multiple, rare, STANDARD_WATER, type Unit } from './linear.ts';

const NITRATE_G_PER_MOL = ATOMIC.N + 3 * ATOMIC.O;
const PHOSPHATE_G_PER_MOL = ATOMIC.P + 4 * ATOMIC.O;

/**
 * Micromoles in a kilogram of seawater, as oceanography counts. A litre's mass depends on its salt and warmth, by 0.3 %
 * over all reef waters.
 *
 * @param canonicalPerUmol canonical units (per litre) in one micromole (or microequivalent)
 */
export function perKilogram(canonicalPerUmol: number, decimals: number): Unit {
  const canonicalPerUnit = ({ salinity, temperatureC }: typeof STANDARD_WATER) =>
    (canonicalPerUmol * seawaterDensity(salinity, temperatureC)) / 1000;
  return {
    label: 'µmol/kg',
    decimals,
    rare: true,
    note: `at salinity ${STANDARD_WATER.salinity} and ${STANDARD_WATER.temperatureC} °C`,
    toCanonical: (value, water = STANDARD_WATER) => value * canonicalPerUnit(water),
    fromCanonical: (value, water = STANDARD_WATER) => value / canonicalPerUnit(water),
  };
}

/** Calcium, magnesium and the like, where a figure in ppm is taken as mg/L, as test kits mean it. */
function ion(gPerMol: number, decimals: { mgL: number; mmolL: number; umolKg: number }) {
  return {
    'mg/L': multiple('mg/L', 1, decimals.mgL),
    'mmol/L': rare(multiple('mmol/L', gPerMol, decimals.mmolL)),
    'umol/kg': perKilogram(gPerMol / 1000, decimals.umolKg),
  } as const satisfies Record<string, Unit>;
}

export const CALCIUM = ion(ATOMIC.Ca, { mgL: 0, mmolL: 2, umolKg: 0 });
export const MAGNESIUM = ion(ATOMIC.Mg, { mgL: 0, mmolL: 1, umolKg: 0 });
export const POTASSIUM = ion(ATOMIC.K, { mgL: 0, mmolL: 2, umolKg: 0 });
export const STRONTIUM = ion(ATOMIC.Sr, { mgL: 1, mmolL: 4, umolKg: 1 });

/** Kept as the ion NO₃; some testers count its nitrogen only. */
export const NITRATE = {
  ...ion(NITRATE_G_PER_MOL, { mgL: 1, mmolL: 4, umolKg: 1 }),
  'mg/L N': multiple('mg/L N', NITRATE_G_PER_MOL / ATOMIC.N, 2),
} as const satisfies Record<string, Unit>;

/** Kept as the ion PO₄; some testers count its phosphorus only. */
export const PHOSPHATE = {
  ...ion(PHOSPHATE_G_PER_MOL, { mgL: 3, mmolL: 5, umolKg: 2 }),
  'ug/L P': multiple('µg/L P', PHOSPHATE_G_PER_MOL / ATOMIC.P / 1000, 0),
} as const satisfies Record<string, Unit>;
