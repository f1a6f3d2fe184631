import { and, eq, gte, min, sql } from 'drizzle-orm';
import { DomainError } from '../../shared/errors.ts';
import { consumptions, lots, supplyCounts } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';

type ConsumptionRow = typeof consumptions.$inferSelect;

/**
 * Puts back into its lots exactly what a mistaken act took, amount and cost, as if it had never been.
 *
 * Only clean while nobody has counted the item since: a count has then already put right what the mistake took.
 *
 * @param instead what to do where it is not clean
 * @throws {DomainError} `rule.refused`
 */
export function returnSupply(write: Write, cause: ConsumptionRow['cause'], causeId: string, instead: string): void {
  const ofAct = and(eq(consumptions.cause, cause), eq(consumptions.causeId, causeId));
  assertNotCountedSince(write, ofAct, instead);
  const taken = write.tx.delete(consumptions).where(ofAct).returning().all();
  for (const { lotId, quantity, costMicro } of taken) {
    write.tx
      .update(lots)
      .set({
        // Rounding of the stored amount must not fill a lot beyond what was received.
        remaining: sql`min(${lots.quantity}, ${lots.remaining} + ${quantity})`,
        remainingMicro: sql`${lots.remainingMicro} + ${costMicro}`,
      })
      .where(eq(lots.id, lotId))
      .run();
  }
  if (taken.length > 0) write.audit({ action: 'supply.returned', entity: cause, entityId: causeId, before: taken });
}

function assertNotCountedSince({ tx }: Write, ofAct: ReturnType<typeof and>, instead: string): void {
  const taken = tx
    .select({ itemId: consumptions.itemId, at: min(consumptions.at) })
    .from(consumptions)
    .where(ofAct)
    .groupBy(consumptions.itemId)
    .all();
  for (const { itemId, at } of taken) {
    const counted = tx
      .select({ id: supplyCounts.id })
      .from(supplyCounts)
      .where(and(eq(supplyCounts.itemId, itemId), gte(supplyCounts.at, at ?? 0)))
      .get();
    if (counted) throw new DomainError('rule.refused', `Its supplies were counted since. ${instead}`);
  }
}
