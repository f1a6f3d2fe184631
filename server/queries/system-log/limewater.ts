import { and, desc, eq, inArray, lt } from 'drizzle-orm';
import type { TodayText } from '../../../shared/contracts/today.ts';
import { overfills, reservoirEvents, reservoirs } from '../../db/schema/index.ts';
import { reservoirsOfSystem } from '../reservoir-feeds.ts';
import type { LogSource } from './source.ts';

type EventRow = typeof reservoirEvents.$inferSelect;

const litres = (value: number): TodayText[number] => ({ quantity: 'volume', value });

const EVENT_WORDS: Record<EventRow['kind'], (event: EventRow) => TodayText> = {
  refill: ({ limeG, vinegarMl, waterL, alkalinityMeqL }) => [
    ` mixed: ${Math.round(limeG ?? 0)} g lime`,
    (vinegarMl ?? 0) > 0 ? ` and ${Math.round(vinegarMl ?? 0)} mL vinegar` : '',
    ' in ',
    litres(waterL ?? 0),
    `, ${alkalinityMeqL.toFixed(1)} meq/L`,
  ],
  level: ({ levelL }) => [' stands at ', litres(levelL)],
  online: ({ levelL }) => [' put online with ', litres(levelL)],
  offline: ({ levelL }) => [' taken off with ', litres(levelL), ' left'],
  topped_up: ({ waterL }) => [' topped up with ', litres(waterL ?? 0), ' of plain water'],
  strength: ({ strengthLeft }) => [` checked: ${Math.round((strengthLeft ?? 0) * 100)} % of its strength left`],
  sludge_removed: () => [': sludge taken out'],
  spent: () => [' marked spent'],
  cleaned: () => [' emptied and cleaned'],
};

const eventLog: LogSource = {
  subject: 'limewater',
  read: (db, { id: systemId }, { before, limit }) =>
    db
      .select({ event: reservoirEvents, code: reservoirs.code })
      .from(reservoirEvents)
      .innerJoin(reservoirs, eq(reservoirs.id, reservoirEvents.reservoirId))
      .where(
        and(
          inArray(
            reservoirEvents.reservoirId,
            reservoirsOfSystem(db, systemId).map(({ id }) => id),
          ),
          lt(reservoirEvents.at, before),
        ),
      )
      .orderBy(desc(reservoirEvents.at))
      .limit(limit)
      .all()
      .map(({ event, code }) => ({
        ...{ id: `reservoir ${event.id}`, subject: 'limewater', at: event.at, by: event.by, note: event.note },
        title: [code, ...EVENT_WORDS[event.kind](event)],
        reservoirId: event.reservoirId,
      })),
};

/** Where the levels of an overfill were taken back, so was the overfill. */
const overfillLog: LogSource = {
  subject: 'limewater',
  read: (db, { id: systemId }, { before, limit }) =>
    db
      .select({ overfill: overfills, code: reservoirs.code })
      .from(overfills)
      .innerJoin(reservoirs, eq(reservoirs.id, overfills.reservoirId))
      .innerJoin(reservoirEvents, eq(reservoirEvents.id, overfills.eventId))
      .where(and(eq(overfills.systemId, systemId), lt(overfills.at, before)))
      .orderBy(desc(overfills.at))
      .limit(limit)
      .all()
      .map(({ overfill: { id, at, by, note, reservoirId, litres: ran }, code }) => ({
        ...{ id: `overfill ${id}`, subject: 'limewater', at, by, note, reservoirId },
        title: ['Overfill: ', litres(ran), ` of ${code} ran in at once`],
      })),
};

export const limewaterLogs: readonly LogSource[] = [eventLog, overfillLog];
