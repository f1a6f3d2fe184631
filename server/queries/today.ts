import { type Today, TODAY_GROUPS, TODAY_TONES, type TodayEntry } from '../../shared/contracts/today.ts';
import { dayOf } from '../../shared/domain/days.ts';
import { type Access, mayUse, type Role } from '../../shared/permissions.ts';
import type { Db } from '../db/client.ts';
import { quietAlerts } from './alerts.ts';
import { addCounts, BATCH_LIVES, batchStock } from './batch-stock.ts';
import { farmOf } from './farm.ts';
import { orderStates } from './orders.ts';
import { ordersToday } from './today/orders.ts';
import type { TodayContext, TodaySource } from './today/source.ts';
import { stockToday } from './today/stock.ts';
import { suppliesToday } from './today/supplies.ts';
import { tasksToday } from './today/tasks.ts';
import { waterToday } from './today/water.ts';

/** Each area's part, for those who may read the area. */
const SOURCES: readonly { access: Access; source: TodaySource }[] = [
  { access: 'water.read', source: waterToday },
  { access: 'water.read', source: tasksToday },
  { access: 'orders.read', source: ordersToday },
  { access: 'stock.read', source: stockToday },
  { access: 'supplies.read', source: suppliesToday },
];

/**
 * What needs doing on the farm, the most urgent first, as far as this role may see it.
 *
 * @param userId whose own tasks are shown beside those of the role and of anyone
 */
export function todayOf(db: Db, role: Role, now: number, userId = ''): Today {
  const today = dayOf(now, farmOf(db).timeZone);
  const stock = batchStock(db, BATCH_LIVES, today);
  const may = (access: Access) => mayUse(role, access);
  const context: TodayContext = { now, today, stock, may, reader: { userId, role } };
  const { saleable, held } = addCounts(stock);
  return {
    day: today,
    entries: SOURCES.filter(({ access }) => may(access))
      .flatMap(({ source }) => source(db, context))
      .sort(byUrgency),
    frags: { saleable, held },
    quietAlerts: may('water.read') ? quietAlerts(db) : 0,
    boxesToShip: may('orders.read') ? (orderStates(db).packed ?? 0) : null,
  };
}

/** Within a group and tone the order of the sources stays. */
function byUrgency(a: TodayEntry, b: TodayEntry): number {
  return (
    TODAY_GROUPS.indexOf(a.group) - TODAY_GROUPS.indexOf(b.group) ||
    TODAY_TONES.indexOf(a.tone) - TODAY_TONES.indexOf(b.tone)
  );
}
