import type { ReadingSeries } from '@shared/contracts/readings.ts';
import type { SystemDemand } from '@shared/contracts/water.ts';
import { unitOf } from '@shared/domain/units.ts';
import type { Mark, Panel } from '@/components/charts/series.ts';
import type { useUnitChoicesStore } from '@/stores/unit-choices.ts';
import { parameterOf } from '@/views/water/water-labels.ts';

type Units = ReturnType<typeof useUnitChoicesStore>;

/** Readings with the 95 % error of their test, over the target band. */
export function readingPanel({ parameter, points, band }: ReadingSeries, units: Units): Panel {
  const shown = (value: number) => units.toShown(parameter, value);
  return {
    key: parameter,
    series: [
      {
        ...{ key: parameter, label: parameterOf(parameter).label.toLowerCase(), unit: units.labelFor(parameter) },
        ...{ tone: 'plum', decimals: unitOf(parameter, units.unitFor(parameter)).decimals },
        points: points.map(({ at, value, error }) => ({
          at,
          value: shown(value),
          error: Math.abs(shown(value + error) - shown(value)),
        })),
      },
    ],
    ...(band ? { band: { min: shown(band.low), max: shown(band.high) } } : {}),
  };
}

/** Demand week by week with its 95 % band. */
export function demandPanel(history: SystemDemand['history'], units: Units): Panel {
  const shown = (rate: number) => units.toShown('alkalinity', rate);
  return {
    key: 'demand',
    fromZero: true,
    series: [
      {
        ...{ key: 'demand', label: 'demand, with 95 % band', unit: `${units.labelFor('alkalinity')} a day` },
        ...{ tone: 'slate', decimals: 2 },
        line: history.map(({ at, demand, low, high }) => ({
          ...{ at, value: shown(demand), low: shown(low), high: shown(high) },
        })),
      },
    ],
  };
}

/** Water changes inside the period that is shown. */
export function chartMarks(demand: SystemDemand | undefined, series: ReadingSeries | undefined, units: Units): Mark[] {
  if (!demand || !series) return [];
  return demand.waterChanges
    .filter(({ at }) => at >= series.from)
    .map(({ at, litres }) => ({
      at,
      label: 'water change',
      note: units.say('volume', litres, { decimals: 0 }),
      tone: 'slate',
    }));
}
