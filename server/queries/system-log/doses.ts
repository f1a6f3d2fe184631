import { and, desc, eq, lt } from 'drizzle-orm';
import type { Db } from '../../db/client.ts';
import { dosingAdvice, dosingRates, doses, items, waterChanges } from '../../db/schema/index.ts';
import type { LogSource } from './source.ts';

const subject = 'doses';

const changeLog: LogSource = {
  subject,
  read: (db, { id: systemId }, { before, limit }) =>
    db
      .select()
      .from(waterChanges)
      .where(and(eq(waterChanges.systemId, systemId), lt(waterChanges.at, before)))
      .orderBy(desc(waterChanges.at))
      .limit(limit)
      .all()
      .map(({ id, at, by, litres, alkalinityMeqL }) => ({
        ...{ id: `change ${id}`, subject, at, by, note: '', reservoirId: null },
        title: [
          'Water change of ',
          { quantity: 'volume', value: litres },
          ', new water at ',
          { quantity: 'alkalinity', value: alkalinityMeqL },
        ],
      })),
};

const doseLog: LogSource = {
  subject,
  read: (db, { id: systemId, netVolumeL }, { before, limit }) =>
    db
      .select({ dose: doses, name: items.name, unit: items.unit })
      .from(doses)
      .innerJoin(items, eq(items.id, doses.itemId))
      .where(and(eq(doses.systemId, systemId), lt(doses.at, before)))
      .orderBy(desc(doses.at))
      .limit(limit)
      .all()
      .map(({ dose: { id, at, by, amount, alkalinityMeq, note }, name, unit }) => ({
        ...{ id: `dose ${id}`, subject, at, by, note, reservoirId: null },
        title: [
          `${name}, ${amount} ${unit}`,
          ...(alkalinityMeq > 0
            ? [', brings ', { quantity: 'alkalinity' as const, value: alkalinityMeq / netVolumeL, difference: true }]
            : []),
        ],
      })),
};

const rateStartLog: LogSource = {
  subject,
  read: (db, { id: systemId }, { before, limit }) =>
    ratesOf(db)
      .where(and(eq(dosingRates.systemId, systemId), lt(dosingRates.fromAt, before)))
      .orderBy(desc(dosingRates.fromAt))
      .limit(limit)
      .all()
      .map(({ rate: { id, fromAt, by, amountPerDay, note }, name, unit }) => ({
        ...{ id: `rate ${id}`, subject, at: fromAt, by, note, reservoirId: null },
        title: [`${name}, ${amountPerDay} ${unit} a day from here on`],
      })),
};

const rateStopLog: LogSource = {
  subject,
  read: (db, { id: systemId }, { before, limit }) =>
    ratesOf(db)
      .where(and(eq(dosingRates.systemId, systemId), lt(dosingRates.toAt, before)))
      .orderBy(desc(dosingRates.toAt))
      .limit(limit)
      .all()
      .map(({ rate: { id, toAt, endedBy, amountPerDay }, name, unit }) => ({
        ...{ id: `rate end ${id}`, subject, at: toAt ?? 0, by: endedBy ?? '', note: '', reservoirId: null },
        title: [`${name}, ${amountPerDay} ${unit} a day, ended`],
      })),
};

const ADVICE_WORDS = { accepted: 'Plan taken: ', changed: 'Plan changed: ', dismissed: 'Plan dismissed: ' };

const adviceLog: LogSource = {
  subject,
  read: (db, { id: systemId }, { before, limit }) =>
    db
      .select()
      .from(dosingAdvice)
      .where(and(eq(dosingAdvice.systemId, systemId), lt(dosingAdvice.at, before)))
      .orderBy(desc(dosingAdvice.at))
      .limit(limit)
      .all()
      .map(({ id, at, by, outcome, text, reason, takenBackAt }) => ({
        ...{ id: `advice ${id}`, subject, at, by, reservoirId: null },
        title: [`${ADVICE_WORDS[outcome]}${text}`],
        note: [reason, takenBackAt === null ? '' : 'taken back'].filter(Boolean).join('; '),
      })),
};

function ratesOf(db: Db) {
  return db
    .select({ rate: dosingRates, name: items.name, unit: items.unit })
    .from(dosingRates)
    .innerJoin(items, eq(items.id, dosingRates.itemId))
    .$dynamic();
}

export const doseLogs: readonly LogSource[] = [changeLog, doseLog, rateStartLog, rateStopLog, adviceLog];
