import { sql } from 'drizzle-orm';
import type { LossPatterns } from '../../shared/contracts/stock.ts';
import { addDays, dayOf, daysBetween, type Day } from '../../shared/domain/days.ts';
import { groupBy } from '../../shared/domain/group-by.ts';
import { lossOdds } from '../../shared/domain/loss-patterns.ts';
import { lossRates, type Life } from '../../shared/domain/loss-rates.ts';
import type { Db } from '../db/client.ts';
import { farmOf } from './farm.ts';
import { plugFates, type PlugFate } from './plug-fates.ts';
import { lineNames, systemNames } from './stock-names.ts';

const PERIOD_DAYS = 28;
const LOOK_BACK_DAYS = 3 * 365;
/** Of what is pointed out, at most one in twenty is expected to be chance. */
const FALSE_FINDINGS = 0.05;
/** Fewer losses are not a run, whatever their odds (common practice, no source). */
const LEAST_LOST = 3;

type Part = Pick<LossPatterns['patterns'][number], 'kind' | 'label'>;

/** One plug of the period: whether it was lost in it, and how many losses its line and age let expect. */
interface Exposed extends Pick<PlugFate, 'lineId' | 'cutter' | 'systemId'> {
  lost: boolean;
  expected: number;
}

/** Systems, lines and cutters that lost unusually many plugs in the last four weeks, strongest first. */
export function lossPatterns(db: Db, now: number): LossPatterns {
  const { timeZone } = farmOf(db);
  const today = dayOf(now, timeZone);
  const since = addDays(today, -PERIOD_DAYS);
  const fates = plugFates(db, sql`b.cut_on >= ${addDays(today, -LOOK_BACK_DAYS)}`, today, timeZone);
  const parts = partsOf(db, exposedSince(fates, since));
  const odds = lossOdds(parts);
  const patterns = parts
    .map((part, index) => ({ ...part, p: odds[index]?.p ?? 1, q: odds[index]?.q ?? 1 }))
    .filter(({ q, lost }) => q <= FALSE_FINDINGS && lost >= LEAST_LOST)
    .sort((a, b) => a.p - b.p);
  return { days: PERIOD_DAYS, compared: parts.length, patterns };
}

/** What is expected comes from before the period, so that a bad month is not measured by itself. */
function exposedSince(fates: readonly PlugFate[], since: Day): Exposed[] {
  const rates = lossRates(fates.flatMap((fate) => lifeBefore(fate, daysBetween(fate.cutOn, since))));
  return fates.flatMap((fate) => {
    const fromDay = Math.max(0, daysBetween(fate.cutOn, since));
    if (fate.day < fromDay) return [];
    const { lineId, cutter, systemId, lost } = fate;
    return [{ lineId, cutter, systemId, lost, expected: rates.expected(lineId, fromDay, fate.day) }];
  });
}

function lifeBefore({ lineId, day, lost }: PlugFate, ageThen: number): Life[] {
  if (ageThen <= 0) return [];
  return [{ line: lineId, fromDay: 0, toDay: Math.min(day, ageThen), lost: lost && day < ageThen }];
}

function partsOf(db: Db, exposed: readonly Exposed[]) {
  const [systems, lines] = [systemNames(db), lineNames(db)];
  const placed = exposed.filter(({ systemId }) => systemId !== null);
  return [
    ...counted('system', placed, ({ systemId }) => systems.get(systemId ?? '') ?? ''),
    ...counted('line', exposed, ({ lineId }) => lines.get(lineId) ?? ''),
    ...counted('cutter', exposed, ({ cutter }) => cutter),
  ];
}

function counted(kind: Part['kind'], exposed: readonly Exposed[], labelOf: (plug: Exposed) => string) {
  return [...groupBy(exposed, labelOf)].map(([label, plugs]) => ({
    ...{ kind, label, plugs: plugs.length },
    lost: plugs.filter(({ lost }) => lost).length,
    expected: plugs.reduce((sum, plug) => sum + plug.expected, 0),
  }));
}
