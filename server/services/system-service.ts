import { eq } from 'drizzle-orm';
import type { CreateSystem, CreateTank, EditSystem, System, Tank, TargetBand } from '../../shared/contracts/systems.ts';
import { PARAMETERS } from '../../shared/domain/units.ts';
import { DomainError, type FieldError } from '../../shared/errors.ts';
import { systems, tanks, targetBands } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { showSystem, systemRow, toSystem, toTank } from '../queries/systems.ts';
import { assertVersion } from './edit-check.ts';

export function createSystem(write: Write, { bands, ...fields }: CreateSystem): System {
  assertBands(bands);
  const row = write.tx
    .insert(systems)
    .values({ id: write.newId(), ...fields, createdAt: write.now })
    .returning()
    .get();
  writeBands(write, row.id, bands);
  const after = toSystem(write.tx, row);
  write.audit({ action: 'system.created', entity: 'system', entityId: row.id, after });
  return after;
}

export function editSystem(write: Write, systemId: string, ifMatch: number, edit: EditSystem): System {
  const row = systemRow(write.tx, systemId);
  const before = toSystem(write.tx, row);
  assertVersion(row, ifMatch, before);
  const { bands, ...fields } = edit;
  if (bands) {
    assertBands(bands);
    writeBands(write, systemId, bands);
  }
  write.tx
    .update(systems)
    .set({ ...fields, version: row.version + 1 })
    .where(eq(systems.id, systemId))
    .run();
  const after = showSystem(write.tx, systemId);
  write.audit({ action: 'system.changed', entity: 'system', entityId: systemId, before, after });
  return after;
}

export function createTank(write: Write, input: CreateTank): Tank {
  systemRow(write.tx, input.systemId);
  const row = write.tx
    .insert(tanks)
    .values({ id: write.newId(), ...input, createdAt: write.now })
    .returning()
    .get();
  const after = toTank(row);
  write.audit({ action: 'tank.created', entity: 'tank', entityId: row.id, after });
  return after;
}

function writeBands(write: Write, systemId: string, bands: readonly TargetBand[]): void {
  write.tx.delete(targetBands).where(eq(targetBands.systemId, systemId)).run();
  for (const band of bands)
    write.tx
      .insert(targetBands)
      .values({ systemId, ...band })
      .run();
}

/** A band outside of what can be read is a slip of the pen or another unit. */
function assertBands(bands: readonly TargetBand[]): void {
  const fields = bands.flatMap((band, index): FieldError[] => {
    const parameter = PARAMETERS.find(({ code }) => code === band.parameter);
    if (!parameter) return [];
    const { min, max } = parameter.plausible;
    return (['low', 'high'] as const)
      .filter((end) => band[end] < min || band[end] > max)
      .map((end) => ({
        path: `bands.${index}.${end}`,
        message: `${parameter.label} can't be so far out. Check the unit.`,
      }));
  });
  if (fields.length > 0) throw new DomainError('input.invalid', 'A target band needs another look.', { fields });
}
