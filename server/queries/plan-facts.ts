import { and, asc, eq, gt, inArray, max } from 'drizzle-orm';
import { MS_PER_DAY } from '../../shared/domain/days.ts';
import type { AdviceFacts } from '../../shared/domain/dosing-plan/facts.ts';
import type { WaterRules } from '../../shared/domain/dosing-plan/rules.ts';
import { REACH_95 } from '../../shared/domain/demand/track-demand.ts';
import { USUAL_ACID_PERCENT, USUAL_LIME_PURITY } from '../../shared/domain/limewater.ts';
import { steadiness } from '../../shared/domain/steady-test.ts';
import type { Db } from '../db/client.ts';
import { dosingRates, reservoirEvents } from '../db/schema/index.ts';
import { carriedNow, evaporationOf } from './carried.ts';
import { trackSystem, type SystemTrack } from './demand-track.ts';
import { overfillsSince } from './overfills.ts';
import { priceOf } from './plan-prices.ts';
import { runningPlan, type PlanRow } from './plan-rows.ts';
import { reservoirsOfSystem } from './reservoir-feeds.ts';
import { systemWater } from './system-water.ts';
import { bandsOf, type SystemRow } from './systems.ts';
import { listWaterItems } from './water-items.ts';

const USUAL_WATER_C = 25;
/** A strength that differs by more than this part is another one: a spoon of powder is not that exact. */
const SAME_STRENGTH = 0.08;
const CHANGES_LOOK_BACK_DAYS = 60;

/** All that advice on a system's dosing is based on, as things stand. */
export function planFacts(db: Db, system: SystemRow, rules: WaterRules, now: number): AdviceFacts {
  const found = trackSystem(db, system, { now });
  const supply = withoutOverfills(db, system, found, now);
  const { parts, water } = systemWater(db, system.id, now);
  const band = bandsOf(db, system.id).find(({ parameter }) => parameter === 'alkalinity');
  const { demand, trusted } = found;
  const plan = runningPlan(db, system.id);
  const tests = trusted.flatMap(({ reading }) => (reading ? [reading] : []));
  const { windowDays, tolerance } = { windowDays: rules.steadyDays, tolerance: rules.steadyToleranceMeqL };
  const changedAt = lastChange(db, system.id, now);
  return {
    netVolumeL: system.netVolumeL,
    band: band ? { low: band.low, high: band.high } : null,
    level: levelNow(found),
    demand: demand.enough ? { meqLPerDay: demand.demand, low: demand.low, high: demand.high } : null,
    given: carriedNow(system, supply, now),
    steady: steadiness(tests, now, { windowDays, tolerance }),
    testsSinceChange: tests.filter(({ at }) => at > changedAt).length,
    water: { ...water, alkalinityMeqL: levelNow(found)?.meqL ?? water.alkalinityMeqL },
    assumed: parts.filter(({ takenAt }) => takenAt === null).map(({ field }) => field),
    evaporationLPerDay: evaporationOf(supply, now),
    ...means(db, system.id, supply.strengthMeqL),
    plan: plan ? { strengthMeqL: plan.strengthMeqL, mixed: isMixed(db, system.id, plan) } : null,
  };
}

/** The level that the tests tell for now; null where none tells. */
function levelNow({ track, trusted, now }: SystemTrack): AdviceFacts['level'] {
  const at = track.points.findLast((point) => point.at <= now);
  const isFresh = trusted.some((test) => test.at > now - 7 * MS_PER_DAY);
  return at && isFresh ? { meqL: at.level.value, error: REACH_95 * at.level.sd } : null;
}

/** What ran in by mistake is no evaporation. */
function withoutOverfills(db: Db, system: SystemRow, { supply }: SystemTrack, now: number): SystemTrack['supply'] {
  const ends = new Set(overfillsSince(db, system.id, now - 14 * MS_PER_DAY).map(({ at }) => at));
  return ends.size === 0 ? supply : { ...supply, use: supply.use.filter(({ to }) => !ends.has(to)) };
}

