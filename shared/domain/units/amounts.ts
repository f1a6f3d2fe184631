import { multiple, type Unit } from './linear.ts';

/** US liquid gallon: 231 cubic inches, exactly. */
const LITRES_PER_GALLON = 3.785411784;
/** Imperial gallon: exact since the Units of Measurement Regulations 1995. */
const LITRES_PER_IMPERIAL_GALLON = 4.54609;

export const VOLUME = {
  L: multiple('L', 1, 1),
  gal: multiple('US gal', LITRES_PER_GALLON, 1),
  'imp gal': multiple('imp. gal', LITRES_PER_IMPERIAL_GALLON, 1),
} as const satisfies Record<string, Unit>;

/** Small liquids such as vinegar, kept in millilitres. */
export const LIQUID = {
  mL: multiple('mL', 1, 0),
  'fl oz': multiple('US fl oz', (LITRES_PER_GALLON * 1000) / 128, 1),
  tsp: multiple('US tsp', (LITRES_PER_GALLON * 1000) / 768, 1),
} as const satisfies Record<string, Unit>;

export const MASS = {
  g: multiple('g', 1, 1),
  kg: multiple('kg', 1000, 3),
  oz: multiple('oz', 28.349523125, 2),
  lb: multiple('lb', 453.59237, 3),
} as const satisfies Record<string, Unit>;

export const LENGTH = {
  mm: multiple('mm', 1, 0),
  cm: multiple('cm', 10, 1),
  in: multiple('in', 25.4, 2),
} as const satisfies Record<string, Unit>;
