import { eq } from 'drizzle-orm';
import type { CreateLine, EditLine, Line } from '../../shared/contracts/stock.ts';
import { lines } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { lineRow, toLine } from '../queries/lines.ts';
import { assertVersion } from './edit-check.ts';
import { definedOnly } from './defined-only.ts';

/** Starts a line. @throws {DomainError} `record.duplicate` for a code in use */
export function createLine(write: Write, input: CreateLine): Line {
  const row = write.tx
    .insert(lines)
    .values({ id: write.newId(), ...input, createdAt: write.now })
    .returning()
    .get();
  write.audit({ action: 'line.created', entity: 'line', entityId: row.id, after: row });
  return toLine(row);
}

/** Changes a line. @throws {DomainError} `record.not_found`; `edit.stale` */
export function editLine(write: Write, id: string, ifMatch: number, input: EditLine): Line {
  const before = lineRow(write.tx, id);
  assertVersion(before, ifMatch, toLine(before));
  const { retired, ...fields } = input;
  const after = write.tx
    .update(lines)
    .set({
      ...definedOnly(fields),
      ...(retired === undefined ? {} : { retiredAt: retired ? (before.retiredAt ?? write.now) : null }),
      version: before.version + 1,
    })
    .where(eq(lines.id, id))
    .returning()
    .get();
  write.audit({ action: 'line.changed', entity: 'line', entityId: id, before, after });
  return toLine(after);
}
