import { eq } from 'drizzle-orm';
import type { CalibratePump, CreatePump, DosingPump, EditPump } from '../../shared/contracts/dosing.ts';
import { pumpFactor } from '../../shared/domain/pump-calibration.ts';
import { DomainError } from '../../shared/errors.ts';
import { dosingPumps, pumpCalibrations } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { pumpRow, showPump } from '../queries/dosing-pumps.ts';
import { actTime } from './act-time.ts';
import { definedOnly } from './defined-only.ts';
import { assertVersion } from './edit-check.ts';

/** A pump gives between a tenth and ten times of what is asked; beyond that the wrong number was typed. */
const POSSIBLE_FACTOR = { min: 0.1, max: 10 };

/** @throws {DomainError} `record.duplicate` for a code that is taken */
export function createPump(write: Write, input: CreatePump): DosingPump {
  const row = write.tx
    .insert(dosingPumps)
    .values({ id: write.newId(), ...input, createdAt: write.now })
    .returning()
    .get();
  write.audit({ action: 'dosing_pump.created', entity: 'dosing_pump', entityId: row.id, after: row });
  return showPump(write.tx, row.id, write.now);
}

/** @throws {DomainError} `record.not_found`; `edit.stale`; `record.in_use` to retire one that doses */
export function editPump(write: Write, pumpId: string, ifMatch: number, input: EditPump): DosingPump {
  const before = pumpRow(write.tx, pumpId);
  const shown = showPump(write.tx, pumpId, write.now);
  assertVersion(before, ifMatch, shown);
  const { retired, ...fields } = definedOnly(input);
  if (retired && shown.doses.length > 0) {
    throw new DomainError('record.in_use', 'This pump doses now. Stop it, or change the dose to another pump first.');
  }
  const retiredAt = retired === undefined ? before.retiredAt : retired ? (before.retiredAt ?? write.now) : null;
  const after = write.tx
    .update(dosingPumps)
    .set({ ...fields, retiredAt, version: before.version + 1 })
    .where(eq(dosingPumps.id, pumpId))
    .returning()
    .get();
  write.audit({ action: 'dosing_pump.changed', entity: 'dosing_pump', entityId: pumpId, before, after });
  return showPump(write.tx, pumpId, write.now);
}

/** @throws {DomainError} `record.not_found`; `input.invalid` for amounts that can not belong together */
export function calibratePump(write: Write, pumpId: string, input: CalibratePump): DosingPump {
  pumpRow(write.tx, pumpId);
  const { factor } = pumpFactor(input);
  if (factor < POSSIBLE_FACTOR.min || factor > POSSIBLE_FACTOR.max) {
    const message = `That is ${Number(factor.toPrecision(2))} times of what was asked for. Check both amounts.`;
    throw new DomainError('input.invalid', message, { fields: [{ path: 'measuredMl.0', message }] });
  }
  const { askedMl, measuredMl, adjusted, note } = input;
  const at = actTime(write, input.at);
  const row = write.tx
    .insert(pumpCalibrations)
    .values({ id: write.newId(), pumpId, askedMl, measuredMl, factor, adjusted, at, by: write.actor.name, note })
    .returning()
    .get();
  write.audit({ action: 'pump_calibration.logged', entity: 'pump_calibration', entityId: row.id, after: row });
  return showPump(write.tx, pumpId, write.now);
}

/** @throws {DomainError} `record.not_found` */
export function undoCalibration(write: Write, calibrationId: string): void {
  const before = write.tx.select().from(pumpCalibrations).where(eq(pumpCalibrations.id, calibrationId)).get();
  if (!before) throw new DomainError('record.not_found', 'This is gone. Someone took it back.');
  write.tx.delete(pumpCalibrations).where(eq(pumpCalibrations.id, calibrationId)).run();
  write.audit({ action: 'pump_calibration.undone', entity: 'pump_calibration', entityId: calibrationId, before });
}
