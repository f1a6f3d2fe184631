import { type AuditEntry, auditEndpoints } from '../../shared/contracts/audit.ts';
import type { Api } from '../http/api.ts';
import { type CsvColumns, csvFile } from '../http/csv-file.ts';
import { allAudit, auditChoices, listAudit } from '../queries/audit.ts';

const COLUMNS: CsvColumns<AuditEntry> = {
  at: (entry) => new Date(entry.at).toISOString(),
  person: (entry) => entry.actorName,
  action: (entry) => entry.action,
  record: (entry) => entry.entity,
  record_id: (entry) => entry.entityId,
  before: (entry) => (entry.before === null ? '' : JSON.stringify(entry.before)),
  after: (entry) => (entry.after === null ? '' : JSON.stringify(entry.after)),
};

/** The record of every change. */
export function auditRoutes(api: Api): void {
  api.read(auditEndpoints.list, (db, { query }) => listAudit(db, query));
  api.read(auditEndpoints.choices, (db) => auditChoices(db));
  api.read(auditEndpoints.export, (db, { query }) => csvFile('audit-log.csv', COLUMNS, allAudit(db, query)));
}
