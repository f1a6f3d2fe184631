import { type Dose, type DoseEffect, limewaterDose } from '@shared/domain/dose-effect.ts';
import { type WaterRules } from '@shared/domain/dosing-plan/rules.ts';
import { powderBrings } from '@shared/domain/stock-solutions.ts';
import type { BenchChoices } from './bench-fields.ts';

/** Inorganic carbon that comes with each milliequivalent of alkalinity, mmol. */
const CARBON_PER_MEQ = { sodium_bicarbonate: 1, sodium_carbonate: 0.5 } as const;

export const WATER_NUMBERS = ['salinity', 'temperatureC', 'alkalinityMeqL', 'calciumMgL', 'ph'] as const;

interface DoseNumbers {
  volumeL: number;
  limewaterL: number;
  strengthMeqL: number;
  powderG: number;
}

/** What is put in, for each litre of the system. */
export function doseOf(numbers: DoseNumbers, { dosed, topOff }: Pick<BenchChoices, 'dosed' | 'topOff'>): Dose {
  const { volumeL, limewaterL, strengthMeqL, powderG } = numbers;
  if (dosed === 'limewater') {
    return limewaterDose(limewaterL, strengthMeqL, volumeL, { replacesEvaporation: topOff === 'replaces' });
  }
  const alkalinityMeqL = (powderBrings(dosed).alkalinityMeq * powderG) / volumeL;
  return { alkalinityMeqL, calciumMgL: 0, dicMmolL: alkalinityMeqL * CARBON_PER_MEQ[dosed] };
}

/** What speaks against giving it at once; empty where nothing does. */
export function doubts(
  { before, atOnce }: DoseEffect,
  { phLimit, phRise, omegaLimit }: Pick<WaterRules, 'phLimit' | 'phRise' | 'omegaLimit'>,
): string[] {
  const rise = atOnce.phNbs - before.phNbs;
  return [
    ...(rise > phRise ? [`the pH jumps by more than ${phRise}`] : []),
    ...(atOnce.phNbs > phLimit && rise > 0 ? [`the pH passes ${phLimit}`] : []),
    ...(atOnce.omegaAragonite > omegaLimit ? [`above a saturation of ${omegaLimit} chalk drops out`] : []),
  ];
}
