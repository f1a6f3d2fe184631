import type { Calculator } from './calculator.ts';
import { limewaterCalculator } from './limewater.ts';
import { codeCalculator } from './plug-code.ts';
import { densityCalculator } from './seawater.ts';
import { survivalCalculator } from './survival.ts';

/** Every calculation that can be asked for by name, outside the screens too. */
export const CALCULATORS: Readonly<Record<string, Calculator>> = {
  density: densityCalculator,
  limewater: limewaterCalculator,
  survival: survivalCalculator,
  code: codeCalculator,
};
