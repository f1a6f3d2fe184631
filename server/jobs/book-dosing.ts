import { farms } from '../db/schema/index.ts';
import { inWrite, SYSTEM } from '../db/write.ts';
import type { Deps } from '../deps.ts';
import { bookDosing } from '../services/dosing-bookings.ts';

/** Takes from the supplies what steady dosing used on the days that are over. */
export function bookDosingDays(deps: Deps): void {
  const isSetUp = deps.db.select({ id: farms.id }).from(farms).get() !== undefined;
  if (isSetUp) inWrite(deps, SYSTEM, bookDosing);
}
