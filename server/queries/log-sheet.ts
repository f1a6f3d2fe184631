import { and, asc, desc, eq, isNotNull, isNull, ne } from 'drizzle-orm';
import type { LogSheet } from '../../shared/contracts/readings.ts';
import { testErrorOf } from '../../shared/domain/test-error.ts';
import { PARAMETER_CODES, type ParameterCode } from '../../shared/domain/units.ts';
import type { Db } from '../db/client.ts';
import { doses, readings, users } from '../db/schema/index.ts';
import { latestReadings } from './readings.ts';
import { bandsOf, systemRow } from './systems.ts';

/** What a tester needs beside the fields: last values, bands, and what this person tests with. */
export function logSheet(db: Db, systemId: string, testerName: string): LogSheet {
  systemRow(db, systemId);
  const bands = bandsOf(db, systemId);
  const latest = latestReadings(db, systemId);
  return {
    parameters: PARAMETER_CODES.map((parameter) => {
      const last = latest.find((reading) => reading.parameter === parameter);
      const habit = lastByPerson(db, parameter, testerName);
      const kit = habit ?? last;
      return {
        parameter,
        band: bands.find((band) => band.parameter === parameter) ?? null,
        last: last
          ? {
              ...{ value: last.value, sd: last.sd ?? testErrorOf(parameter, last.method).sd, takenAt: last.takenAt },
              ...{ methodId: last.methodId, kitLotId: last.kitLotId },
            }
          : null,
        unit: habit?.unit ?? '',
        methodId: kit?.methodId ?? null,
        kitLotId: kit?.kitLotId ?? null,
      };
    }),
    lastDoseAt: lastDoseAt(db, systemId),
    testers: testers(db),
  };
}

/** Names that readings were logged under, for a filter. */
export function readingPeople(db: Db): string[] {
  return db
    .selectDistinct({ by: readings.by })
    .from(readings)
    .orderBy(asc(readings.by))
    .limit(200)
    .all()
    .map(({ by }) => by);
}

/** The last reading of a parameter that this person typed, in any system. */
function lastByPerson(db: Db, parameter: ParameterCode, name: string) {
  return db
    .select({ unit: readings.unit, methodId: readings.methodId, kitLotId: readings.kitLotId })
    .from(readings)
    .where(and(eq(readings.by, name), eq(readings.parameter, parameter), isNotNull(readings.unit)))
    .orderBy(desc(readings.takenAt))
    .limit(1)
    .get();
}

function lastDoseAt(db: Db, systemId: string): number | null {
  const row = db
    .select({ at: doses.at })
    .from(doses)
    .where(eq(doses.systemId, systemId))
    .orderBy(desc(doses.at))
    .limit(1)
    .get();
  return row?.at ?? null;
}

/** The farm's own people who can still sign in. */
function testers(db: Db) {
  return db
    .select({ id: users.id, name: users.name })
    .from(users)
    .where(and(isNull(users.disabledAt), ne(users.role, 'buyer')))
    .orderBy(asc(users.name))
    .all();
}
