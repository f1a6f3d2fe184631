import { DomainError } from '../../errors.ts';
import { ATOMIC_G_PER_MOL } from '../atomic-weights.ts';
import { risingRoot } from '../roots.ts';
import { densityByEquation } from '../seawater.ts';
import { carbonOfCo2, carbonOfDic, restOfAlkalinity, type Sloped } from './alkalinity.ts';
import { carbonateConstants, type CarbonateConstants } from './constants.ts';
import { assertCarbonateInput, type CarbonateInput } from './input.ts';
import { phOnScale, phTotalFrom } from './ph-scales.ts';

/** Seawater whose carbonate system is known in full. */
export interface CarbonateState {
  phTotal: number;
  phFree: number;
  phSws: number;
  /** What a probe calibrated in NBS buffers reads. */
  phNbs: number;
  alkalinityUmolKg: number;
  dicUmolKg: number;
  pco2Uatm: number;
  bicarbonateUmolKg: number;
  carbonateUmolKg: number;
  /** Dissolved carbon dioxide with carbonic acid. */
  co2UmolKg: number;
  /** Saturation of aragonite, the mineral of coral skeletons: 1 is in balance, above it can grow. */
  omegaAragonite: number;
  omegaCalcite: number;
}

const MICRO = 1e-6;

/** Seawater's pH stays well inside; where a solution would fall outside, the inputs cannot both be true. */
const PH_BRACKET = { low: 2, high: 12.5 } as const;
const PH_PRECISION = 1e-12;

/**
 * The whole carbonate system of seawater at one atmosphere from two of its parts. Total alkalinity is carbonate, borate
 * and water alkalinity, with phosphate when given; organic acids and silicate are not counted.
 *
 * Constants: K1, K2 Lueker et al. 2000; KB and KHSO4 Dickson 1990; KF Dickson & Riley 1979; KW Millero 1995; boron
 * Uppström 1974 or Lee et al. 2010; minerals Mucci 1983; CO₂ Weiss 1974; NBS by Takahashi et al. 1982.
 *
 * @throws {DomainError} `domain.out_of_range` outside S 19–43 and 2–35 °C, naming the input, and where no seawater can
 *   have both values; `input.invalid` unless just two are given
 * @see Dickson, Sabine & Christian 2007, Guide to Best Practices for Ocean CO2 Measurements, PICES Special Publication 3
 */
export function solveCarbonate(input: CarbonateInput): CarbonateState {
  assertCarbonateInput(input);
  const constants = carbonateConstants(input.salinity, input.temperatureC, input.boron ?? 'uppstrom1974');
  const phTotal = solvePh(input, constants);
  const { alkalinity, dic } = solveTotals(input, constants, 10 ** -phTotal);
  return describe(input, constants, { phTotal, alkalinity, dic });
}

function solvePh(input: CarbonateInput, constants: CarbonateConstants): number {
  const { alkalinityUmolKg, dicUmolKg, ph, pco2Uatm, phosphateUmolKg = 0 } = input;
  if (ph !== undefined) return phTotalFrom(constants, ph, input.phScale ?? 'total');
  const co2 = co2Of(constants, pco2Uatm ?? 0);
  if (alkalinityUmolKg === undefined) return phOfDicAndCo2(constants, (dicUmolKg ?? 0) * MICRO, co2);
  const carbon =
    dicUmolKg === undefined
      ? (h: number) => carbonOfCo2(constants, co2, h)
      : (h: number) => carbonOfDic(constants, dicUmolKg * MICRO, h);
  return phOfAlkalinity(constants, alkalinityUmolKg * MICRO, phosphateUmolKg * MICRO, carbon);
}

/** Alkalinity grows with pH whatever the carbon is held by, so there is one root at most. */
function phOfAlkalinity(
  constants: CarbonateConstants,
  alkalinity: number,
  phosphate: number,
  carbon: (h: number) => Sloped,
): number {
  const excess = (ph: number) => {
    const h = Math.exp(-Math.LN10 * ph);
    const fromCarbon = carbon(h);
    const rest = restOfAlkalinity(constants, phosphate, h);
    return { value: fromCarbon.value + rest.value - alkalinity, slope: fromCarbon.perPh + rest.perPh };
  };
  if (excess(PH_BRACKET.low).value > 0 || excess(PH_BRACKET.high).value < 0) throw impossible();
  return risingRoot(excess, PH_BRACKET, 8, PH_PRECISION);
}

