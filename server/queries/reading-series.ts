import type { ReadingSeries, SeriesDays } from '../../shared/contracts/readings.ts';
import { MS_PER_DAY } from '../../shared/domain/days.ts';
import { SD_PER_HALF_INTERVAL } from '../../shared/domain/test-error.ts';
import { thinSeries } from '../../shared/domain/thin-series.ts';
import type { ParameterCode } from '../../shared/domain/units.ts';
import type { Db } from '../db/client.ts';
import { readingsWithError } from './reading-errors.ts';
import { bandsOf, systemRow } from './systems.ts';

const MOST_POINTS = 1000;

/** Readings of one parameter up to now, for a chart, with few enough points to draw. */
export function readingSeries(
  db: Db,
  systemId: string,
  { parameter, days }: { parameter: ParameterCode; days: SeriesDays },
  now: number,
): ReadingSeries {
  systemRow(db, systemId);
  const from = now - days * MS_PER_DAY;
  const all = readingsWithError(db, systemId, parameter, from, now);
  return {
    ...{ parameter, from, to: now, total: all.length },
    points: thinSeries(all, MOST_POINTS).map(({ at, value, sd, biasSd }) => ({
      ...{ at, value, error: SD_PER_HALF_INTERVAL * Math.hypot(sd, biasSd) },
    })),
    band: bandsOf(db, systemId).find((band) => band.parameter === parameter) ?? null,
  };
}
