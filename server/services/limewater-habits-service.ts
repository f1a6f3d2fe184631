import { eq } from 'drizzle-orm';
import type { ChangeLimewaterHabits, LimewaterHabits } from '../../shared/contracts/limewater-habits.ts';
import { farms } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { farmOf } from '../queries/farm.ts';
import { limewaterHabits } from '../queries/limewater-habits.ts';

/** Keeps what the farm measured. Its version stays: nobody edits these on the farm's settings page. */
export function changeLimewaterHabits(write: Write, change: ChangeLimewaterHabits): LimewaterHabits {
  const row = farmOf(write.tx);
  const before = limewaterHabits(row);
  const after = { spoonG: change.spoonG ?? before.spoonG, freshMsCm: change.freshMsCm ?? before.freshMsCm };
  const settings = { ...row.settings, limeSpoon: after.spoonG, freshLimewaterMsCm: after.freshMsCm };
  write.tx.update(farms).set({ settings }).where(eq(farms.id, row.id)).run();
  write.audit({ action: 'farm.limewater_habits_changed', entity: 'farm', entityId: String(row.id), before, after });
  return after;
}
