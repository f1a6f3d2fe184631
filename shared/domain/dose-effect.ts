import { ATOMIC_G_PER_MOL } from './atomic-weights.ts';
import type { CarbonateInput } from './carbonate/input.ts';
import { solveCarbonate } from './carbonate/solve.ts';
import { assertAboveZero, assertNotNegative, assertWithin } from './ranges.ts';
import { seawaterDensity } from './seawater.ts';

/** Calcium that comes and goes with alkalinity in limewater and in coral skeleton, mg per meq. */
export const CALCIUM_MG_PER_MEQ = ATOMIC_G_PER_MOL.Ca / 2;

/** A system's water as its tests show it. */
export interface WaterState {
  /** Practical salinity, 19–42. */
  salinity: number;
  /** °C, 2–35. */
  temperatureC: number;
  alkalinityMeqL: number;
  calciumMgL: number;
  /** pH as a probe calibrated in NBS buffers reads it. */
  phNbs: number;
}

/** What is added to each litre of the system. */
export interface Dose {
  /** Alkalinity brought in the end, acetate included, meq. */
  alkalinityMeqL: number;
  calciumMgL: number;
  /** Inorganic carbon that the dose brings, mmol: 1 a meq for bicarbonate, 0.5 for carbonate, none for limewater. */
  dicMmolL?: number;
  /** Part of the alkalinity that is acetate, meq: it counts only when bacteria have oxidised it. */
  acetateMeqL?: number;
  /** Fresh water that comes with it and stays, L; none where it only replaces what evaporated. */
  waterLPerL?: number;
}

/** Chemistry at one moment. */
export interface Chem {
  alkalinityMeqL: number;
  calciumMgL: number;
  salinity: number;
  phNbs: number;
  phTotal: number;
  omegaAragonite: number;
  pco2Uatm: number;
}

export interface DoseEffect {
  before: Chem;
  /** When mixed, before any carbon dioxide is exchanged with the air and any acetate is oxidised. */
  atOnce: Chem;
  /** When in balance with the room's air and all acetate is oxidised. */
  equilibrated: Chem;
}

/** Indoor air with people in it (common practice, no source); outdoor air has about 425 µatm. */
export const USUAL_ROOM_PCO2_UATM = 450;

/** Where the constants of the carbonate system and the equation of state both hold. */
const SALINITY_LIMITS = { min: 19, max: 42 } as const;

/** One litre of the system on its way: per kilogram quantities, so that mass is kept when fresh water comes in. */
interface Parcel {
  salinity: number;
  temperatureC: number;
  densityKgL: number;
  alkalinityUmolKg: number;
  calciumMgL: number;
}

/**
 * What a dose does to the water: at once, closed to the air, and when it has come into balance with the room.
 *
 * Nothing is taken to precipitate. Where aragonite saturation passes about 7, calcium carbonate falls out and may take
 * more alkalinity than was given (Moras et al. 2022, Biogeosciences 19:3537): read such a result as a warning.
 *
 * @param dose for each litre of the system; see {@link limewaterDose}
 * @param roomPco2Uatm carbon dioxide of the room's air, µatm
 * @throws {DomainError} `domain.out_of_range` where the water or the outcome leaves what the equations hold for
 */
export function doseEffect(water: WaterState, dose: Dose, roomPco2Uatm = USUAL_ROOM_PCO2_UATM): DoseEffect {
  const { alkalinityMeqL, calciumMgL, dicMmolL = 0, acetateMeqL = 0, waterLPerL = 0 } = dose;
  assertDose({ alkalinityMeqL, calciumMgL, dicMmolL, acetateMeqL, waterLPerL });
  assertWithin('Salinity', water.salinity, SALINITY_LIMITS.min, SALINITY_LIMITS.max);
  const start = parcelOf(water);
  const before = solveCarbonate({ ...partsOf(start), ph: water.phNbs, phScale: 'nbs' });

  const after = withDose(start, { alkalinityMeqL, calciumMgL, waterLPerL });
  const dicUmolKg = (before.dicUmolKg + (dicMmolL * 1000) / start.densityKgL) * after.dilution;
  const acetateUmolKg = ((acetateMeqL * 1000) / start.densityKgL) * after.dilution;
  const mixed = {
    ...after.parcel,
    alkalinityUmolKg: after.parcel.alkalinityUmolKg - acetateUmolKg,
  };
  return {
    before: chemOf(start, before),
    atOnce: chemOf(mixed, solveCarbonate({ ...partsOf(mixed), dicUmolKg })),
    equilibrated: chemOf(after.parcel, solveCarbonate({ ...partsOf(after.parcel), pco2Uatm: roomPco2Uatm })),
  };
}

