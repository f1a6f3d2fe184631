import type { CarbonateConstants } from './constants.ts';

/** An alkalinity and how fast it grows with pH, both mol/kg. */
export interface Sloped {
  value: number;
  perPh: number;
}

/** Carbonate alkalinity of a given amount of dissolved inorganic carbon at a hydrogen ion (total scale). */
export function carbonOfDic({ k1, k2 }: CarbonateConstants, dic: number, h: number): Sloped {
  const whole = h * h + k1 * h + k1 * k2;
  return {
    value: (dic * k1 * (h + 2 * k2)) / whole,
    perPh: (Math.LN10 * h * dic * k1 * (h * h + 4 * k2 * h + k1 * k2)) / (whole * whole),
  };
}

/** Carbonate alkalinity in balance with a given dissolved carbon dioxide. */
export function carbonOfCo2({ k1, k2 }: CarbonateConstants, co2: number, h: number): Sloped {
  const bicarbonate = (co2 * k1) / h;
  const carbonate = (bicarbonate * k2) / h;
  return { value: bicarbonate + 2 * carbonate, perPh: Math.LN10 * (bicarbonate + 4 * carbonate) };
}

/**
 * All alkalinity that is not carbon's: borate, hydroxide, phosphate, less the free and bound hydrogen ion.
 *
 * @see Dickson 1981, Deep-Sea Res. 28:609 (definition of total alkalinity)
 */
export function restOfAlkalinity(constants: CarbonateConstants, phosphate: number, h: number): Sloped {
  const { total, boric, water, bisulphateFree, fluorideFree, freePerTotal } = constants;
  const free = h * freePerTotal;
  const borate = (total.boron * boric) / (boric + h);
  const hydroxide = water / h;
  const bisulphate = (total.sulphate * free) / (free + bisulphateFree);
  const fluoride = (total.fluoride * free) / (free + fluorideFree);
  const perLnH =
    (borate * h) / (boric + h) +
    hydroxide +
    free +
    (bisulphate * bisulphateFree) / (free + bisulphateFree) +
    (fluoride * fluorideFree) / (free + fluorideFree);
  const rest = { value: borate + hydroxide - free - bisulphate - fluoride, perPh: Math.LN10 * perLnH };
  if (phosphate === 0) return rest;
  const { value, perPh } = phosphateAlkalinity(constants, phosphate, h);
  return { value: rest.value + value, perPh: rest.perPh + perPh };
}

/** Phosphoric acid counts by its mean charge less one; the charge's variance is its slope. */
function phosphateAlkalinity({ phosphoric }: CarbonateConstants, phosphate: number, h: number): Sloped {
  const { p1, p2, p3 } = phosphoric;
  const one = p1 / h;
  const two = (one * p2) / h;
  const three = (two * p3) / h;
  const whole = 1 + one + two + three;
  const charge = (one + 2 * two + 3 * three) / whole;
  const variance = (one + 4 * two + 9 * three) / whole - charge * charge;
  return { value: phosphate * (charge - 1), perPh: Math.LN10 * phosphate * variance };
}
