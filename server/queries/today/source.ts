import type { TodayEntry } from '../../../shared/contracts/today.ts';
import type { Day } from '../../../shared/domain/days.ts';
import type { Access } from '../../../shared/permissions.ts';
import type { Db } from '../../db/client.ts';
import type { BatchStock } from '../batch-stock.ts';
import type { TaskReader } from '../tasks.ts';

export interface TodayContext {
  now: number;
  today: Day;
  /** Whose tasks are shown. */
  reader: TaskReader;
  /** Stock of every batch with living pieces. */
  stock: readonly BatchStock[];
  /** Whether the reader may do something; who may not is shown it, but not asked to do it. */
  may: (access: Access) => boolean;
}

/** What of one area needs doing. */
export type TodaySource = (db: Db, context: TodayContext) => TodayEntry[];

/** The act of an entry: what the reader may do there, or a look at it. */
export function actOf(context: TodayContext, access: Access, label: string, to: string, seeAt = to): TodayEntry['act'] {
  return context.may(access) ? { label, to } : { label: 'See', to: seeAt };
}
