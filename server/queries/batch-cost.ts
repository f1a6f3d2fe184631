import { eq, max, sql, type SQL } from 'drizzle-orm';
import type { BatchCost } from '../../shared/contracts/costs.ts';
import { costPerLivingFrag } from '../../shared/domain/costing.ts';
import { splitByWeights } from '../../shared/domain/money.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { costMonths, plugs, stockAccounts } from '../db/schema/index.ts';
import { batchPieces } from './batch-pieces.ts';
import { groupBy } from './group-by.ts';

/** A plug's own cost; null where it was lost or culled, because the survivors carry it then. */
export interface PlugCost {
  batchId: string;
  costMicro: number | null;
  limeMicro: number | null;
  batch: BatchCost;
}

const CARRIED_BY_OTHERS = ['lost', 'culled', 'count'];

/**
 * What a batch has cost so far: its own part of the cut's supplies, and its shares of the systems it stood in.
 *
 * The total is divided by all pieces that did not die: those living, and those that left alive (sold, given away, cut
 * again). So the survivors carry what was lost, and each piece that leaves takes one share along.
 *
 * @throws {DomainError} `record.not_found`
 */
export function batchCost(db: Db, batchId: string): BatchCost {
  const [cost] = costsOf(db, sql`b.id = ${batchId}`);
  if (!cost) throw new DomainError('record.not_found', 'This batch is not known.');
  return cost;
}

/** The costs of all batches. */
export function batchCosts(db: Db): BatchCost[] {
  return costsOf(db, sql`1 = 1`);
}

/** @throws {DomainError} `record.not_found` */
export function plugCost(db: Db, code: string): PlugCost {
  const plug = db
    .select({ batchId: plugs.batchId, place: stockAccounts.kind })
    .from(plugs)
    .leftJoin(stockAccounts, eq(stockAccounts.id, plugs.accountId))
    .where(eq(plugs.code, code))
    .get();
  if (!plug) throw new DomainError('record.not_found', 'This plug is not known.');
  const batch = batchCost(db, plug.batchId);
  const isCarried = plug.place !== null && CARRIED_BY_OTHERS.includes(plug.place);
  return {
    batchId: plug.batchId,
    costMicro: isCarried ? null : batch.perLivingMicro,
    limeMicro: isCarried ? null : batch.limePerLivingMicro,
    batch,
  };
}

/** @param chosen condition on `b`, the batch */
function costsOf(db: Db, chosen: SQL): BatchCost[] {
  const asOf =
    db
      .select({ at: max(costMonths.builtAt) })
      .from(costMonths)
      .get()?.at ?? null;
  const pieces = new Map(batchPieces(db, chosen).map((each) => [each.batchId, each]));
  const cutCosts = cutCostByBatch(db, chosen);
  return sharedCosts(db, chosen).map(({ batchId, limeMicro, vinegarMicro, otherMicro, fragDays, leftAlive }) => {
    const { onRacks = 0, bench = 0, picked = 0 } = pieces.get(batchId) ?? {};
    const cutMicro = cutCosts.get(batchId) ?? 0;
    const totalMicro = cutMicro + limeMicro + vinegarMicro + otherMicro;
    const living = onRacks + bench + picked;
    return {
      ...{ batchId, cutMicro, limeMicro, vinegarMicro, otherMicro, totalMicro, living, leftAlive, fragDays, asOf },
      perLivingMicro: costPerLivingFrag(totalMicro, living + leftAlive),
      limePerLivingMicro: costPerLivingFrag(limeMicro, living + leftAlive),
    };
  });
}

interface SharedCost {
  batchId: string;
  limeMicro: number;
  vinegarMicro: number;
  otherMicro: number;
  fragDays: number;
  leftAlive: number;
}

/** Frag-days stand on each part of a system's month alike, so they count once for it. */
function sharedCosts(db: Db, chosen: SQL): SharedCost[] {
  return db.all<SharedCost>(sql`
    WITH chosen AS (SELECT b.id FROM batch AS b WHERE ${chosen}),
    part AS (
      SELECT batch_id,
        sum(cost_micro) FILTER (WHERE part = 'lime') AS lime,
        sum(cost_micro) FILTER (WHERE part = 'vinegar') AS vinegar,
        sum(cost_micro) FILTER (WHERE part = 'other') AS other
      FROM cost_share WHERE batch_id IN (SELECT id FROM chosen) GROUP BY batch_id),
    presence AS (
      SELECT batch_id, sum(days) AS days
      FROM (
        SELECT batch_id, max(frag_days) AS days FROM cost_share
        WHERE batch_id IN (SELECT id FROM chosen) GROUP BY batch_id, month, system_id)
      GROUP BY batch_id),
    departed AS (
      SELECT bal.batch_id, sum(bal.pieces) AS pieces
      FROM stock_balance AS bal JOIN stock_account AS a ON a.id = bal.account_id
      WHERE a.kind IN ('sold', 'given', 'recut') AND bal.batch_id IN (SELECT id FROM chosen)
      GROUP BY bal.batch_id)
    SELECT chosen.id AS batchId,
      coalesce(part.lime, 0) AS limeMicro, coalesce(part.vinegar, 0) AS vinegarMicro,
      coalesce(part.other, 0) AS otherMicro, coalesce(presence.days, 0) AS fragDays,
      coalesce(departed.pieces, 0) AS leftAlive
    FROM chosen
    LEFT JOIN part ON part.batch_id = chosen.id
    LEFT JOIN presence ON presence.batch_id = chosen.id
    LEFT JOIN departed ON departed.batch_id = chosen.id
    ORDER BY chosen.id`);
}

/** What each cut took, shared by pieces where one cut made several batches. */
function cutCostByBatch(db: Db, chosen: SQL): Map<string, number> {
  const rows = db.all<{ cutId: string; batchId: string; pieces: number; costMicro: number }>(sql`
    WITH took AS (
      SELECT cause_id, sum(cost_micro) AS cost FROM consumption
      WHERE cause = 'cut' AND cause_id IN (SELECT b.cut_id FROM batch AS b WHERE ${chosen})
      GROUP BY cause_id)
    SELECT sibling.cut_id AS cutId, sibling.id AS batchId, sibling.pieces, took.cost AS costMicro
    FROM took JOIN batch AS sibling ON sibling.cut_id = took.cause_id
    ORDER BY sibling.cut_id, sibling.created_at, sibling.id`);
  const cuts = groupBy(rows, ({ cutId }) => cutId);
  return new Map([...cuts.values()].flatMap(splitCut));
}

function splitCut(siblings: readonly { batchId: string; pieces: number; costMicro: number }[]): [string, number][] {
  const parts = splitByWeights(
    siblings[0]?.costMicro ?? 0,
    siblings.map(({ pieces }) => pieces),
  );
  return siblings.map(({ batchId }, index) => [batchId, parts[index] ?? 0]);
}
