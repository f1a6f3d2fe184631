import { and, asc, desc, eq, isNotNull, isNull } from 'drizzle-orm';
import type { DosingPump, PumpCalibration } from '../../shared/contracts/dosing.ts';
import { groupBy } from '../../shared/domain/group-by.ts';
import { type DatedFactor, driftSince, factorAt, leftBy, pumpFactor } from '../../shared/domain/pump-calibration.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { dosingPumps, dosingRates, items, pumpCalibrations, systems } from '../db/schema/index.ts';

export type PumpRow = typeof dosingPumps.$inferSelect;
type CalibrationRow = typeof pumpCalibrations.$inferSelect;

/** Of each pump the latest calibrations are shown. */
const MOST_SHOWN = 12;

/** Pumps by code, those in use first. */
export function listPumps(db: Db, now: number): DosingPump[] {
  const rows = db.select().from(dosingPumps).orderBy(asc(dosingPumps.retiredAt), asc(dosingPumps.code)).all();
  const calibrations = calibrationsByPump(db);
  const doses = groupBy(runningDoses(db), ({ pumpId }) => pumpId);
  return rows.map((row) => {
    const own = calibrations.get(row.id) ?? [];
    const shown = withDrift(own);
    return {
      ...{ id: row.id, code: row.code, name: row.name, retired: row.retiredAt !== null, version: row.version },
      factor: factorAt(own.map(asDated), now),
      clean: shown.some(({ clean }, index) => index === shown.length - 1 && clean),
      doses: (doses.get(row.id) ?? []).map(({ systemId, systemCode, itemName }) => ({
        systemId,
        systemCode,
        itemName,
      })),
      calibrations: shown
        .map(({ calibration }) => calibration)
        .reverse()
        .slice(0, MOST_SHOWN),
    };
  });
}

/** @throws {DomainError} `record.not_found` */
export function showPump(db: Db, pumpId: string, now: number): DosingPump {
  const found = listPumps(db, now).find(({ id }) => id === pumpId);
  if (!found) throw new DomainError('record.not_found', 'This pump is not known.');
  return found;
}

/** @throws {DomainError} `record.not_found` */
export function pumpRow(db: Db, pumpId: string): PumpRow {
  const row = db.select().from(dosingPumps).where(eq(dosingPumps.id, pumpId)).get();
  if (!row) throw new DomainError('record.not_found', 'This pump is not known.');
  return row;
}

/** The checks of each pump as factors in time, oldest first. */
export function factorsByPump(db: Db): Map<string, DatedFactor[]> {
  return new Map([...calibrationsByPump(db)].map(([pumpId, rows]) => [pumpId, rows.map(asDated)]));
}

function calibrationsByPump(db: Db): Map<string, CalibrationRow[]> {
  const rows = db.select().from(pumpCalibrations).orderBy(asc(pumpCalibrations.at), asc(pumpCalibrations.id)).all();
  return groupBy(rows, ({ pumpId }) => pumpId);
}

function asDated({ at, factor, adjusted }: CalibrationRow): DatedFactor {
  return { at, found: factor, adjusted };
}

function withDrift(rows: readonly CalibrationRow[]): { calibration: PumpCalibration; clean: boolean }[] {
  return rows.map((row, index) => {
    const before = rows[index - 1];
    const since = before ? driftSince(row.factor, leftBy(asDated(before))) : null;
    const { id, pumpId, askedMl, measuredMl, factor, adjusted, at, by, note } = row;
    const { error } = pumpFactor({ askedMl, measuredMl });
    return {
      calibration: {
        ...{ id, pumpId, askedMl, measuredMl, factor, error, adjusted, at, by, note },
        drift: since?.drift ?? null,
      },
      clean: since?.clean ?? false,
    };
  });
}

function runningDoses(db: Db) {
  return db
    .select({
      ...{ pumpId: dosingRates.pumpId, systemId: systems.id },
      ...{ systemCode: systems.code, itemName: items.name },
    })
    .from(dosingRates)
    .innerJoin(systems, eq(systems.id, dosingRates.systemId))
    .innerJoin(items, eq(items.id, dosingRates.itemId))
    .where(and(isNull(dosingRates.toAt), isNotNull(dosingRates.pumpId)))
    .orderBy(desc(dosingRates.fromAt))
    .all();
}
