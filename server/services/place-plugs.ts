import { eq, isNotNull, and } from 'drizzle-orm';
import type { PlacePlugs, StockActDone } from '../../shared/contracts/stock.ts';
import { assertPosition, freePositions } from '../../shared/domain/positions.ts';
import { formatPlugCode } from '../../shared/domain/plug-code.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { plugs, stockAccounts } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { findPlugs, type PlacedPlug } from '../queries/find-plugs.ts';
import { rackInUse, type RackPlace } from '../queries/places.ts';
import { actTime } from './act-time.ts';
import { accountInStock, assertNotWithheld } from './plug-rules.ts';
import { postMovements, stockAccount } from './stock-ledger.ts';

/**
 * Puts plugs on a rack, from the bench or from where they stand. All go or none.
 *
 * @throws {DomainError} `stock.withheld` where a withheld plug would leave its system, other than into quarantine;
 *   `stock.not_there`; `rule.refused` for a taken position or too few free ones
 */
export function placePlugs(write: Write, input: PlacePlugs): StockActDone {
  const target = rackInUse(write.tx, input.rackId);
  const found = findPlugs(write.tx, input.codes);
  const from = found.map((plug) => accountInStock(write, plug));
  for (const plug of found) assertMayGo(write.tx, plug, target);
  const positions = positionsFor(write.tx, target, found, input);
  const to = stockAccount(write, { kind: 'rack', rackId: target.rack.id });
  const at = actTime(write, input.at);

  const { groupId } = postMovements(
    write,
    found.map((plug, index) => ({
      kind: plug.rackId === null ? 'place' : 'move',
      batchId: plug.batchId,
      plugCode: plug.code,
      from: from[index] ?? to,
      to,
      toPosition: positions[index] ?? null,
      note: input.note,
      at,
    })),
  );
  write.audit({
    action: 'stock.placed',
    entity: 'stock_act',
    entityId: groupId,
    before: found.map(({ code, rackCode, position }) => ({ code, rackCode, position })),
    after: { rackCode: target.rack.code, codes: found.map(({ code }) => code), positions },
  });
  return {
    groupId,
    pieces: found.length,
    plugs: found.map(({ code }, index) => ({ code, position: positions[index] ?? null })),
  };
}

/** Positions that plugs stand at on a rack. */
export function takenPositions(db: Db, rackId: string): string[] {
  return db
    .select({ position: plugs.position })
    .from(plugs)
    .innerJoin(stockAccounts, eq(stockAccounts.id, plugs.accountId))
    .where(and(eq(stockAccounts.rackId, rackId), isNotNull(plugs.position)))
    .all()
    .flatMap(({ position }) => position ?? []);
}

function assertMayGo(db: Db, plug: PlacedPlug, { system }: RackPlace): void {
  // Sick stock may always be set apart.
  if (plug.systemId === system.id || plug.systemId === null || system.kind === 'quarantine') return;
  assertNotWithheld(db, plug);
}

function positionsFor(
  db: Db,
  { rack }: RackPlace,
  found: readonly PlacedPlug[],
  { position, startPosition, loose }: PlacePlugs,
): (string | null)[] {
  const positions = loose
    ? found.map(() => null)
    : position === undefined
      ? freePositions(rack, takenPositions(db, rack.id), found.length, startPosition)
      : [position];
  if (position !== undefined && !loose) assertPosition(rack, position, 'position');
  const staying = found.find((plug, index) => plug.rackId === rack.id && plug.position === (positions[index] ?? null));
  if (staying) {
    throw new DomainError('rule.refused', `${formatPlugCode(staying.code)} stands there already.`);
  }
  return positions;
}
