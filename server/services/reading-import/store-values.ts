import { sql } from 'drizzle-orm';
import { kitLots, readings, testMethods } from '../../db/schema/index.ts';
import type { Write } from '../../db/write.ts';
import { ReadingStatements } from '../reading-statement.ts';
import type { ImportValue } from './read-rows.ts';

const COLUMNS = [
  ...(['id', 'systemId', 'parameter', 'value', 'measured', 'sd', 'calibrationId', 'method', 'methodId'] as const),
  ...(['kitLotId', 'unit', 'by', 'note', 'takenAt'] as const),
];

/**
 * Stores values of an import, stated by the farm's methods where the file names one. One statement, prepared once: an
 * import can bring hundreds of thousands of values. @returns how many were stored
 */
export function storeValues(write: Write, importId: string, values: readonly ImportValue[]): number {
  const given = Object.fromEntries(COLUMNS.map((name) => [name, sql.placeholder(name)])) as Record<
    (typeof COLUMNS)[number],
    ReturnType<typeof sql.placeholder>
  >;
  const insert = write.tx
    .insert(readings)
    .values({ ...given, importId, createdAt: write.now })
    // Someone may have logged the same since the file was looked at.
    .onConflictDoNothing()
    .prepare();
  const kitOf = kitFinder(write);
  const statements = new ReadingStatements(write.tx);
  return values.reduce((stored, each) => {
    const { systemId, parameter, takenAt, method, note, unit, tester } = each;
    const kit = { parameter, method, takenAt, ...kitOf(each) };
    const { value, measured, sd, calibrationId } = statements.of({ ...kit, tests: [each.value] });
    const { changes } = insert.run({
      ...{ id: write.newId(), systemId, ...kit, value, measured, sd, calibrationId },
      ...{ note, unit: unit || null, by: tester || write.actor.name },
    });
    return stored + changes;
  }, 0);
}

/** The farm's method and kit lot by the names that a file gives them. */
function kitFinder({ tx }: Write) {
  const methods = tx.select().from(testMethods).all();
  const lots = tx.select().from(kitLots).all();
  const byName = new Map(methods.map((method) => [`${method.parameter} ${method.name.toLowerCase()}`, method]));
  return ({ parameter, method, kitLot }: ImportValue) => {
    const found = byName.get(`${parameter} ${method.toLowerCase()}`);
    const lot = lots.find(
      ({ methodId, code }) => methodId === found?.id && code.toLowerCase() === kitLot.toLowerCase(),
    );
    return { methodId: found?.id ?? null, kitLotId: lot?.id ?? null };
  };
}
