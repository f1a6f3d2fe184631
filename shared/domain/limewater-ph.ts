import { CALCIUM_G_PER_MOL, type LimewaterResult } from './limewater.ts';
import { assertNotNegative, assertWithin } from './ranges.ts';

/** Stability of CaOH⁺ and CaCH₃COO⁺ at 25 °C, log10 (minteq.v4 of PHREEQC: 1.30; 1.18 from memory). */
const LOG_K_CALCIUM_HYDROXIDE_ION = 1.3;
const LOG_K_CALCIUM_ACETATE_ION = 1.18;
/** Acetic acid at 25 °C in fresh water. */
const PK_ACETIC_ACID = 4.757;

/** Steps of halving: from a span of 15 pH down to less than 1e-12. */
const HALVINGS = 45;

type MixedWater = Pick<LimewaterResult, 'calciumMgL' | 'alkalinityMeqL' | 'alkalinityNowMeqL'>;

/** What a clear limewater holds, mol/L. */
export interface ClearLimewater {
  calciumMolL: number;
  /** Acetate that bacteria have not used up yet. */
  acetateMolL: number;
}

/**
 * pH of clear limewater, saturated or weaker, with or without vinegar: the charge balance of Ca²⁺, CaOH⁺, CaCH₃COO⁺,
 * acetate, OH⁻ and H⁺ with activities by Davies' equation. Carbonate is left out: limewater that air has reached is
 * weaker, not of another kind.
 *
 * @param water calcium 0–0.2 mol/L; acetate below two for each calcium, so that the solution stays alkaline
 * @param temperatureC °C, 15–30
 * @returns pH by activity, as a probe set on NBS buffers reads it; 12.45 for 0.0203 mol/L at 25 °C
 * @throws {DomainError} `domain.out_of_range`
 * @see Bates, Bower & Smith 1956, J. Res. NBS 56:305 (the value to meet); Davies 1962, Ion Association, section 3
 */
export function limewaterPh({ calciumMolL, acetateMolL }: ClearLimewater, temperatureC: number): number {
  assertWithin('Calcium (mol/L)', calciumMolL, 0, 0.2);
  assertNotNegative('Acetate (mol/L)', acetateMolL);
  assertWithin('Water temperature (°C)', temperatureC, 15, 30);
  const pKw = waterPk(temperatureC);
  let low = 3;
  let high = 14.5;
  // More hydroxide makes the sum of charges more negative, so halving the span always closes in on the one balance.
  for (let halving = 0; halving < HALVINGS; halving += 1) {
    const ph = (low + high) / 2;
    if (netCharge({ calciumMolL, acetateMolL }, ph, pKw) > 0) low = ph;
    else high = ph;
  }
  return (low + high) / 2;
}

/**
 * pH of the clear part of a mix as it stands freshly settled, before bacteria use the acetate.
 *
 * @param mix what `mixLimewater` found
 * @param temperatureC °C, 15–30
 * @throws {DomainError} `domain.out_of_range`
 */
export function mixPh({ calciumMgL, alkalinityMeqL, alkalinityNowMeqL }: MixedWater, temperatureC: number): number {
  const acetateMolL = (alkalinityMeqL - alkalinityNowMeqL) / 1000;
  return limewaterPh({ calciumMolL: calciumMgL / 1000 / CALCIUM_G_PER_MOL, acetateMolL }, temperatureC);
}

/**
 * pK of water, 0–60 °C.
 * @see Harned & Hamer 1933, J. Am. Chem. Soc. 55:2194 (coefficients from memory; 13.995 at 25 °C, 14.165 at 20 °C)
 */
function waterPk(temperatureC: number): number {
  const kelvin = temperatureC + 273.15;
  return 4471 / kelvin + 0.01706 * kelvin - 6.0875;
}

/** Sum of all charges, mol/L, were the pH this one. */
function netCharge({ calciumMolL, acetateMolL }: ClearLimewater, ph: number, pKw: number): number {
  const hydroxideActivity = 10 ** (ph - pKw);
  const hydrogenActivity = 10 ** -ph;
  // Ionic strength and speciation hang on each other; a few rounds settle them, since activities move little.
  let ionic = 2 * calciumMolL + acetateMolL / 2 + hydroxideActivity;
  let charge = 0;
  for (let round = 0; round < 12; round += 1) {
    const one = singleActivity(ionic);
    const two = one ** 4;
    const hydroxide = hydroxideActivity / one;
    const hydrogen = hydrogenActivity / one;
    const ions = species(calciumMolL, acetateMolL, { one, two, hydroxideActivity, hydrogenActivity });
    ionic = (4 * ions.calcium + ions.calciumHydroxide + ions.calciumAcetate + ions.free) / 2;
    ionic += (hydroxide + hydrogen) / 2;
    charge = 2 * ions.calcium + ions.calciumHydroxide + ions.calciumAcetate;
    charge += hydrogen - hydroxide - ions.free;
  }
  return charge;
}

interface Activities {
  /** Activity coefficients of ions with one and two charges. */
  one: number;
  two: number;
  hydroxideActivity: number;
  hydrogenActivity: number;
}

/** Splits calcium and acetate into their ions by the mass balances of both. */
function species(calciumMolL: number, acetateMolL: number, given: Activities) {
  const { one, two, hydroxideActivity, hydrogenActivity } = given;
  const withHydroxide = (10 ** LOG_K_CALCIUM_HYDROXIDE_ION * hydroxideActivity * two) / one;
  const withAcetate = 10 ** LOG_K_CALCIUM_ACETATE_ION * two;
  const asAcid = (hydrogenActivity * one) / 10 ** -PK_ACETIC_ACID;
  let free = acetateMolL / (1 + asAcid);
  let calcium = calciumMolL / (1 + withHydroxide + withAcetate * free);
  for (let round = 0; round < 30; round += 1) {
    free = acetateMolL / (1 + asAcid + withAcetate * calcium);
    calcium = calciumMolL / (1 + withHydroxide + withAcetate * free);
  }
  return {
    calcium,
    free,
    calciumHydroxide: calcium * withHydroxide,
    calciumAcetate: calcium * withAcetate * free,
  };
}

/** Davies' equation for one charge, with 0.509 of water at 25 °C (0.50–0.51 from 15 to 30 °C). */
function singleActivity(ionicStrength: number): number {
  const root = Math.sqrt(ionicStrength);
  return 10 ** (-0.509 * (root / (1 + root) - 0.3 * ionicStrength));
}
