import type { Timeline, TimelineSeries } from '@shared/contracts/timeline.ts';
import type { SystemDemand } from '@shared/contracts/water.ts';
import { MS_PER_DAY } from '@shared/domain/days.ts';
import { type ParameterCode, unitOf } from '@shared/domain/units.ts';
import { formatNumber } from '@/formatting/format-number.ts';
import type { Bar, Lane, LinePoint, Panel, SeriesPoint } from '@/components/charts/series.ts';
import type { useUnitChoicesStore } from '@/stores/unit-choices.ts';
import { parameterOf } from '@/views/water/water-labels.ts';

type Units = ReturnType<typeof useUnitChoicesStore>;

/** Litres a day are told over half a day at least: two looks within minutes tell nothing. */
const SHORTEST_USE_DAYS = 0.25;

type Estimated = Pick<SystemDemand, 'parameter' | 'levels' | 'flagged'>;

/** Readings with the 95 % error of their test, over the target band; with the level that all tests tell, where known. */
export function readingPanel({ parameter, points, band }: TimelineSeries, units: Units, estimated?: Estimated): Panel {
  const known = estimated?.parameter === parameter ? estimated : undefined;
  const flagged = new Set(known?.flagged.map(({ readingId }) => readingId));
  const decimals = decimalsOf(parameter, units);
  const shown = (value: number) => units.toShown(parameter, value);
  return {
    key: parameter,
    series: [
      {
        ...{ key: parameter, ...nameOf(parameter, units) },
        ...{ tone: 'plum', decimals },
        points: points.map(({ id, at, value, error, method }): SeriesPoint => ({
          ...{ at, value: shown(value), error: Math.abs(shown(value + error) - shown(value)) },
          ...(method === '' ? {} : { note: method }),
          ...(flagged.has(id) ? { flag: `flagged ${formatNumber(shown(value), { decimals })}` } : {}),
        })),
        line: (known?.levels ?? []).map(({ at, level, low, high }) => ({
          ...{ at, value: shown(level), low: shown(low), high: shown(high) },
        })),
      },
    ],
    ...(band ? { band: { min: shown(band.low), max: shown(band.high) } } : {}),
  };
}

/** Demand with its 95 % band, and as it goes on if nothing new happens. */
export function demandPanel({ parameter, history, forecast }: SystemDemand, units: Units): Panel {
  const shown = (rate: number) => units.toShown(parameter, rate);
  const toPoint = ({ at, demand, low, high }: SystemDemand['history'][number]): LinePoint => ({
    ...{ at, value: shown(demand), low: shown(low), high: shown(high) },
  });
  const name = parameter === 'alkalinity' ? 'demand' : `${parameter} demand`;
  return {
    key: name,
    fromZero: true,
    series: [
      {
        ...{ key: name, label: `${name}, with 95 % band`, unit: `${units.labelFor(parameter)} a day` },
        ...{ tone: 'slate', decimals: decimalsOf(parameter, units) + 1 },
        line: history.map(toPoint),
        ahead: [...history.slice(-1), ...forecast].map(toPoint),
      },
    ],
  };
}

/** Limewater that was drawn between the looks at its level. */
export function limewaterPanel(limewater: Timeline['limewater'], units: Units): Panel {
  const bars = limewater.flatMap(({ from, to, litres }): Bar[] => {
    const days = (to - from) / MS_PER_DAY;
    return days < SHORTEST_USE_DAYS ? [] : [{ from, to, value: units.toShown('volume', litres / days) }];
  });
  return {
    key: 'limewater',
    fromZero: true,
    height: 72,
    series: [
      {
        ...{ key: 'limewater', label: 'limewater used', unit: `${units.labelFor('volume')} a day` },
        ...{ tone: 'plum', decimals: 0, bars },
      },
    ],
  };
}

/** What was done to the water, a lane for each kind that was. */
export function actLanes({ waterChanges, doses, rates, changeOvers }: Timeline, units: Units): Lane[] {
  const level = (meqL: number, difference: boolean) =>
    units.say('alkalinity', meqL, { difference, signed: difference });
  const lanes: Lane[] = [
    {
      ...{ key: 'changes', label: 'water change', tone: 'slate', shape: 'triangle' },
      marks: waterChanges.map(({ at, litres, alkalinityMeqL }) => ({
        ...{ at, note: `${units.say('volume', litres, { decimals: 0 })} at ${level(alkalinityMeqL, false)}` },
      })),
    },
    {
      ...{ key: 'doses', label: 'other dose', tone: 'ochre', shape: 'diamond' },
      marks: doses.map(({ at, name, amount, unit, meqL }) => ({
        at,
        note: `${name}, ${amount} ${unit}${meqL > 0 ? `, ${level(meqL, true)}` : ''}`,
      })),
    },
    {
      ...{ key: 'rates', label: 'steady dosing', tone: 'ochre', shape: 'post' },
      marks: rates.map(({ at, name, amountPerDay, unit, ended }) => ({
        ...{ at, note: `${name}, ${amountPerDay} ${unit} a day ${ended ? 'ended' : 'began'}` },
      })),
    },
    {
      ...{ key: 'online', label: 'reservoir put online', tone: 'plum', shape: 'post' },
      marks: changeOvers.map(({ at, code, alkalinityMeqL }) => ({
        ...{ at, note: `${code} of ${alkalinityMeqL.toFixed(1)} meq/L` },
      })),
    },
  ];
  return lanes.filter(({ marks }) => marks.length > 0);
}

/** The name and the unit beside it; pH is both. */
function nameOf(parameter: ParameterCode, units: Units): { label: string; unit: string } {
  const unit = units.labelFor(parameter);
  const { label } = parameterOf(parameter);
  return label === unit ? { label, unit: '' } : { label: label.toLowerCase(), unit };
}

function decimalsOf(parameter: ParameterCode, units: Units): number {
  return unitOf(parameter, units.unitFor(parameter)).decimals;
}
