import { sql } from 'drizzle-orm';
import type { SurvivalBy, SurvivalGroups } from '../../shared/contracts/stock.ts';
import { wilsonInterval } from '../../shared/domain/binomial.ts';
import { addDays, dayOf, monthOf } from '../../shared/domain/days.ts';
import { groupBy } from '../../shared/domain/group-by.ts';
import { logRank } from '../../shared/domain/log-rank.ts';
import { LOSS_CAUSES } from '../../shared/domain/losses.ts';
import { survivalCurve, type FollowedPlug } from '../../shared/domain/survival.ts';
import type { Db } from '../db/client.ts';
import { farmOf } from './farm.ts';
import { plugFates, type PlugFate } from './plug-fates.ts';
import { lineNames, systemNames } from './stock-names.ts';

/** Cuts this old say little of how the farm works today. */
const LOOK_BACK_DAYS = 3 * 365;
const SEASONS = ['January to March', 'April to June', 'July to September', 'October to December'];

interface Group {
  label: string;
  plugs: FollowedPlug[];
}

/** The survivors' curves of the farm's plugs by line, cause of loss, cutter, system or season of the cut. */
export function survivalGroups(db: Db, by: SurvivalBy, now: number): SurvivalGroups {
  const { timeZone } = farmOf(db);
  const today = dayOf(now, timeZone);
  const fates = plugFates(db, sql`b.cut_on >= ${addDays(today, -LOOK_BACK_DAYS)}`, today, timeZone);
  const groups = by === 'cause' ? causesOf(fates) : partsOf(db, fates, by);
  const test = by === 'cause' ? null : logRank(groups.map(({ plugs }) => plugs));
  return {
    groups: groups.map(toGroup).sort((a, b) => b.lost / b.plugs - a.lost / a.plugs || a.label.localeCompare(b.label)),
    logRank: test && { chiSquare: test.chiSquare, degreesOfFreedom: test.degreesOfFreedom, p: test.p },
  };
}

function toGroup({ label, plugs }: Group): SurvivalGroups['groups'][number] {
  const lost = plugs.filter((plug) => plug.lost).length;
  return {
    label,
    plugs: plugs.length,
    lost,
    lostShare: wilsonInterval(lost, plugs.length),
    steps: survivalCurve(plugs),
  };
}

function partsOf(db: Db, fates: readonly PlugFate[], by: Exclude<SurvivalBy, 'cause'>): Group[] {
  const nameOf = nameGiver(db, by);
  return [...groupBy(fates, nameOf)].map(([label, plugs]) => ({ label, plugs }));
}

function nameGiver(db: Db, by: Exclude<SurvivalBy, 'cause'>): (fate: PlugFate) => string {
  if (by === 'cutter') return ({ cutter }) => cutter;
  if (by === 'season') return ({ cutOn }) => SEASONS[Math.floor((Number(monthOf(cutOn).slice(5)) - 1) / 3)] ?? '';
  if (by === 'line') {
    const names = lineNames(db);
    return ({ lineId }) => names.get(lineId) ?? '';
  }
  const names = systemNames(db);
  return ({ systemId }) => (systemId === null ? 'Never placed' : (names.get(systemId) ?? ''));
}

/** Of each cause all plugs are at risk; one lost by another cause was followed until then. */
function causesOf(fates: readonly PlugFate[]): Group[] {
  const causes = [...new Set(fates.flatMap(({ cause }) => cause ?? []))];
  return causes.map((cause) => ({
    label: LOSS_CAUSES.find(({ code }) => code === cause)?.label ?? 'Culled',
    plugs: fates.map((fate) => ({ day: fate.day, lost: fate.cause === cause })),
  }));
}
