import { z } from 'zod';
import { solveCarbonate } from '../carbonate/solve.ts';
import { anyNumber, calculator, optional } from './calculator.ts';

const inputs = z.strictObject({
  salinity: anyNumber,
  temperature_C: anyNumber,
  alkalinity_umol_kg: optional(anyNumber),
  dic_umol_kg: optional(anyNumber),
  ph: optional(anyNumber),
  ph_scale: optional(z.enum(['total', 'free', 'sws', 'nbs'], 'must be total, free, sws or nbs')),
  pco2_uatm: optional(anyNumber),
  calcium_mg_L: optional(anyNumber),
  boron: optional(z.enum(['uppstrom1974', 'lee2010'], 'must be uppstrom1974 or lee2010')),
});

export const carbonateCalculator = calculator(
  'the whole carbonate system of seawater from two of alkalinity, DIC, pH and pCO₂',
  inputs,
  (input) => {
    const state = solveCarbonate({
      salinity: input.salinity,
      temperatureC: input.temperature_C,
      alkalinityUmolKg: input.alkalinity_umol_kg,
      dicUmolKg: input.dic_umol_kg,
      ...{ ph: input.ph, phScale: input.ph_scale },
      pco2Uatm: input.pco2_uatm,
      ...{ calciumMgL: input.calcium_mg_L, boron: input.boron },
    });
    return {
      ...{ ph_total: state.phTotal, ph_free: state.phFree, ph_sws: state.phSws, ph_nbs: state.phNbs },
      ...{ alkalinity_umol_kg: state.alkalinityUmolKg, dic_umol_kg: state.dicUmolKg, pco2_uatm: state.pco2Uatm },
      ...{ hco3_umol_kg: state.bicarbonateUmolKg, co3_umol_kg: state.carbonateUmolKg, co2_umol_kg: state.co2UmolKg },
      ...{ omega_aragonite: state.omegaAragonite, omega_calcite: state.omegaCalcite },
    };
  },
);
