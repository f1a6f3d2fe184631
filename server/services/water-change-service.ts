import { eq } from 'drizzle-orm';
import type { Addition, LogWaterChange } from '../../shared/contracts/additions.ts';
import { DomainError } from '../../shared/errors.ts';
import { waterChanges } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { changeAsAddition } from '../queries/additions.ts';
import { systemRow } from '../queries/systems.ts';
import { waterItem } from '../queries/water-items.ts';
import { actTime } from './act-time.ts';
import { fillBack, pourFrom } from './salt-batch-pour.ts';
import { returnSupply } from './supply-return.ts';
import { useSupply } from './supply-use.ts';

type NewWater = Pick<LogWaterChange, 'alkalinityMeqL' | 'calciumMgL' | 'magnesiumMgL' | 'salinity'>;

/**
 * Logs a water change, of a batch of new salt water or of water mixed for it alone.
 *
 * @throws {DomainError} `input.invalid` beyond the system's volume, beyond what is left of the batch, or without the
 *   alkalinity of the new water; `supply.not_enough`
 */
export function logWaterChange(write: Write, input: LogWaterChange): Addition {
  const { systemId, litres, saltG, saltItemId, saltBatchId = null } = input;
  const system = systemRow(write.tx, systemId);
  if (litres > system.netVolumeL) throw refusedAt('litres', `${system.code} holds ${system.netVolumeL} L. Enter less.`);
  const at = actTime(write, input.at);
  const id = write.newId();
  const batch = saltBatchId === null ? null : pourFrom(write, saltBatchId, { litres, changeId: id, systemId, at });
  const { alkalinityMeqL, ...others } = testedAs(input, batch);
  if (alkalinityMeqL === undefined) {
    throw refusedAt('alkalinityMeqL', 'This batch was not tested for alkalinity. Enter it here, or at the batch.');
  }
  const row = write.tx
    .insert(waterChanges)
    .values({ id, systemId, litres, saltG, saltBatchId, alkalinityMeqL, ...others, at, by: write.actor.name })
    .returning()
    .get();
  if (saltG > 0) {
    const salt = waterItem(write.tx, 'salt', saltItemId, 'saltItemId');
    useSupply(write, { itemId: salt.id, quantity: saltG, cause: 'water_change', causeId: id, systemId, at });
  }
  write.audit({ action: 'water_change.logged', entity: 'water_change', entityId: id, after: row });
  return changeAsAddition(row);
}

/** @throws {DomainError} `record.not_found`; `rule.refused` where the salt was counted since */
export function undoWaterChange(write: Write, changeId: string): void {
  const before = write.tx.select().from(waterChanges).where(eq(waterChanges.id, changeId)).get();
  if (!before) throw new DomainError('record.not_found', 'This is gone. Someone took it back.');
  if (before.saltBatchId === null) {
    returnSupply(write, 'water_change', changeId, 'Put the difference right with the next one.');
  } else {
    fillBack(write, before.saltBatchId, { litres: before.litres, changeId });
  }
  write.tx.delete(waterChanges).where(eq(waterChanges.id, changeId)).run();
  write.audit({ action: 'water_change.undone', entity: 'water_change', entityId: changeId, before });
}

/** What was typed counts before what the batch was tested at. */
function testedAs(typed: NewWater, batch: { [K in keyof Required<NewWater>]: number | null } | null): NewWater {
  const of = (key: keyof NewWater) => typed[key] ?? batch?.[key] ?? undefined;
  return {
    ...{ alkalinityMeqL: of('alkalinityMeqL'), calciumMgL: of('calciumMgL') },
    ...{ magnesiumMgL: of('magnesiumMgL'), salinity: of('salinity') },
  };
}

function refusedAt(path: string, message: string): DomainError {
  return new DomainError('input.invalid', message, { fields: [{ path, message }] });
}
