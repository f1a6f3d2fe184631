import { eq } from 'drizzle-orm';
import type { Colony, CreateColony, EditColony } from '../../shared/contracts/stock.ts';
import { dayOf } from '../../shared/domain/days.ts';
import { paceOf } from '../../shared/domain/line-pace.ts';
import { DomainError } from '../../shared/errors.ts';
import { colonies } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { showColony } from '../queries/colonies.ts';
import { farmOf } from '../queries/farm.ts';
import { lineRow } from '../queries/lines.ts';
import { rackInUse } from '../queries/places.ts';
import { definedOnly } from './defined-only.ts';
import { assertVersion } from './edit-check.ts';

/** Registers a mother on a rack. @throws {DomainError} `record.not_found`; `record.duplicate`; `input.invalid` */
export function createColony(write: Write, input: CreateColony): Colony {
  const line = lineRow(write.tx, input.lineId);
  rackInUse(write.tx, input.rackId);
  assertDays(write, input);
  const row = write.tx
    .insert(colonies)
    .values({ id: write.newId(), ...input, restDays: input.restDays ?? paceOf(line).restDays, createdAt: write.now })
    .returning()
    .get();
  write.audit({ action: 'colony.created', entity: 'colony', entityId: row.id, after: row });
  return showColony(write.tx, row.id, write.now);
}

/** Changes a mother. @throws {DomainError} `record.not_found`; `edit.stale`; `input.invalid` */
export function editColony(write: Write, id: string, ifMatch: number, input: EditColony): Colony {
  const before = write.tx.select().from(colonies).where(eq(colonies.id, id)).get();
  if (!before) throw new DomainError('record.not_found', 'This mother is not known.');
  assertVersion(before, ifMatch, showColony(write.tx, id, write.now));
  if (input.rackId !== undefined) rackInUse(write.tx, input.rackId);
  const { retired, ...fields } = input;
  assertDays(write, { ...before, ...definedOnly(fields) });
  const after = write.tx
    .update(colonies)
    .set({
      ...definedOnly(fields),
      ...(retired === undefined ? {} : { retiredAt: retired ? (before.retiredAt ?? write.now) : null }),
      version: before.version + 1,
    })
    .where(eq(colonies.id, id))
    .returning()
    .get();
  write.audit({ action: 'colony.changed', entity: 'colony', entityId: id, before, after });
  return showColony(write.tx, id, write.now);
}

function assertDays(write: Write, { acquiredOn, lastCutOn }: { acquiredOn: string; lastCutOn: string | null }): void {
  const today = dayOf(write.now, farmOf(write.tx).timeZone);
  const message = 'This day is still to come.';
  const fields = [
    ...(acquiredOn > today ? [{ path: 'acquiredOn', message }] : []),
    ...(lastCutOn !== null && lastCutOn > today ? [{ path: 'lastCutOn', message }] : []),
  ];
  if (fields.length > 0) throw new DomainError('input.invalid', message, { fields });
}
