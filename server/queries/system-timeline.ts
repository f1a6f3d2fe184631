import { and, asc, eq, gt, gte, inArray, lte } from 'drizzle-orm';
import {
  LONGEST_TIMELINE_DAYS,
  type Timeline,
  type TimelineQuery,
  type TimelineSeries,
} from '../../shared/contracts/timeline.ts';
import { MS_PER_DAY } from '../../shared/domain/days.ts';
import { thinSeries } from '../../shared/domain/thin-series.ts';
import type { ParameterCode } from '../../shared/domain/units.ts';
import type { Db } from '../db/client.ts';
import { doses, dosingRates, items, reservoirEvents, reservoirs, waterChanges } from '../db/schema/index.ts';
import { readingsWithError } from './reading-errors.ts';
import { reservoirsOfSystem } from './reservoir-feeds.ts';
import { systemUse } from './reservoir-use.ts';
import { bandsOf, systemRow, type SystemRow } from './systems.ts';

/** Three years of daily readings come whole; beyond it each stretch keeps its lowest and highest. */
const MOST_POINTS = 1200;
const USUAL_DAYS = 90;
/** Half of a 95 % interval of a normal error. */
const HALF_INTERVAL_SD = 1.96;

interface Span {
  from: number;
  to: number;
}

/**
 * What was measured in a system and done to its water.
 *
 * @param mostPoints of each parameter: few enough to draw unless said otherwise
 */
export function systemTimeline(
  db: Db,
  systemId: string,
  query: TimelineQuery,
  now: number,
  mostPoints: number = MOST_POINTS,
): Timeline {
  const system = systemRow(db, systemId);
  const to = query.to ?? now;
  const earliest = Math.max(0, to - LONGEST_TIMELINE_DAYS * MS_PER_DAY);
  const span = { from: Math.max(earliest, query.from ?? to - USUAL_DAYS * MS_PER_DAY), to };
  return {
    ...{ systemId, ...span },
    series: query.parameters.map((parameter) => seriesOf(db, systemId, parameter, span, mostPoints)),
    limewater: limewaterIn(db, system, span),
    doses: dosesIn(db, system, span),
    rates: ratesIn(db, systemId, span),
    waterChanges: changesIn(db, systemId, span),
    changeOvers: changeOversIn(db, systemId, span),
  };
}

function seriesOf(
  db: Db,
  systemId: string,
  parameter: ParameterCode,
  { from, to }: Span,
  mostPoints: number,
): TimelineSeries {
  const all = readingsWithError(db, systemId, parameter, from, to);
  return {
    parameter,
    points: thinSeries(all, mostPoints).map(({ id, at, value, sd, method }) => ({
      ...{ id, at, value, method, error: HALF_INTERVAL_SD * sd },
    })),
    total: all.length,
    band: bandsOf(db, systemId).find((band) => band.parameter === parameter) ?? null,
  };
}

/** Looks at a level from days before the span may end inside of it, so a little more is read than is shown. */
function limewaterIn(db: Db, { id, netVolumeL }: SystemRow, { from, to }: Span): Timeline['limewater'] {
  return systemUse(db, id, to, (to - from) / MS_PER_DAY)
    .flatMap(({ intervals }) => intervals)
    .filter((use) => use.to > from && use.to <= to)
    .map((use) => ({ from: use.from, to: use.to, litres: use.litres, meqL: use.alkalinityMeq / netVolumeL }))
    .sort((a, b) => a.from - b.from);
}

function dosesIn(db: Db, { id, netVolumeL }: SystemRow, { from, to }: Span): Timeline['doses'] {
  return db
    .select({ dose: doses, name: items.name, unit: items.unit })
    .from(doses)
    .innerJoin(items, eq(items.id, doses.itemId))
    .where(and(eq(doses.systemId, id), gte(doses.at, from), lte(doses.at, to)))
    .orderBy(asc(doses.at))
    .all()
    .map(({ dose: { at, amount, alkalinityMeq }, name, unit }) => ({
      ...{ at, name, amount, unit, meqL: alkalinityMeq / netVolumeL },
    }));
}

function ratesIn(db: Db, systemId: string, { from, to }: Span): Timeline['rates'] {
  const within = (at: number | null): at is number => at !== null && at >= from && at <= to;
  return db
    .select({ rate: dosingRates, name: items.name, unit: items.unit })
    .from(dosingRates)
    .innerJoin(items, eq(items.id, dosingRates.itemId))
    .where(and(eq(dosingRates.systemId, systemId), lte(dosingRates.fromAt, to)))
    .all()
    .flatMap(({ rate: { fromAt, toAt, amountPerDay }, name, unit }) => [
      ...(within(fromAt) ? [{ at: fromAt, name, amountPerDay, unit, ended: false }] : []),
      ...(within(toAt) ? [{ at: toAt, name, amountPerDay, unit, ended: true }] : []),
    ])
    .sort((a, b) => a.at - b.at);
}

function changesIn(db: Db, systemId: string, { from, to }: Span): Timeline['waterChanges'] {
  return db
    .select({ at: waterChanges.at, litres: waterChanges.litres, alkalinityMeqL: waterChanges.alkalinityMeqL })
    .from(waterChanges)
    .where(and(eq(waterChanges.systemId, systemId), gte(waterChanges.at, from), lte(waterChanges.at, to)))
    .orderBy(asc(waterChanges.at))
    .all();
}

function changeOversIn(db: Db, systemId: string, { from, to }: Span): Timeline['changeOvers'] {
  const own = reservoirsOfSystem(db, systemId).map(({ id }) => id);
  return db
    .select({ at: reservoirEvents.at, code: reservoirs.code, alkalinityMeqL: reservoirEvents.alkalinityMeqL })
    .from(reservoirEvents)
    .innerJoin(reservoirs, eq(reservoirs.id, reservoirEvents.reservoirId))
    .where(
      and(
        inArray(reservoirEvents.reservoirId, own),
        eq(reservoirEvents.kind, 'online'),
        gt(reservoirEvents.at, from),
        lte(reservoirEvents.at, to),
      ),
    )
    .orderBy(asc(reservoirEvents.at))
    .all();
}
