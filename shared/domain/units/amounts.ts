import { multiple, type Unit } from './linear.ts';

/** US liquid gallon: 231 cubic inches, exactly. */
const LITRES_PER_GALLON = 3.785411784;

export const VOLUME = {
  L: multiple('L', 1, 1),
  gal: multiple('US gal', LITRES_PER_GALLON, 1),
} as const satisfies Record<string, Unit>;

/** Small liquids such as vinegar, kept in millilitres. */
export const LIQUID = {
  mL: multiple('mL', 1, 0),
  'fl oz': multiple('US fl oz', (LITRES_PER_GALLON * 1000) / 128, 1),
} as const satisfies Record<string, Unit>;

export const MASS = {
  g: multiple('g', 1, 1),
  kg: multiple('kg', 1000, 3),
  oz: multiple('oz', 28.349523125, 2),
} as const satisfies Record<string, Unit>;

export const LENGTH = {
  mm: multiple('mm', 1, 0),
  in: multiple('in', 25.4, 2),
} as const satisfies Record<string, Unit>;