/**
 * Limewater as a dose for {@link doseEffect}, with its water: salinity falls and everything is diluted, unless the
 * limewater replaces water that has evaporated.
 *
 * @param litres limewater that goes in, L
 * @param alkalinityMeqL its strength counted in the end, meq/L
 * @param systemVolumeL water in the system before, L
 * @param options.acetateMeqL part of the strength that is acetate from vinegar, meq/L
 */
export function limewaterDose(
  litres: number,
  alkalinityMeqL: number,
  systemVolumeL: number,
  options: { replacesEvaporation?: boolean; acetateMeqL?: number } = {},
): Required<Omit<Dose, 'dicMmolL'>> {
  assertNotNegative('Limewater (L)', litres);
  assertNotNegative('Strength (meq/L)', alkalinityMeqL);
  assertAboveZero('System volume (L)', systemVolumeL);
  const share = litres / systemVolumeL;
  return {
    alkalinityMeqL: share * alkalinityMeqL,
    calciumMgL: share * alkalinityMeqL * CALCIUM_MG_PER_MEQ,
    acetateMeqL: share * (options.acetateMeqL ?? 0),
    waterLPerL: options.replacesEvaporation ? 0 : share,
  };
}

function parcelOf({ salinity, temperatureC, alkalinityMeqL, calciumMgL }: WaterState): Parcel {
  const densityKgL = seawaterDensity(salinity, temperatureC) / 1000;
  return { salinity, temperatureC, densityKgL, alkalinityUmolKg: (alkalinityMeqL * 1000) / densityKgL, calciumMgL };
}

/** Mass is kept: salt of one litre spreads over its own mass and that of the fresh water. */
function withDose(
  { salinity, temperatureC, densityKgL, alkalinityUmolKg, calciumMgL }: Parcel,
  dose: { alkalinityMeqL: number; calciumMgL: number; waterLPerL: number },
): { parcel: Parcel; dilution: number } {
  const freshKg = dose.waterLPerL === 0 ? 0 : (dose.waterLPerL * seawaterDensity(0, temperatureC)) / 1000;
  const dilution = densityKgL / (densityKgL + freshKg);
  const diluted = salinity * dilution;
  const newDensityKgL = seawaterDensity(diluted, temperatureC) / 1000;
  const newVolumeL = (densityKgL + freshKg) / newDensityKgL;
  return {
    dilution,
    parcel: {
      salinity: diluted,
      temperatureC,
      densityKgL: newDensityKgL,
      alkalinityUmolKg: (alkalinityUmolKg + (dose.alkalinityMeqL * 1000) / densityKgL) * dilution,
      calciumMgL: (calciumMgL + dose.calciumMgL) / newVolumeL,
    },
  };
}

function partsOf({ salinity, temperatureC, alkalinityUmolKg, calciumMgL }: Parcel): CarbonateInput {
  return { salinity, temperatureC, alkalinityUmolKg, calciumMgL };
}

function chemOf(
  { salinity, densityKgL, alkalinityUmolKg, calciumMgL }: Parcel,
  { phNbs, phTotal, omegaAragonite, pco2Uatm }: ReturnType<typeof solveCarbonate>,
): Chem {
  return {
    alkalinityMeqL: (alkalinityUmolKg * densityKgL) / 1000,
    calciumMgL,
    salinity,
    phNbs,
    phTotal,
    omegaAragonite,
    pco2Uatm,
  };
}

function assertDose(dose: Required<Dose>): void {
  assertNotNegative('Alkalinity of the dose (meq/L)', dose.alkalinityMeqL);
  assertNotNegative('Calcium of the dose (mg/L)', dose.calciumMgL);
  assertNotNegative('Carbon of the dose (mmol/L)', dose.dicMmolL);
  assertNotNegative('Acetate of the dose (meq/L)', dose.acetateMeqL);
  assertNotNegative('Water of the dose (L/L)', dose.waterLPerL);
}