/** What the farm's supplies and the system's reservoirs can bring. */
function means(db: Db, systemId: string, onlineMeqL: number | null): Pick<AdviceFacts, 'limewater' | 'supplements'> {
  const waterItems = listWaterItems(db);
  const lime = waterItems.find(({ kind }) => kind === 'lime');
  const vinegar = waterItems.find(({ kind }) => kind === 'vinegar');
  const reservoirIds = reservoirsOfSystem(db, systemId).map(({ id }) => id);
  const limewater = {
    ...{ onlineMeqL, temperatureC: lastMixTemperature(db, reservoirIds) },
    purity: lime?.strength ?? USUAL_LIME_PURITY,
    acidPercent: vinegar ? (vinegar.strength ?? USUAL_ACID_PERCENT) : null,
    limeCost: lime ? priceOf(db, lime.id) : null,
    vinegarCost: vinegar ? priceOf(db, vinegar.id) : null,
  };
  return {
    limewater: reservoirIds.length > 0 ? limewater : null,
    supplements: waterItems
      .filter(({ kind }) => kind === 'supplement')
      .map(({ id, name, unit, strength, calciumMg }) => ({
        ...{ itemId: id, name, unit, alkalinityMeq: strength ?? 0, calciumMg: calciumMg ?? 0, cost: priceOf(db, id) },
      })),
  };
}

function lastMixTemperature(db: Db, reservoirIds: string[]): number {
  const mixes = db
    .select({ at: reservoirEvents.at, temperatureC: reservoirEvents.temperatureC })
    .from(reservoirEvents)
    .where(and(inArray(reservoirEvents.reservoirId, reservoirIds), eq(reservoirEvents.kind, 'refill')))
    .orderBy(asc(reservoirEvents.at))
    .all();
  return mixes.at(-1)?.temperatureC ?? USUAL_WATER_C;
}

/** When the dosing last changed: another strength came online, or a running dose began or ended. Zero: not lately. */
function lastChange(db: Db, systemId: string, now: number): number {
  const rates = db
    .select({ began: max(dosingRates.fromAt), ended: max(dosingRates.toAt) })
    .from(dosingRates)
    .where(eq(dosingRates.systemId, systemId))
    .get();
  return Math.max(strengthChangedAt(db, systemId, now), rates?.began ?? 0, rates?.ended ?? 0);
}

function strengthChangedAt(db: Db, systemId: string, now: number): number {
  const reservoirIds = reservoirsOfSystem(db, systemId).map(({ id }) => id);
  if (reservoirIds.length === 0) return 0;
  const online = db
    .select({ at: reservoirEvents.at, meqL: reservoirEvents.alkalinityMeqL })
    .from(reservoirEvents)
    .where(
      and(
        inArray(reservoirEvents.reservoirId, reservoirIds),
        eq(reservoirEvents.kind, 'online'),
        gt(reservoirEvents.at, now - CHANGES_LOOK_BACK_DAYS * MS_PER_DAY),
      ),
    )
    .orderBy(asc(reservoirEvents.at))
    .all();
  const changed = online.findLast(({ meqL }, index) => {
    const before = online[index - 1];
    return before !== undefined && Math.abs(meqL - before.meqL) > SAME_STRENGTH * before.meqL;
  });
  return changed?.at ?? 0;
}

/** A plan is under way once limewater was mixed after it was decided; one without limewater needs none. */
function isMixed(db: Db, systemId: string, plan: PlanRow): boolean {
  if (plan.limeGPerL === 0) return true;
  const reservoirIds = reservoirsOfSystem(db, systemId).map(({ id }) => id);
  const mix = db
    .select({ id: reservoirEvents.id })
    .from(reservoirEvents)
    .where(
      and(
        inArray(reservoirEvents.reservoirId, reservoirIds),
        eq(reservoirEvents.kind, 'refill'),
        gt(reservoirEvents.at, plan.fromAt),
      ),
    )
    .limit(1)
    .get();
  return mix !== undefined;
}
