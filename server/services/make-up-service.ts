import { eq } from 'drizzle-orm';
import type {
  Cartridge,
  InstallCartridge,
  LogMakeUpReading,
  MakeUpReading,
} from '../../shared/contracts/make-up-water.ts';
import { dayOf } from '../../shared/domain/days.ts';
import { DomainError } from '../../shared/errors.ts';
import { cartridges, makeUpReadings } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { farmOf } from '../queries/farm.ts';
import { cartridgeRow, type CartridgeRow, toCartridge, toMakeUpReading } from '../queries/make-up-water.ts';
import { actTime } from './act-time.ts';
import { itemRow } from './supply-items.ts';
import { returnSupply } from './supply-return.ts';
import { useSupply } from './supply-use.ts';

/** Logs TDS and litres of the unit that makes pure water. */
export function logMakeUpReading(write: Write, { at, ...input }: LogMakeUpReading): MakeUpReading {
  const row = write.tx
    .insert(makeUpReadings)
    .values({ id: write.newId(), ...input, at: actTime(write, at), by: write.actor.name })
    .returning()
    .get();
  write.audit({ action: 'make_up_reading.logged', entity: 'make_up_reading', entityId: row.id, after: row });
  return toMakeUpReading(row);
}

/** @throws {DomainError} `record.not_found` */
export function undoMakeUpReading(write: Write, readingId: string): void {
  const before = write.tx.select().from(makeUpReadings).where(eq(makeUpReadings.id, readingId)).get();
  if (!before) throw new DomainError('record.not_found', 'This is gone. Someone took it back.');
  write.tx.delete(makeUpReadings).where(eq(makeUpReadings.id, readingId)).run();
  write.audit({ action: 'make_up_reading.undone', entity: 'make_up_reading', entityId: readingId, before });
}

/**
 * Installs a cartridge; the one that it takes the place of goes out on the same day.
 *
 * @throws {DomainError} `input.invalid` for a day to come, for another stage, or one that is out already;
 *   `supply.not_enough`
 */
export function installCartridge(write: Write, input: InstallCartridge): Cartridge {
  const today = dayOf(write.now, farmOf(write.tx).timeZone);
  const { replacesId = null, itemId = null, installedOn = today, lifeDays = null, lifeL = null, limit = null } = input;
  if (installedOn > today) throw refusedAt('installedOn', 'This day is still to come.');
  const replaced = replacesId === null ? null : cartridgeRow(write.tx, replacesId);
  if (replaced) takeOut(write, replaced, input.stage, installedOn);
  const { stage, name, note } = input;
  const row = write.tx
    .insert(cartridges)
    .values({
      ...{ id: write.newId(), stage, name, note, itemId, installedOn, lifeDays, lifeL, limit },
      ...{ replacesId, by: write.actor.name },
    })
    .returning()
    .get();
  if (itemId !== null) takePiece(write, itemId, row.id);
  write.audit({
    ...{ action: 'cartridge.installed', entity: 'cartridge', entityId: row.id, after: row },
    ...(replaced ? { before: replaced } : {}),
  });
  return toCartridge(write.tx, row, write.now);
}

/** @throws {DomainError} `record.not_found`; `rule.refused` where it was replaced since, or its supply counted */
export function undoInstall(write: Write, cartridgeId: string): void {
  const before = cartridgeRow(write.tx, cartridgeId);
  if (before.removedOn !== null) throw new DomainError('rule.refused', 'It was replaced since. Take that back first.');
  returnSupply(write, 'cartridge', cartridgeId, 'Correct what is left by a count.');
  write.tx.delete(cartridges).where(eq(cartridges.id, cartridgeId)).run();
  if (before.replacesId !== null) {
    write.tx.update(cartridges).set({ removedOn: null }).where(eq(cartridges.id, before.replacesId)).run();
  }
  write.audit({ action: 'cartridge.undone', entity: 'cartridge', entityId: cartridgeId, before });
}

function takeOut(write: Write, old: CartridgeRow, stage: Cartridge['stage'], on: string): void {
  if (old.removedOn !== null) throw refusedAt('replacesId', 'That one is out already.');
  if (old.stage !== stage) throw refusedAt('replacesId', 'That one sits at another stage.');
  if (on < old.installedOn) throw refusedAt('installedOn', 'The one before was put in later than that.');
  write.tx
    .update(cartridges)
    .set({ removedOn: on, version: old.version + 1 })
    .where(eq(cartridges.id, old.id))
    .run();
}

function takePiece(write: Write, itemId: string, cartridgeId: string): void {
  if (itemRow(write, itemId).unit !== 'piece') throw refusedAt('itemId', 'Choose a supply that is kept in pieces.');
  useSupply(write, { itemId, quantity: 1, cause: 'cartridge', causeId: cartridgeId, at: write.now });
}

function refusedAt(path: string, message: string): DomainError {
  return new DomainError('input.invalid', message, { fields: [{ path, message }] });
}
