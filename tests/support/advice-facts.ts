import type { AdviceFacts, LimewaterFact, SupplementFact } from '../../shared/domain/dosing-plan/facts.ts';
import { MEQ_PER_DKH } from '../../shared/domain/units.ts';

export const BICARBONATE: SupplementFact = {
  ...{ itemId: 'alk', name: 'Bicarbonate solution', unit: 'mL', alkalinityMeq: 1.0, calciumMg: 0, cost: 2000 },
};
export const CALCIUM_CHLORIDE: SupplementFact = {
  ...{ itemId: 'cal', name: 'Calcium solution', unit: 'mL', alkalinityMeq: 0, calciumMg: 20, cost: 3000 },
};

const limewater: LimewaterFact = {
  ...{ onlineMeqL: 30, temperatureC: 25, purity: 0.95, acidPercent: 5, limeCost: 9000, vinegarCost: 1000 },
};

/** A 2,000 L system that uses 0.4 meq/L a day of 20 L of limewater at 30 meq/L and holds, unless said otherwise. */
export function adviceFacts(
  changes: Partial<Omit<AdviceFacts, 'limewater'>> & { limewater?: Partial<LimewaterFact> | null } = {},
): AdviceFacts {
  return {
    netVolumeL: 2000,
    band: { low: 7.5 * MEQ_PER_DKH, high: 9 * MEQ_PER_DKH },
    level: { meqL: 8.2 * MEQ_PER_DKH, error: 0.1 },
    demand: { meqLPerDay: 0.4, low: 0.36, high: 0.44 },
    given: { limewater: 0.3, others: 0, waterChanges: 0 },
    steady: {
      enough: true,
      steady: false,
      tests: 21,
      days: 20,
      slopePerDay: -0.05,
      low: -0.06,
      high: -0.04,
      change: -1,
    },
    testsSinceChange: 10,
    water: { salinity: 35, temperatureC: 25.5, alkalinityMeqL: 8.2 * MEQ_PER_DKH, calciumMgL: 420, phNbs: 8.15 },
    assumed: [],
    evaporationLPerDay: 20,
    supplements: [BICARBONATE, CALCIUM_CHLORIDE],
    plan: null,
    ...changes,
    limewater: changes.limewater === null ? null : { ...limewater, ...changes.limewater },
  };
}
