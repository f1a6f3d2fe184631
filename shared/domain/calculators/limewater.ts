import { z } from 'zod';
import { mixLimewater, USUAL_ACID_PERCENT } from '../limewater.ts';
import { mixPh } from '../limewater-ph.ts';
import { amount, anyNumber, calculator, optional } from './calculator.ts';

const inputs = z.strictObject({
  lime_g: amount,
  purity: anyNumber,
  water_L: anyNumber,
  temperature_C: anyNumber,
  vinegar_mL: optional(amount),
  acid_percent: optional(amount),
});

export const limewaterCalculator = calculator(
  'what a batch of limewater dissolves, how strong it gets and its pH',
  inputs,
  ({ lime_g, purity, water_L, temperature_C, vinegar_mL = 0, acid_percent = USUAL_ACID_PERCENT }) => {
    const mix = mixLimewater({
      ...{ limeG: lime_g, purity, waterL: water_L, temperatureC: temperature_C },
      ...{ vinegarMl: vinegar_mL, acidPercent: acid_percent },
    });
    return {
      dissolved_g: mix.dissolvedG,
      undissolved_g: mix.undissolvedG,
      alkalinity_meq_L: mix.alkalinityMeqL,
      alkalinity_now_meq_L: mix.alkalinityNowMeqL,
      calcium_mg_L: mix.calciumMgL,
      ph: mixPh(mix, temperature_C),
      vinegar_helps: mix.vinegarHelps,
    };
  },
);
