import { and, eq } from 'drizzle-orm';
import { consumptions } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';

type ConsumptionRow = typeof consumptions.$inferSelect;

/**
 * Moves a part of what was taken from lots from one cause to another, such as the salt of new water when it goes into
 * a system. Lots stay as they are; amount and cost add up to what they were, to the last unit.
 *
 * @param part above 0 up to 1 of what stands with the first cause now
 */
export function moveUse(
  write: Write,
  from: Pick<ConsumptionRow, 'cause' | 'causeId'>,
  to: Pick<ConsumptionRow, 'cause' | 'causeId' | 'systemId' | 'at'>,
  part: number,
): void {
  const ofCause = and(eq(consumptions.cause, from.cause), eq(consumptions.causeId, from.causeId));
  for (const row of write.tx.select().from(consumptions).where(ofCause).all()) {
    const quantity = row.quantity * part;
    const costMicro = Math.round(row.costMicro * part);
    const rest = { quantity: row.quantity - quantity, costMicro: row.costMicro - costMicro };
    const isRow = eq(consumptions.id, row.id);
    if (rest.quantity > 0) write.tx.update(consumptions).set(rest).where(isRow).run();
    else write.tx.delete(consumptions).where(isRow).run();
    addTo(write, row, to, { quantity, costMicro });
  }
}

/** To the row of the same lot where there is one, so that moving there and back leaves what was. */
function addTo(
  write: Write,
  { itemId, lotId, by }: ConsumptionRow,
  to: Pick<ConsumptionRow, 'cause' | 'causeId' | 'systemId' | 'at'>,
  moved: { quantity: number; costMicro: number },
): void {
  const same = and(
    eq(consumptions.cause, to.cause),
    eq(consumptions.causeId, to.causeId),
    eq(consumptions.lotId, lotId),
  );
  const there = write.tx.select().from(consumptions).where(same).get();
  if (!there) {
    write.tx
      .insert(consumptions)
      .values({ id: write.newId(), itemId, lotId, by, ...to, ...moved })
      .run();
    return;
  }
  const sum = { quantity: there.quantity + moved.quantity, costMicro: there.costMicro + moved.costMicro };
  write.tx.update(consumptions).set(sum).where(eq(consumptions.id, there.id)).run();
}
