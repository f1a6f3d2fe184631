import { and, asc, desc, eq, gt, isNull } from 'drizzle-orm';
import type { OrderLine, Pick, PickPlan, PickStop } from '../../shared/contracts/orders.ts';
import type { Db } from '../db/client.ts';
import { batches, holds, lines, orderLines, picks, plugs } from '../db/schema/index.ts';
import { orderLinesOf, orderRow } from './orders.ts';
import { sellablePlugs, type StandingPlug } from './standing-plugs.ts';
import { storeRow } from './stores.ts';

/** Most positions named for one batch at one rack. */
const MOST_POSITIONS = 12;

interface HeldPieces {
  line: OrderLine;
  batchId: string;
  batchCode: string;
  pieces: number;
}

/** What to fetch for an order and what is fetched already. */
export function pickPlan(db: Db, orderId: string): PickPlan {
  const order = orderRow(db, orderId);
  const wantedLines = orderLinesOf(db, orderId);
  return {
    id: order.id,
    number: order.number,
    state: order.state,
    storeName: storeRow(db, order.storeId).name,
    lines: wantedLines,
    stops: stopsOf(db, heldPieces(db, orderId, wantedLines)),
    picks: picksOf(db, orderId),
    ...progressOf(wantedLines),
  };
}

export function progressOf(wantedLines: readonly OrderLine[]): { wanted: number; picked: number } {
  return {
    wanted: wantedLines.reduce((sum, { quantity, missing }) => sum + quantity - missing, 0),
    picked: wantedLines.reduce((sum, line) => sum + line.picked, 0),
  };
}

/** Plugs picked for an order, newest first. */
export function picksOf(db: Db, orderId: string): Pick[] {
  return db
    .select({ pick: picks, lineCode: lines.code, batchCode: batches.code })
    .from(picks)
    .innerJoin(orderLines, eq(orderLines.id, picks.orderLineId))
    .innerJoin(lines, eq(lines.id, orderLines.lineId))
    .innerJoin(plugs, eq(plugs.code, picks.plugCode))
    .innerJoin(batches, eq(batches.id, plugs.batchId))
    .where(and(eq(orderLines.orderId, orderId), isNull(picks.undoneAt)))
    .orderBy(desc(picks.at), desc(picks.movementId))
    .all()
    .map(({ pick, lineCode, batchCode }) => ({
      id: pick.id,
      code: pick.plugCode,
      orderLineId: pick.orderLineId,
      lineCode,
      batchCode,
      at: pick.at,
      by: pick.by,
    }));
}

function heldPieces(db: Db, orderId: string, wantedLines: readonly OrderLine[]): HeldPieces[] {
  const byId = new Map(wantedLines.map((line) => [line.id, line]));
  return db
    .select({ hold: holds, batchCode: batches.code })
    .from(holds)
    .innerJoin(orderLines, eq(orderLines.id, holds.orderLineId))
    .innerJoin(batches, eq(batches.id, holds.batchId))
    .where(and(eq(orderLines.orderId, orderId), gt(holds.pieces, 0)))
    .orderBy(asc(batches.cutOn), asc(batches.code))
    .all()
    .flatMap(({ hold, batchCode }) => {
      const line = byId.get(hold.orderLineId);
      return line ? { line, batchId: hold.batchId, batchCode, pieces: hold.pieces } : [];
    });
}

/** Shares held pieces over the racks where their batches stand, in walking order, the fewest racks not sought. */
function stopsOf(db: Db, held: readonly HeldPieces[]): PickStop[] {
  const standing = sellablePlugs(
    db,
    held.map(({ batchId }) => batchId),
  );
  const stops = new Map<string, PickStop>();
  for (const { line, batchId, batchCode, pieces } of held) {
    let missing = pieces;
    for (const [rackId, there] of byRack(standing.filter((plug) => plug.batchId === batchId))) {
      const take = Math.min(missing, there.length);
      const [first] = there;
      if (take === 0 || !first) continue;
      missing -= take;
      const { rackCode, tankName, systemCode } = first;
      const stop = stops.get(rackId) ?? { rackCode, tankName, systemCode, items: [] };
      const positions = there.flatMap(({ position }) => position ?? []).slice(0, Math.min(take, MOST_POSITIONS));
      const { lineCode, tradeName, grade } = line;
      stop.items.push({ lineCode, tradeName, grade, batchCode, pieces: take, positions });
      stops.set(rackId, stop);
    }
  }
  return [...stops.values()].sort((a, b) => placeOf(a).localeCompare(placeOf(b), 'en', { numeric: true }));
}

function byRack(standing: readonly StandingPlug[]): Map<string, StandingPlug[]> {
  const racks = new Map<string, StandingPlug[]>();
  for (const plug of standing) racks.set(plug.rackId, [...(racks.get(plug.rackId) ?? []), plug]);
  return racks;
}

function placeOf({ systemCode, tankName, rackCode }: PickStop): string {
  return `${systemCode} ${tankName} ${rackCode}`;
}
