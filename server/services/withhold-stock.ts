import { and, eq, isNull } from 'drizzle-orm';
import type { Withheld, Withhold } from '../../shared/contracts/stock.ts';
import { DomainError } from '../../shared/errors.ts';
import { batches, racks, systems, withholds } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { findPlug } from '../queries/find-plugs.ts';
import { findWithhold } from '../queries/withholds.ts';
import { assertInStock } from './plug-rules.ts';

/** Keeps a plug, a batch, a rack or a whole system from sale until released. @throws {DomainError} `record.not_found` */
export function withholdStock(write: Write, input: Withhold): Withheld {
  const target = targetOf(write, input);
  const row = write.tx
    .insert(withholds)
    .values({
      id: write.newId(),
      ...target,
      reason: input.reason,
      startedAt: write.now,
      startedBy: write.actor.name,
    })
    .returning()
    .get();
  write.audit({ action: 'stock.withheld', entity: 'withhold', entityId: row.id, after: row });
  return shown(write, row.id);
}

/** Ends a withhold. @throws {DomainError} `record.not_found`; `rule.refused` when it ended before */
export function releaseStock(write: Write, id: string): Withheld {
  const before = shown(write, id);
  if (before.endedAt !== null) throw new DomainError('rule.refused', 'This was released already.');
  write.tx
    .update(withholds)
    .set({ endedAt: write.now, endedBy: write.actor.name })
    .where(and(eq(withholds.id, id), isNull(withholds.endedAt)))
    .run();
  const after = shown(write, id);
  write.audit({ action: 'stock.released', entity: 'withhold', entityId: id, before, after });
  return after;
}

function targetOf({ tx }: Write, { plugCode, batchId, rackId, systemId }: Withhold) {
  if (plugCode !== undefined) {
    const plug = findPlug(tx, plugCode, 'plugCode');
    assertInStock(plug);
    return { plugCode: plug.code };
  }
  const known =
    batchId !== undefined
      ? tx.select({ id: batches.id }).from(batches).where(eq(batches.id, batchId)).get()
      : rackId !== undefined
        ? tx.select({ id: racks.id }).from(racks).where(eq(racks.id, rackId)).get()
        : tx
            .select({ id: systems.id })
            .from(systems)
            .where(eq(systems.id, systemId ?? ''))
            .get();
  if (!known) throw new DomainError('record.not_found', 'What to withhold is not known. Choose it from the list.');
  return { batchId: batchId ?? null, rackId: rackId ?? null, systemId: systemId ?? null };
}

function shown(write: Write, id: string): Withheld {
  const withheld = findWithhold(write.tx, id);
  if (!withheld) throw new DomainError('record.not_found', 'This withhold is not known.');
  return withheld;
}
