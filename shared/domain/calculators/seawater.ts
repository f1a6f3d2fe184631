import { z } from 'zod';
import { seawaterDensity } from '../seawater.ts';
import { anyNumber, calculator } from './calculator.ts';

export const densityCalculator = calculator(
  'density of seawater by EOS-80 at one atmosphere',
  z.strictObject({ salinity: anyNumber, temperature_C: anyNumber }),
  ({ salinity, temperature_C }) => ({ density_kg_m3: seawaterDensity(salinity, temperature_C) }),
);
