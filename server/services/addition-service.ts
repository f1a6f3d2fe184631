import { eq } from 'drizzle-orm';
import type { Addition, LogDose, LogWaterChange } from '../../shared/contracts/water.ts';
import { DomainError } from '../../shared/errors.ts';
import { doses, waterChanges } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { changeAsAddition, doseAsAddition } from '../queries/additions.ts';
import { systemRow } from '../queries/systems.ts';
import { waterItem } from '../queries/water-items.ts';
import { actTime } from './act-time.ts';
import { returnSupply } from './supply-return.ts';
import { useSupply } from './supply-use.ts';

const INSTEAD = 'Put the difference right with the next one.';

export function logWaterChange(write: Write, { saltItemId, at: givenAt, ...input }: LogWaterChange): Addition {
  const system = systemRow(write.tx, input.systemId);
  if (input.litres > system.netVolumeL) {
    const message = `${system.code} holds ${system.netVolumeL} L. Enter less.`;
    throw new DomainError('input.invalid', message, { fields: [{ path: 'litres', message }] });
  }
  const at = actTime(write, givenAt);
  const row = write.tx
    .insert(waterChanges)
    .values({ id: write.newId(), ...input, at, by: write.actor.name })
    .returning()
    .get();
  if (input.saltG > 0) {
    const salt = waterItem(write.tx, 'salt', saltItemId, 'saltItemId');
    const cause = { cause: 'water_change', causeId: row.id, systemId: system.id, at } as const;
    useSupply(write, { itemId: salt.id, quantity: input.saltG, ...cause });
  }
  const after = changeAsAddition(row);
  write.audit({ action: 'water_change.logged', entity: 'water_change', entityId: row.id, after: row });
  return after;
}

export function undoWaterChange(write: Write, changeId: string): void {
  const before = write.tx.select().from(waterChanges).where(eq(waterChanges.id, changeId)).get();
  if (!before) throw gone();
  returnSupply(write, 'water_change', changeId, INSTEAD);
  write.tx.delete(waterChanges).where(eq(waterChanges.id, changeId)).run();
  write.audit({ action: 'water_change.undone', entity: 'water_change', entityId: changeId, before });
}

/** Logs a dose of a supplement; what it brings as alkalinity follows from the strength of the item. */
export function logDose(write: Write, { at: givenAt, ...input }: LogDose): Addition {
  const system = systemRow(write.tx, input.systemId);
  const item = waterItem(write.tx, 'supplement', input.itemId, 'itemId');
  const at = actTime(write, givenAt);
  const row = write.tx
    .insert(doses)
    .values({
      ...{ id: write.newId(), ...input, at, by: write.actor.name },
      alkalinityMeq: input.amount * (item.strength ?? 0),
    })
    .returning()
    .get();
  const cause = { cause: 'dose', causeId: row.id, systemId: system.id, at } as const;
  useSupply(write, { itemId: item.id, quantity: input.amount, ...cause });
  write.audit({ action: 'dose.logged', entity: 'dose', entityId: row.id, after: row });
  return doseAsAddition(row, item, system);
}

export function undoDose(write: Write, doseId: string): void {
  const before = write.tx.select().from(doses).where(eq(doses.id, doseId)).get();
  if (!before) throw gone();
  returnSupply(write, 'dose', doseId, INSTEAD);
  write.tx.delete(doses).where(eq(doses.id, doseId)).run();
  write.audit({ action: 'dose.undone', entity: 'dose', entityId: doseId, before });
}

function gone(): DomainError {
  return new DomainError('record.not_found', 'This is gone. Someone took it back.');
}
