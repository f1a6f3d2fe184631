import { and, asc, desc, eq, inArray, lt } from 'drizzle-orm';
import type { LogEntry } from '../../../shared/contracts/system-log.ts';
import type { TodayText } from '../../../shared/contracts/today.ts';
import { groupBy } from '../../../shared/domain/group-by.ts';
import { PARAMETERS } from '../../../shared/domain/units.ts';
import { readings } from '../../db/schema/index.ts';
import type { LogSource } from './source.ts';

type ReadingRow = typeof readings.$inferSelect;

/** What was tested at one time is one entry. */
export const readingLog: LogSource = {
  subject: 'readings',
  read: (db, { id }, { before, limit }) => {
    const times = db
      .selectDistinct({ at: readings.takenAt })
      .from(readings)
      .where(and(eq(readings.systemId, id), lt(readings.takenAt, before)))
      .orderBy(desc(readings.takenAt))
      .limit(limit)
      .all()
      .map(({ at }) => at);
    const rows = db
      .select()
      .from(readings)
      .where(and(eq(readings.systemId, id), inArray(readings.takenAt, times)))
      .orderBy(desc(readings.takenAt), asc(readings.id))
      .all();
    return [...groupBy(rows, ({ takenAt }) => takenAt).values()].map(toEntry);
  },
};

function toEntry(rows: ReadingRow[]): LogEntry {
  const [first] = rows;
  const tested = PARAMETERS.flatMap(({ code, label }) =>
    rows.filter(({ parameter }) => parameter === code).map(({ value }) => ({ code, label, value })),
  );
  return {
    ...{ id: `readings ${first?.id ?? ''}`, subject: 'readings', at: first?.takenAt ?? 0, by: first?.by ?? '' },
    title: tested.flatMap(({ code, label, value }, index): TodayText => [
      index === 0 ? `${label} ` : `, ${label === 'pH' ? label : label.toLowerCase()} `,
      { quantity: code, value },
    ]),
    note: [...new Set(rows.flatMap(({ method, note }) => [method, note]))].filter(Boolean).join('; '),
    reservoirId: null,
  };
}
