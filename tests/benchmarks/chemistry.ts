import type { CarbonateInput } from '../../shared/domain/carbonate/input.ts';
import { solveCarbonate } from '../../shared/domain/carbonate/solve.ts';

const SOLUTIONS = 100_000;

/** Full solutions of the carbonate system a second on one core, for each pair of measurements. */
export function carbonateRates(): [what: string, value: string][] {
  const waters = Array.from({ length: 1000 }, (_, index) => {
    const at = { salinity: 30 + (index % 90) / 10, temperatureC: 20 + (index % 101) / 10 };
    return { at, state: solveCarbonate({ ...at, dicUmolKg: 1700 + (index % 701), ph: 7.7 + (index % 97) / 100 }) };
  });
  type Water = (typeof waters)[number];
  const pairs: Record<string, (water: Water) => CarbonateInput> = {
    'alkalinity and pH': ({ at, state }) => ({ ...at, alkalinityUmolKg: state.alkalinityUmolKg, ph: state.phTotal }),
    'alkalinity and DIC': ({ at, state }) => ({
      ...{ ...at, alkalinityUmolKg: state.alkalinityUmolKg, dicUmolKg: state.dicUmolKg },
    }),
    'alkalinity and pCO₂': ({ at, state }) => ({
      ...{ ...at, alkalinityUmolKg: state.alkalinityUmolKg, pco2Uatm: state.pco2Uatm },
    }),
  };
  return Object.entries(pairs).map(([pair, inputOf]) => {
    const inputs = waters.map(inputOf);
    return [`Carbonate system from ${pair}`, `${Math.round(perSecond(inputs) / 1000)},000 / s`];
  });
}

function perSecond(inputs: readonly CarbonateInput[]): number {
  for (const input of inputs) solveCarbonate(input);
  const began = performance.now();
  for (let run = 0; run < SOLUTIONS; run += inputs.length) for (const input of inputs) solveCarbonate(input);
  return SOLUTIONS / ((performance.now() - began) / 1000);
}