/** DIC = CO₂ (1 + K1/H + K1 K2/H²) is a quadratic in H. */
function phOfDicAndCo2({ k1, k2 }: CarbonateConstants, dic: number, co2: number): number {
  const bound = dic / co2 - 1;
  if (!(bound > 0)) throw impossible();
  const ph = -Math.log10((k1 + Math.sqrt(k1 * k1 + 4 * bound * k1 * k2)) / (2 * bound));
  if (ph < PH_BRACKET.low || ph > PH_BRACKET.high) throw impossible();
  return ph;
}

/** Alkalinity and DIC, mol/kg, where the hydrogen ion is known. */
function solveTotals(
  input: CarbonateInput,
  constants: CarbonateConstants,
  h: number,
): { alkalinity: number; dic: number } {
  const { alkalinityUmolKg, dicUmolKg, pco2Uatm, phosphateUmolKg = 0 } = input;
  const rest = restOfAlkalinity(constants, phosphateUmolKg * MICRO, h).value;
  if (dicUmolKg !== undefined) {
    const dic = dicUmolKg * MICRO;
    return { dic, alkalinity: given(alkalinityUmolKg, carbonOfDic(constants, dic, h).value + rest) };
  }
  const carbon =
    pco2Uatm !== undefined
      ? carbonOfCo2(constants, co2Of(constants, pco2Uatm), h).value
      : (alkalinityUmolKg ?? 0) * MICRO - rest;
  // At a high pH borate and hydroxide alone may exceed the alkalinity: then nothing is left for carbon.
  if (!(carbon > 0)) throw impossible();
  return { dic: carbon / carbonOfDic(constants, 1, h).value, alkalinity: given(alkalinityUmolKg, carbon + rest) };
}

/** What was given stays as it was, to the last digit. */
function given(umolKg: number | undefined, solved: number): number {
  return umolKg === undefined ? solved : umolKg * MICRO;
}

function describe(
  input: CarbonateInput,
  constants: CarbonateConstants,
  { phTotal, alkalinity, dic }: { phTotal: number; alkalinity: number; dic: number },
): CarbonateState {
  const { k1, k2, co2PerAtm } = constants;
  const h = 10 ** -phTotal;
  const co2 = dic / (1 + k1 / h + (k1 * k2) / (h * h));
  const bicarbonate = (co2 * k1) / h;
  const carbonate = (bicarbonate * k2) / h;
  const ions = calciumOf(input, constants) * carbonate;
  return {
    phTotal,
    phFree: phOnScale(constants, phTotal, 'free'),
    phSws: phOnScale(constants, phTotal, 'sws'),
    phNbs: phOnScale(constants, phTotal, 'nbs'),
    alkalinityUmolKg: alkalinity / MICRO,
    dicUmolKg: dic / MICRO,
    pco2Uatm: co2 / co2PerAtm / MICRO,
    bicarbonateUmolKg: bicarbonate / MICRO,
    carbonateUmolKg: carbonate / MICRO,
    co2UmolKg: co2 / MICRO,
    omegaAragonite: ions / constants.aragonite,
    omegaCalcite: ions / constants.calcite,
  };
}

function co2Of(constants: CarbonateConstants, pco2Uatm: number): number {
  return pco2Uatm * MICRO * constants.co2PerAtm;
}

/** mol/kg; measured calcium is per litre, so it goes by the density of this water. */
function calciumOf({ calciumMgL, salinity, temperatureC }: CarbonateInput, { total }: CarbonateConstants): number {
  if (calciumMgL === undefined) return total.calcium;
  return calciumMgL / ATOMIC_G_PER_MOL.Ca / densityByEquation(salinity, temperatureC);
}

function impossible(): DomainError {
  return new DomainError(
    'domain.out_of_range',
    'No seawater has both of these values. Check each of them, its unit and the pH scale.',
  );
}
