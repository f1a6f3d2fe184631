import { type Timeline, timelineEndpoints } from '../../shared/contracts/timeline.ts';
import { UNITS } from '../../shared/domain/units.ts';
import type { Api } from '../http/api.ts';
import { type CsvColumns, csvFile } from '../http/csv-file.ts';
import { systemTimeline } from '../queries/system-timeline.ts';

export function timelineRoutes(api: Api): void {
  const { clock } = api.deps;
  api.read(timelineEndpoints.show, (db, { params, query }) => systemTimeline(db, params.id, query, clock.now()));
  api.read(timelineEndpoints.export, (db, { params, query }) => {
    const whole = systemTimeline(db, params.id, query, clock.now(), Infinity);
    return csvFile('timeline.csv', COLUMNS, linesOf(whole));
  });
}

interface Line {
  at: number;
  what: string;
  value: number;
  unit: string;
  error: number | null;
  note: string;
}

const COLUMNS: CsvColumns<Line> = {
  'When (UTC)': ({ at }) => new Date(at).toISOString(),
  What: ({ what }) => what,
  Value: ({ value }) => value,
  Unit: ({ unit }) => unit,
  'Error (half of 95 %)': ({ error }) => error,
  Note: ({ note }) => note,
};

/** Everything of a timeline in one order of time, in canonical units. */
function linesOf({ series, limewater, doses, rates, waterChanges, changeOvers }: Timeline): Line[] {
  const measured = series.flatMap(({ parameter, points }) =>
    points.map(({ at, value, error, method }) => ({
      ...{ at, what: parameter, value, unit: Object.keys(UNITS[parameter])[0] ?? '', error, note: method },
    })),
  );
  const drawn = limewater.map(({ from, to, litres, meqL }) => ({
    ...{ at: to, what: 'limewater drawn', value: litres, unit: 'L', error: null },
    note: `since ${new Date(from).toISOString()}, ${meqL.toFixed(4)} meq/L of the system`,
  }));
  const dosed = doses.map(({ at, name, amount, unit, meqL }) => ({
    ...{ at, what: name, value: amount, unit, error: null, note: `${meqL.toFixed(4)} meq/L of the system` },
  }));
  const steady = rates.map(({ at, name, amountPerDay, unit, ended }) => ({
    ...{ at, what: name, value: amountPerDay, unit: `${unit} a day`, error: null },
    note: ended ? 'steady dosing ended' : 'steady dosing began',
  }));
  const changed = waterChanges.map(({ at, litres, alkalinityMeqL }) => ({
    ...{ at, what: 'water change', value: litres, unit: 'L', error: null, note: `new water ${alkalinityMeqL} meq/L` },
  }));
  const swapped = changeOvers.map(({ at, code, alkalinityMeqL }) => ({
    ...{ at, what: 'put online', value: alkalinityMeqL, unit: 'meq/L', error: null, note: code },
  }));
  return [...measured, ...drawn, ...dosed, ...steady, ...changed, ...swapped].sort((a, b) => a.at - b.at);
}
