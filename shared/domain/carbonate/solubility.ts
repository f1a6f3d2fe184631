const GAS_CONSTANT_ML_BAR = 83.14462618;
const ATMOSPHERE_BAR = 1.01325;

/** Solubility of carbon dioxide, mol/kg/atm of fugacity. @see Weiss 1974, Mar. Chem. 2:203 */
export function co2Solubility(salinity: number, kelvin: number): number {
  const t = kelvin / 100;
  return Math.exp(
    -60.2409 + 93.4517 / t + 23.3585 * Math.log(t) + salinity * (0.023517 - 0.023656 * t + 0.0047036 * t * t),
  );
}

/** Fugacity of carbon dioxide over its partial pressure, at one atmosphere. @see Weiss 1974, Mar. Chem. 2:203 */
export function co2FugacityFactor(kelvin: number): number {
  const cross = 57.7 - 0.118 * kelvin;
  const virial = -1636.75 + 12.0408 * kelvin - 0.0327957 * kelvin ** 2 + 3.16528e-5 * kelvin ** 3;
  return Math.exp(((virial + 2 * cross) * ATMOSPHERE_BAR) / (GAS_CONSTANT_ML_BAR * kelvin));
}

/** Solubility products of aragonite and calcite, (mol/kg)². @see Mucci 1983, Am. J. Sci. 283:780 */
export function carbonateMinerals(salinity: number, kelvin: number): { aragonite: number; calcite: number } {
  const s = salinity;
  const root = Math.sqrt(s);
  const common = -0.077993 * kelvin + 71.595 * Math.log10(kelvin);
  const aragonite =
    -171.945 +
    common +
    2903.293 / kelvin +
    (-0.068393 + 0.0017276 * kelvin + 88.135 / kelvin) * root -
    0.10018 * s +
    0.0059415 * s * root;
  const calcite =
    -171.9065 +
    common +
    2839.319 / kelvin +
    (-0.77712 + 0.0028426 * kelvin + 178.34 / kelvin) * root -
    0.07711 * s +
    0.0041249 * s * root;
  return { aragonite: Math.exp(aragonite * Math.LN10), calcite: Math.exp(calcite * Math.LN10) };
}

/**
 * Apparent activity coefficient of the hydrogen ion: what a probe calibrated in NBS buffers reads of the seawater scale.
 *
 * @see Takahashi, Williams & Bos 1982, GEOSECS Pacific Expedition 3, chapter 3
 */
export function nbsActivity(salinity: number, kelvin: number): number {
  return 1.2948 - 0.002036 * kelvin + (0.0004607 - 0.000001475 * kelvin) * salinity ** 2;
}
