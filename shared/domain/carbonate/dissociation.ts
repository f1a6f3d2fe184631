/**
 * Dissociation constants of the acids of seawater at one atmosphere, as published, each on the scale its paper uses.
 * All take practical salinity and kelvin (°C + 273.15) and give mol/kg of seawater. Dickson, Sabine & Christian 2007,
 * Guide to Best Practices for Ocean CO2 Measurements, chapter 5, gathers them.
 */

/** First and second constant of carbonic acid, total scale. @see Lueker, Dickson & Keeling 2000, Mar. Chem. 70:105 */
export function carbonicAcid(salinity: number, kelvin: number): { k1: number; k2: number } {
  const s = salinity;
  const lnT = Math.log(kelvin);
  const pK1 = 3633.86 / kelvin - 61.2172 + 9.6777 * lnT - 0.011555 * s + 0.0001152 * s * s;
  const pK2 = 471.78 / kelvin + 25.929 - 3.16967 * lnT - 0.01781 * s + 0.0001122 * s * s;
  return { k1: Math.exp(-pK1 * Math.LN10), k2: Math.exp(-pK2 * Math.LN10) };
}

/** Boric acid, total scale. @see Dickson 1990, Deep-Sea Res. 37:755 */
export function boricAcid(salinity: number, kelvin: number): number {
  const s = salinity;
  const root = Math.sqrt(s);
  const overT = -8966.9 - 2890.53 * root - 77.942 * s + 1.728 * s * root - 0.0996 * s * s;
  const constant = 148.0248 + 137.1942 * root + 1.62142 * s;
  const timesLnT = -24.4344 - 25.085 * root - 0.2474 * s;
  return Math.exp(overT / kelvin + constant + timesLnT * Math.log(kelvin) + 0.053105 * root * kelvin);
}

/** Ion product of water, seawater scale, (mol/kg)². @see Millero 1995, Geochim. Cosmochim. Acta 59:661 */
export function waterSws(salinity: number, kelvin: number): number {
  const lnT = Math.log(kelvin);
  const pure = 148.9802 - 13847.26 / kelvin - 23.6521 * lnT;
  return Math.exp(pure + (-5.977 + 118.67 / kelvin + 1.0495 * lnT) * Math.sqrt(salinity) - 0.01615 * salinity);
}

/** Bisulphate, free scale. @see Dickson 1990, J. Chem. Thermodyn. 22:113 */
export function bisulphateFree(salinity: number, kelvin: number): number {
  const lnT = Math.log(kelvin);
  const ionic = ionicStrength(salinity);
  const root = Math.sqrt(ionic);
  const ln =
    141.328 -
    4276.1 / kelvin -
    23.093 * lnT +
    (324.57 - 13856 / kelvin - 47.986 * lnT) * root +
    (-771.54 + 35474 / kelvin + 114.723 * lnT) * ionic -
    (2698 / kelvin) * ionic * root +
    (1776 / kelvin) * ionic * ionic;
  return Math.exp(ln) * perKgOfSeawater(salinity);
}

/** Hydrogen fluoride, free scale. @see Dickson & Riley 1979, Mar. Chem. 7:89 */
export function hydrogenFluorideFree(salinity: number, kelvin: number): number {
  const ln = 1590.2 / kelvin - 12.641 + 1.525 * Math.sqrt(ionicStrength(salinity));
  return Math.exp(ln) * perKgOfSeawater(salinity);
}

/** The three constants of phosphoric acid, seawater scale. @see Yao & Millero 1995, Aquat. Geochem. 1:53 */
export function phosphoricAcidSws(salinity: number, kelvin: number): { p1: number; p2: number; p3: number } {
  const s = salinity;
  const root = Math.sqrt(s);
  const lnT = Math.log(kelvin);
  const ln1 =
    (-4576.752 - 106.736 * root - 0.65643 * s) / kelvin + 115.54 - 18.453 * lnT + 0.69171 * root - 0.01844 * s;
  const ln2 =
    (-8814.715 - 160.34 * root + 0.37335 * s) / kelvin + 172.1033 - 27.927 * lnT + 1.3566 * root - 0.05778 * s;
  const ln3 = (-3070.75 + 17.27039 * root - 44.99486 * s) / kelvin - 18.126 + 2.81197 * root - 0.09984 * s;
  return { p1: Math.exp(ln1), p2: Math.exp(ln2), p3: Math.exp(ln3) };
}

/** mol/kg of water, as the free-scale papers count it. */
function ionicStrength(salinity: number): number {
  return (19.924 * salinity) / (1000 - 1.005 * salinity);
}

/** Kilograms of water in one of seawater: turns a constant per kg of water into one per kg of seawater. */
function perKgOfSeawater(salinity: number): number {
  return 1 - 0.001005 * salinity;
}
