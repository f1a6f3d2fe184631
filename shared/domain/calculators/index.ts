import type { Calculator } from './calculator.ts';
import { carbonateCalculator } from './carbonate.ts';
import { demandCalculator } from './demand.ts';
import { limewaterCalculator } from './limewater.ts';
import { codeCalculator } from './plug-code.ts';
import { densityCalculator, salinityCalculator } from './seawater.ts';
import { survivalCalculator } from './survival.ts';

/** Every calculation that can be asked for by name, outside the screens too. */
export const CALCULATORS: Readonly<Record<string, Calculator>> = {
  carbonate: carbonateCalculator,
  salinity: salinityCalculator,
  density: densityCalculator,
  limewater: limewaterCalculator,
  demand: demandCalculator,
  survival: survivalCalculator,
  code: codeCalculator,
};
