import { DONE } from '../../shared/contracts/common.ts';
import { type Reading, readingEndpoints } from '../../shared/contracts/readings.ts';
import { UNITS } from '../../shared/domain/units.ts';
import type { Api } from '../http/api.ts';
import { type CsvColumns, csvFile } from '../http/csv-file.ts';
import { logSheet, readingPeople } from '../queries/log-sheet.ts';
import { allReadings, listReadings } from '../queries/readings.ts';
import { withAlerts } from '../services/alert-service.ts';
import { editReading, logReadings, removeReading } from '../services/reading-service.ts';

export function readingRoutes(api: Api): void {
  api.read(readingEndpoints.list, (db, { query }) => listReadings(db, query));
  api.read(readingEndpoints.export, (db, { query }) => csvFile('readings.csv', COLUMNS, allReadings(db, query)));
  api.read(readingEndpoints.logSheet, (db, { params, caller }) => logSheet(db, params.id, caller.name));
  api.read(readingEndpoints.people, (db) => ({ items: readingPeople(db) }));
  api.write(readingEndpoints.log, (write, { body }) =>
    withAlerts(write, body.systemId, { items: logReadings(write, body) }),
  );
  api.write(readingEndpoints.edit, (write, { params, body, ifMatch }) => {
    const after = editReading(write, params.id, ifMatch, body);
    return withAlerts(write, after.systemId, after);
  });
  api.write(readingEndpoints.remove, (write, { params }) => {
    const { systemId } = removeReading(write, params.id);
    return withAlerts(write, systemId, DONE);
  });
}

const COLUMNS: CsvColumns<Reading> = {
  'Taken (UTC)': ({ takenAt }) => new Date(takenAt).toISOString(),
  System: ({ systemCode }) => systemCode,
  Parameter: ({ parameter }) => parameter,
  Value: ({ measured }) => measured,
  Unit: ({ parameter }) => Object.keys(UNITS[parameter])[0] ?? '',
  'Corrected value': ({ value }) => value,
  'Standard deviation': ({ sd }) => sd,
  Tests: ({ repeats }) => Math.max(1, repeats.length),
  Method: ({ method }) => method,
  'Kit lot': ({ kitLotCode }) => kitLotCode,
  By: ({ by }) => by,
  Note: ({ note }) => note,
};
