import { meanOfTests } from '../../shared/domain/replicates.ts';
import { fromCanonical, PARAMETERS, toCanonical, type ParameterCode } from '../../shared/domain/units.ts';
import type { Actor } from '../db/write.ts';
import type { Sqlite } from '../db/client.ts';
import type { Chance } from './chance.ts';
import type { DemoKit } from './world.ts';

export interface NewReading {
  systemId: string;
  parameter: ParameterCode;
  value: number;
  takenAt: number;
  note: string;
  /** With more than one test, they lie this far to both sides of the mean; 0 for one test. */
  apart: number;
}

/** Steps in which the farm's instruments show a value, in the unit that they show. */
const SHOWN: Partial<Record<ParameterCode, { unit: string; step: number }>> = {
  alkalinity: { unit: 'dKH', step: 0.1 },
  calcium: { unit: 'mg/L', step: 5 },
  magnesium: { unit: 'mg/L', step: 10 },
  salinity: { unit: 'ppt', step: 0.1 },
  ph: { unit: 'pH', step: 0.01 },
};

/** What the instrument shows of a true value: with the error of the test, in the steps of its display. */
export function measured(parameter: ParameterCode, value: number, chance: Chance, errors = 1): number {
  const sd = PARAMETERS.find(({ code }) => code === parameter)?.testSd ?? 0;
  const noisy = Math.max(0, chance.normal(value, sd * errors));
  const shown = SHOWN[parameter];
  if (!shown) return Number(noisy.toFixed(parameter === 'phosphate' ? 3 : 1));
  return toCanonical(
    parameter,
    Math.round(fromCanonical(parameter, noisy, shown.unit) / shown.step) * shown.step,
    shown.unit,
  );
}

/**
 * Writes readings with their audit rows as the reading service does. There are thousands, so the statements are prepared
 * once.
 */
export function readingWriter(
  sqlite: Sqlite,
  newId: () => string,
): (reading: NewReading, kit: DemoKit, by: Actor, systemCode: string) => void {
  const insert = sqlite.prepare(
    `INSERT INTO reading (id, system_id, parameter, value, measured, sd, repeats, method, method_id, kit_lot_id,
       calibration_id, unit, taken_at, by, note, created_at)
     VALUES (@id, @systemId, @parameter, @value, @measured, @sd, @repeats, @method, @methodId, @kitLotId,
       @calibrationId, @unit, @takenAt, @by, @note, @takenAt)`,
  );
  const audit = sqlite.prepare(
    `INSERT INTO audit_log (at, actor_id, actor_name, action, entity, entity_id, after)
     VALUES (?, ?, ?, 'reading.logged', 'reading', ?, ?)`,
  );
  return ({ apart, ...reading }, { methodId, method, kitLotId, unit, repeatabilitySd, check }, by, systemCode) => {
    const read = reading.value + (check?.bias ?? 0);
    const tests = apart > 0 ? [read - apart, read + apart] : [read];
    const row = {
      ...{ id: newId(), ...reading, by: by.name, methodId, method, kitLotId, unit },
      ...{
        measured: check ? read : null,
        calibrationId: check?.id ?? null,
        sd: meanOfTests(tests, repeatabilitySd).sd,
      },
      repeats: apart > 0 ? JSON.stringify(tests) : null,
    };
    insert.run(row);
    const after = JSON.stringify({ ...row, systemCode, importId: null, version: 1 });
    audit.run(reading.takenAt, by.userId, by.name, row.id, after);
  };
}
