import { desc, eq } from 'drizzle-orm';
import { MICRO_PER_MAJOR, minorDigits } from '../../shared/domain/money.ts';
import type { Db } from '../db/client.ts';
import { lots } from '../db/schema/index.ts';
import { farmOf } from './farm.ts';

/** What one unit of an item cost at its last receipt, micro-units; null where none was received or it cost nothing. */
export function priceOf(db: Db, itemId: string): number | null {
  const lot = db
    .select({ costMinor: lots.costMinor, quantity: lots.quantity })
    .from(lots)
    .where(eq(lots.itemId, itemId))
    .orderBy(desc(lots.receivedOn), desc(lots.createdAt))
    .limit(1)
    .get();
  if (!lot || lot.costMinor === 0) return null;
  const microPerMinor = MICRO_PER_MAJOR / 10 ** minorDigits(farmOf(db).currency);
  return (lot.costMinor * microPerMinor) / lot.quantity;
}
