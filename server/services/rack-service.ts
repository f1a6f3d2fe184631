import { and, eq, sql } from 'drizzle-orm';
import type { CreateRack, EditRack, MoveRack, Rack } from '../../shared/contracts/stock.ts';
import { hasPosition } from '../../shared/domain/positions.ts';
import { DomainError } from '../../shared/errors.ts';
import { batches, plugs, racks, stockAccounts, systems, tanks, withholds } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { rackInUse, rackPlace } from '../queries/places.ts';
import { showRack } from '../queries/racks.ts';
import { openWithholds } from '../queries/withholds.ts';
import { definedOnly } from './defined-only.ts';
import { assertVersion } from './edit-check.ts';
import { takenPositions } from './place-plugs.ts';

/** Adds a rack to a tank. @throws {DomainError} `record.not_found`; `record.duplicate` */
export function createRack(write: Write, input: CreateRack): Rack {
  tankIn(write, input.tankId);
  const row = write.tx
    .insert(racks)
    .values({ id: write.newId(), ...input, createdAt: write.now })
    .returning()
    .get();
  write.audit({ action: 'rack.created', entity: 'rack', entityId: row.id, after: row });
  return showRack(write.tx, row.id);
}

/**
 * Changes a rack's code or size, or retires it.
 *
 * @throws {DomainError} `record.not_found`; `edit.stale`; `record.in_use` where plugs stand outside the new size, or on a
 *   rack to be retired
 */
export function editRack(write: Write, id: string, ifMatch: number, input: EditRack): Rack {
  const { rack: before } = rackPlace(write.tx, id);
  const shown = showRack(write.tx, id);
  assertVersion(before, ifMatch, shown);
  const { retired, ...fields } = input;
  const size = { ...before, ...definedOnly(fields) };
  const outside = takenPositions(write.tx, id).filter((position) => !hasPosition(size, position));
  if (outside.length > 0) {
    throw new DomainError('record.in_use', `Plugs stand at ${outside.slice(0, 5).join(', ')}. Move them first.`);
  }
  if (retired && before.retiredAt === null && shown.plugs + shown.colonies > 0) {
    throw new DomainError('record.in_use', `Something still stands on ${before.code}. Move it first.`);
  }
  const after = write.tx
    .update(racks)
    .set({
      ...definedOnly(fields),
      ...(retired === undefined ? {} : { retiredAt: retired ? (before.retiredAt ?? write.now) : null }),
      version: before.version + 1,
    })
    .where(eq(racks.id, id))
    .returning()
    .get();
  write.audit({ action: 'rack.changed', entity: 'rack', entityId: id, before, after });
  return showRack(write.tx, id);
}

/**
 * Moves a whole rack with everything on it to another tank. Plugs keep their positions.
 *
 * @throws {DomainError} `stock.withheld` where something on it is withheld and would leave its system, other than into
 *   quarantine
 */
export function moveRack(write: Write, id: string, { tankId }: MoveRack): Rack {
  const { rack, tank, system } = rackInUse(write.tx, id);
  const target = tankIn(write, tankId);
  if (tank.id === target.tank.id) throw new DomainError('rule.refused', `${rack.code} stands there already.`);
  if (system.id !== target.system.id && target.system.kind !== 'quarantine') assertRackFree(write, id, system.id);
  write.tx
    .update(racks)
    .set({ tankId, version: rack.version + 1 })
    .where(eq(racks.id, id))
    .run();
  write.audit({
    action: 'rack.moved',
    entity: 'rack',
    entityId: id,
    before: { tankId: tank.id, systemId: system.id },
    after: { tankId, systemId: target.system.id },
  });
  return showRack(write.tx, id);
}

function assertRackFree(write: Write, rackId: string, systemId: string): void {
  const [whole] = openWithholds(write.tx, { rackId, systemId });
  const single = write.tx
    .select({ reason: withholds.reason })
    .from(plugs)
    .innerJoin(stockAccounts, eq(stockAccounts.id, plugs.accountId))
    .innerJoin(batches, eq(batches.id, plugs.batchId))
    .innerJoin(
      withholds,
      and(
        sql`${withholds.endedAt} IS NULL`,
        sql`(${withholds.plugCode} = ${plugs.code} OR ${withholds.batchId} = ${batches.id})`,
      ),
    )
    .where(eq(stockAccounts.rackId, rackId))
    .get();
  const reason = whole?.reason ?? single?.reason;
  if (reason === undefined) return;
  throw new DomainError(
    'stock.withheld',
    `Stock on this rack is withheld: ${reason}. Release it first, or leave the rack in its system.`,
    { details: { rackId, reason } },
  );
}

function tankIn({ tx }: Write, tankId: string) {
  const found = tx
    .select({ tank: tanks, system: systems })
    .from(tanks)
    .innerJoin(systems, eq(systems.id, tanks.systemId))
    .where(eq(tanks.id, tankId))
    .get();
  if (!found) throw new DomainError('record.not_found', 'This tank is not known. Choose one from the list.');
  return found;
}
