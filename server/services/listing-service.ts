import { and, eq } from 'drizzle-orm';
import type { CreateListing, EditListing, Listing } from '../../shared/contracts/listings.ts';
import { dayOf } from '../../shared/domain/days.ts';
import { GRADES } from '../../shared/domain/growth.ts';
import { DomainError } from '../../shared/errors.ts';
import { lines, listings } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { farmOf } from '../queries/farm.ts';
import { listingRow, showListing } from '../queries/listings.ts';
import { definedOnly } from './defined-only.ts';
import { assertVersion } from './edit-check.ts';

/** @throws {DomainError} `record.duplicate` where the line is offered in this grade already; `input.invalid` */
export function createListing(write: Write, input: CreateListing): Listing {
  const line = write.tx.select().from(lines).where(eq(lines.id, input.lineId)).get();
  if (!line || line.retiredAt !== null) throw refusedAt('input.invalid', 'lineId', 'Choose a line that is grown now.');
  if (input.grade === GRADES[0].code) {
    throw refusedAt('input.invalid', 'grade', 'Nubs are too small to be sold. Choose a larger grade.');
  }
  const same = write.tx
    .select()
    .from(listings)
    .where(and(eq(listings.lineId, input.lineId), eq(listings.grade, input.grade)))
    .get();
  if (same) {
    throw refusedAt('record.duplicate', 'grade', `${line.code} is offered in this grade already. Change that offer.`);
  }
  const row = write.tx
    .insert(listings)
    .values({ id: write.newId(), ...input, createdAt: write.now })
    .returning()
    .get();
  const after = shown(write, row.id);
  write.audit({ action: 'listing.created', entity: 'listing', entityId: row.id, after });
  return after;
}

/** Changes a price from now on; orders keep the price of their day. @throws {DomainError} `edit.stale` */
export function editListing(write: Write, id: string, ifMatch: number, edit: EditListing): Listing {
  const { listing } = listingRow(write.tx, id);
  const before = shown(write, id);
  assertVersion(listing, ifMatch, before);
  write.tx
    .update(listings)
    .set({ ...definedOnly(edit), version: listing.version + 1 })
    .where(eq(listings.id, id))
    .run();
  const after = shown(write, id);
  write.audit({ action: 'listing.changed', entity: 'listing', entityId: id, before, after });
  return after;
}

function shown(write: Write, id: string): Listing {
  return showListing(write.tx, id, dayOf(write.now, farmOf(write.tx).timeZone));
}

function refusedAt(code: 'input.invalid' | 'record.duplicate', path: string, message: string): DomainError {
  return new DomainError(code, message, { fields: [{ path, message }] });
}
