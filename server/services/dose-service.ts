import { eq } from 'drizzle-orm';
import type { Addition, LogDose } from '../../shared/contracts/additions.ts';
import { DomainError } from '../../shared/errors.ts';
import { doses } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { doseAsAddition } from '../queries/additions.ts';
import { systemRow } from '../queries/systems.ts';
import { waterItem } from '../queries/water-items.ts';
import { actTime } from './act-time.ts';
import { returnSupply } from './supply-return.ts';
import { useSupply } from './supply-use.ts';

/** Logs a dose of a supplement; what it brings follows from the strength of the item. */
export function logDose(write: Write, { at: givenAt, ...input }: LogDose): Addition {
  const system = systemRow(write.tx, input.systemId);
  const item = waterItem(write.tx, 'supplement', input.itemId, 'itemId');
  const at = actTime(write, givenAt);
  const row = write.tx
    .insert(doses)
    .values({
      ...{ id: write.newId(), ...input, at, by: write.actor.name },
      alkalinityMeq: input.amount * (item.strength ?? 0),
      calciumMg: input.amount * (item.calciumMg ?? 0),
      magnesiumMg: input.amount * (item.magnesiumMg ?? 0),
    })
    .returning()
    .get();
  const cause = { cause: 'dose', causeId: row.id, systemId: system.id, at } as const;
  useSupply(write, { itemId: item.id, quantity: input.amount, ...cause });
  write.audit({ action: 'dose.logged', entity: 'dose', entityId: row.id, after: row });
  return doseAsAddition(row, item, system);
}

/** @throws {DomainError} `record.not_found`; `rule.refused` where the supplement was counted since */
export function undoDose(write: Write, doseId: string): void {
  const before = write.tx.select().from(doses).where(eq(doses.id, doseId)).get();
  if (!before) throw new DomainError('record.not_found', 'This is gone. Someone took it back.');
  returnSupply(write, 'dose', doseId, 'Put the difference right with the next one.');
  write.tx.delete(doses).where(eq(doses.id, doseId)).run();
  write.audit({ action: 'dose.undone', entity: 'dose', entityId: doseId, before });
}
