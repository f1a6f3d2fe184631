import type { LimewaterHabits } from '../../shared/contracts/limewater-habits.ts';
import type { FarmRow } from './farm.ts';

/** What the farm measured of its limewater work, from its settings `limeSpoon` (g) and `freshLimewaterMsCm`. */
export function limewaterHabits({ settings }: Pick<FarmRow, 'settings'>): LimewaterHabits {
  return { spoonG: positive(settings.limeSpoon), freshMsCm: positive(settings.freshLimewaterMsCm) };
}

function positive(value: unknown): number | null {
  return typeof value === 'number' && value > 0 ? value : null;
}
