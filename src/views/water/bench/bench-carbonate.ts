import type { CarbonateInput } from '@shared/domain/carbonate/input.ts';
import { solveCarbonate, type CarbonateState } from '@shared/domain/carbonate/solve.ts';
import { type Measured, propagatedSd } from '@shared/domain/error-propagation.ts';
import { densityByEquation } from '@shared/domain/seawater.ts';
import { testErrorOf } from '@shared/domain/test-error.ts';
import { fromCanonical } from '@shared/domain/units.ts';
import { DomainError } from '@shared/errors.ts';
import type { BenchChoices, BenchNumber } from './bench-fields.ts';

type Pair = BenchChoices['pair'];

export const PAIRS: Readonly<Record<Pair, { title: string; fields: readonly [BenchNumber, BenchNumber] }>> = {
  'alkalinity-ph': { title: 'Alkalinity and pH', fields: ['alkalinityMeqL', 'ph'] },
  'alkalinity-dic': { title: 'Alkalinity and inorganic carbon', fields: ['alkalinityMeqL', 'dicUmolKg'] },
  'alkalinity-pco2': { title: 'Alkalinity and carbon dioxide', fields: ['alkalinityMeqL', 'pco2Uatm'] },
  'dic-ph': { title: 'Inorganic carbon and pH', fields: ['dicUmolKg', 'ph'] },
  'dic-pco2': { title: 'Inorganic carbon and carbon dioxide', fields: ['dicUmolKg', 'pco2Uatm'] },
  'ph-pco2': { title: 'pH and carbon dioxide', fields: ['ph', 'pco2Uatm'] },
};

export const WATER_FIELDS = ['salinity', 'temperatureC', 'calciumMgL', 'phosphateMgL'] as const;

/** Parts of a value that a meter for carbon or carbon dioxide is off by; assumed, since meters differ widely. */
const CARBON_SD = 0.01;
const CARBON_DIOXIDE_SD = 0.05;

type Given = Record<BenchNumber, number>;
export type CarbonateResult = { state: CarbonateState; sd: CarbonateState | null };

/** The carbonate system from the two that are known, with the errors that usual tests bring; null at the edges. */
export function benchCarbonate(given: Given, { pair, phScale, boron }: BenchChoices): CarbonateResult {
  const measured = measuredOf(given, pair);
  const solve = (values: Given) => solveCarbonate(inputOf({ ...given, ...values }, { pair, phScale, boron }));
  const state = solve(given);
  try {
    return { state, sd: propagatedSd((values) => ({ ...solve(values) }), measured) };
  } catch (error) {
    if (error instanceof DomainError) return { state, sd: null };
    throw error;
  }
}

/** What was measured, each with the standard deviation of a usual test. */
export function measuredOf(given: Given, pair: Pair): Record<BenchNumber, Measured> {
  const sds: Partial<Record<BenchNumber, number>> = {
    salinity: testErrorOf('salinity', '').sd,
    temperatureC: testErrorOf('temperature', '').sd,
    calciumMgL: testErrorOf('calcium', '').sd,
    alkalinityMeqL: testErrorOf('alkalinity', '').sd,
    ph: testErrorOf('ph', '').sd,
    dicUmolKg: given.dicUmolKg * CARBON_SD,
    pco2Uatm: given.pco2Uatm * CARBON_DIOXIDE_SD,
  };
  const names: BenchNumber[] = ['salinity', 'temperatureC', 'calciumMgL', ...PAIRS[pair].fields];
  const entries = names.map((name) => [name, { value: given[name], sd: sds[name] ?? 0 }]);
  return Object.fromEntries(entries) as Record<BenchNumber, Measured>; // only of what was measured
}

function inputOf(
  given: Given,
  { pair, phScale, boron }: Pick<BenchChoices, 'pair' | 'phScale' | 'boron'>,
): CarbonateInput {
  const { salinity, temperatureC } = given;
  // Without its guard: the solver's own words about the range go first.
  const densityKgL = densityByEquation(salinity, temperatureC) / 1000;
  const known: Partial<Record<BenchNumber, CarbonateInput | Partial<CarbonateInput>>> = {
    alkalinityMeqL: { alkalinityUmolKg: (given.alkalinityMeqL * 1000) / densityKgL },
    dicUmolKg: { dicUmolKg: given.dicUmolKg },
    pco2Uatm: { pco2Uatm: given.pco2Uatm },
    ph: { ph: given.ph, phScale },
  };
  const [one, other] = PAIRS[pair].fields;
  return {
    ...{ salinity, temperatureC, boron, calciumMgL: given.calciumMgL },
    phosphateUmolKg: (fromCanonical('phosphate', given.phosphateMgL, 'mmol/L') * 1000) / densityKgL,
    ...known[one],
    ...known[other],
  };
}
