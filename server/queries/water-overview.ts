import { asc, isNull } from 'drizzle-orm';
import type { ResponseOf } from '../../shared/contracts/endpoint.ts';
import { TODAY_GROUPS } from '../../shared/contracts/today.ts';
import type { SystemGlance } from '../../shared/contracts/water.ts';
import type { WaterSystem, waterOverviewEndpoints } from '../../shared/contracts/water-overview.ts';
import { MS_PER_DAY } from '../../shared/domain/days.ts';
import { groupBy } from '../../shared/domain/group-by.ts';
import { thinSeries } from '../../shared/domain/thin-series.ts';
import { byUrgency, type LevelFacts } from '../../shared/domain/water-urgency.ts';
import type { Db } from '../db/client.ts';
import { systems } from '../db/schema/index.ts';
import { openAlerts } from './alerts.ts';
import { readingsBetween } from './readings.ts';
import { glanceOf } from './water.ts';

const RECENT_DAYS = 30;
const RECENT_POINTS = 60;
const WITHOUT_ALERT = TODAY_GROUPS.length;

/** Every system that is in use at a glance, the most urgent first. */
export function waterOverview(db: Db, now: number): ResponseOf<typeof waterOverviewEndpoints.show> {
  const from = now - RECENT_DAYS * MS_PER_DAY;
  const unknown = openAlerts(db, now).filter(({ acknowledgedAt }) => acknowledgedAt === null);
  const alertsOf = groupBy(unknown, ({ systemId }) => systemId);
  const rows = db.select().from(systems).where(isNull(systems.retiredAt)).orderBy(asc(systems.code)).all();
  const items = rows.map((row): WaterSystem => ({
    ...glanceOf(db, row, now),
    recent: thinSeries(readingsBetween(db, row.id, 'alkalinity', from, now), RECENT_POINTS).map(({ at, value }) => ({
      ...{ at, value },
    })),
    alerts: (alertsOf.get(row.id) ?? []).sort((a, b) => rankOf(a) - rankOf(b)),
  }));
  // Sorting is stable: where nothing tells two apart, the order of their codes stays.
  return {
    from,
    to: now,
    items: items.sort((a, b) => firstRank(a) - firstRank(b) || byUrgency(factsOf(a), factsOf(b))),
  };
}

function rankOf({ urgency }: WaterSystem['alerts'][number]): number {
  return TODAY_GROUPS.indexOf(urgency);
}

function firstRank({ alerts: [first] }: WaterSystem): number {
  return first ? rankOf(first) : WITHOUT_ALERT;
}

/** Null where alkalinity was never tested. */
function factsOf({ latest, demand, carried }: SystemGlance): LevelFacts | null {
  const alkalinity = latest.find(({ parameter }) => parameter === 'alkalinity');
  if (!alkalinity) return null;
  const isKnown = demand.enough && carried.limewater !== null;
  const given = (carried.limewater ?? 0) + carried.others + carried.waterChanges;
  return {
    ...{ level: alkalinity.value, band: alkalinity.band },
    changePerDay: isKnown ? given - demand.demand : null,
  };
}
