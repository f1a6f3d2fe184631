import { and, eq, isNotNull, ne, sql, sum } from 'drizzle-orm';
import type { BatchCost, CostOverview, LineCost, SystemMonth } from '../../shared/contracts/costs.ts';
import { costPerLivingFrag } from '../../shared/domain/costing.ts';
import type { Db } from '../db/client.ts';
import { batches, consumptions, items, lines, systems } from '../db/schema/index.ts';
import { batchCosts } from './batch-cost.ts';
import { COST_PARTS, costPools, farmMonths, type CostPool } from './cost-pools.ts';
import { groupBy } from './group-by.ts';

/** Cost of a living frag for the farm and each line, and what each system cost each month. */
export function costOverview(db: Db, now: number, timeZone: string): CostOverview {
  const costs = batchCosts(db);
  return {
    asOf: costs[0]?.asOf ?? null,
    ...carriedBy(costs),
    used: usedByKind(db),
    lines: lineCosts(db, costs),
    months: systemMonths(db, now, timeZone),
  };
}

/** Lines with anything that lives or has cost, the dearest frag first. */
function lineCosts(db: Db, costs: readonly BatchCost[]): LineCost[] {
  const lineOf = new Map(
    db
      .select({ id: batches.id, lineId: batches.lineId })
      .from(batches)
      .all()
      .map(({ id, lineId }) => [id, lineId]),
  );
  const byLine = groupBy(costs, ({ batchId }) => lineOf.get(batchId));
  return db
    .select({ lineId: lines.id, code: lines.code, tradeName: lines.tradeName })
    .from(lines)
    .all()
    .flatMap((line) => {
      const own = (byLine.get(line.lineId) ?? []).filter(({ living, totalMicro }) => living > 0 || totalMicro > 0);
      if (own.length === 0) return [];
      const totalMicro = own.reduce((sum, cost) => sum + cost.totalMicro, 0);
      return [{ ...line, batches: own.length, totalMicro, ...carriedBy(own) }];
    })
    .sort((a, b) => (b.perLivingMicro ?? -1) - (a.perLivingMicro ?? -1) || a.code.localeCompare(b.code));
}

type Carried = Extract<keyof LineCost, `${string}erLivingMicro`>;

/** What the living pieces of batches carry, on average. */
function carriedBy(costs: readonly BatchCost[]): { living: number } & Pick<LineCost, Carried> {
  const living = costs.reduce((sum, cost) => sum + cost.living, 0);
  const mean = (of: (cost: BatchCost) => number | null) =>
    living > 0 ? Math.round(costs.reduce((sum, cost) => sum + (of(cost) ?? 0) * cost.living, 0) / living) : null;
  return {
    living,
    perLivingMicro: mean((cost) => cost.perLivingMicro),
    limePerLivingMicro: mean((cost) => cost.limePerLivingMicro),
    vinegarPerLivingMicro: mean((cost) => costPerLivingFrag(cost.vinegarMicro, cost.living + cost.leftAlive)),
    cutPerLivingMicro: mean((cost) => costPerLivingFrag(cost.cutMicro, cost.living + cost.leftAlive)),
    otherPerLivingMicro: mean((cost) => costPerLivingFrag(cost.otherMicro, cost.living + cost.leftAlive)),
  };
}

/** Of all time, so that one large water change does not tell the story. */
function usedByKind(db: Db): CostOverview['used'] {
  return db
    .select({ kind: items.kind, costMicro: sum(consumptions.costMicro).mapWith(Number) })
    .from(consumptions)
    .innerJoin(items, eq(items.id, consumptions.itemId))
    .where(and(isNotNull(consumptions.systemId), ne(consumptions.cause, 'cut')))
    .groupBy(items.kind)
    .all()
    .filter(({ costMicro }) => costMicro > 0)
    .sort((a, b) => b.costMicro - a.costMicro);
}

/** Newest month first. */
function systemMonths(db: Db, now: number, timeZone: string): SystemMonth[] {
  const names = new Map(
    db
      .select({ id: systems.id, code: systems.code, name: systems.name })
      .from(systems)
      .all()
      .map((system) => [system.id, system]),
  );
  const shared = sharedByMonth(db);
  const pools = groupBy(costPools(db, farmMonths(db, now, timeZone)), keyOf);
  return [...pools]
    .map(([key, own]) => {
      const { month = '', systemId = '' } = own[0] ?? {};
      const { costMicro, fragDays } = shared.get(key) ?? { costMicro: 0, fragDays: 0 };
      const [limeMicro, vinegarMicro, otherMicro] = COST_PARTS.map((part) => sumOf(own, part)) as [
        number,
        number,
        number,
      ];
      const totalMicro = limeMicro + vinegarMicro + otherMicro;
      const { code: systemCode = '', name: systemName = '' } = names.get(systemId) ?? {};
      return {
        ...{ month, systemId, systemCode, systemName, limeMicro, vinegarMicro, otherMicro, totalMicro, fragDays },
        unsharedMicro: totalMicro - costMicro,
      };
    })
    .sort((a, b) => b.month.localeCompare(a.month) || a.systemCode.localeCompare(b.systemCode));
}

function sharedByMonth(db: Db): Map<string, { costMicro: number; fragDays: number }> {
  const rows = db.all<{ month: string; systemId: string; costMicro: number; fragDays: number }>(sql`
    SELECT month, system_id AS systemId, sum(cost) AS costMicro, sum(days) AS fragDays
    FROM (
      SELECT month, system_id, batch_id, sum(cost_micro) AS cost, max(frag_days) AS days
      FROM cost_share GROUP BY month, system_id, batch_id)
    GROUP BY month, system_id`);
  return new Map(rows.map((row) => [keyOf(row), row]));
}

function keyOf({ month, systemId }: { month: string; systemId: string }): string {
  return `${month} ${systemId}`;
}

function sumOf(pools: readonly CostPool[], part: CostPool['part']): number {
  return pools.reduce((sum, pool) => (pool.part === part ? sum + pool.costMicro : sum), 0);
}
