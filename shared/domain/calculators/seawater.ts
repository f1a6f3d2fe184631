import { z } from 'zod';
import { salinityFromConductivity } from '../conductivity.ts';
import { seawaterDensity } from '../seawater.ts';
import { anyNumber, calculator } from './calculator.ts';

export const salinityCalculator = calculator(
  'practical salinity (PSS-78) from conductivity',
  z.strictObject({ conductivity_mS_cm: anyNumber, temperature_C: anyNumber }),
  ({ conductivity_mS_cm, temperature_C }) => ({
    salinity: salinityFromConductivity(conductivity_mS_cm, temperature_C),
  }),
);

export const densityCalculator = calculator(
  'density of seawater by EOS-80 at one atmosphere',
  z.strictObject({ salinity: anyNumber, temperature_C: anyNumber }),
  ({ salinity, temperature_C }) => ({ density_kg_m3: seawaterDensity(salinity, temperature_C) }),
);
