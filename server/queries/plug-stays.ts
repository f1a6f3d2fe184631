import { and, asc, eq, inArray, sql } from 'drizzle-orm';
import { startOfDay, type Day } from '../../shared/domain/days.ts';
import type { Db } from '../db/client.ts';
import { auditLog, stockMovements, systems } from '../db/schema/index.ts';
import { rackPlaces } from './places.ts';

const NOON_MS = 12 * 3_600_000;

/** A stretch of time that a plug spent in one place; `to` null: it is there now. */
export interface Stay {
  place: 'bench' | 'rack' | 'picked';
  rackCode: string | null;
  systemId: string | null;
  systemName: string | null;
  systemKind: 'growout' | 'broodstock' | 'quarantine' | null;
  from: number;
  to: number | null;
}

interface Step {
  at: number;
  kind: string;
  rackId: string | null;
}

/**
 * Where a plug was since its cut, acts that were undone left out. A rack that moved between tanks splits the stay by the
 * moves in the audit log.
 */
export function plugStays(db: Db, plug: { code: string; cutOn: Day }, timeZone: string): Stay[] {
  const steps = stepsOf(db, plug.code);
  const first = steps[0]?.at ?? startOfDay(plug.cutOn, timeZone) + NOON_MS;
  const cutAt = Math.min(first, startOfDay(plug.cutOn, timeZone) + NOON_MS);
  const all: Step[] = steps[0]?.at === cutAt ? steps : [{ at: cutAt, kind: 'cut', rackId: null }, ...steps];
  const places = new Map(
    rackPlaces(db)
      .all()
      .map((place) => [place.rack.id, place]),
  );
  const moves = rackMoves(db, [...new Set(all.flatMap(({ rackId }) => rackId ?? []))]);

  return all.flatMap(({ at, kind, rackId }, index): Stay[] => {
    const to = all[index + 1]?.at ?? null;
    if (kind === 'cut') return to === at ? [] : [{ ...NOWHERE, place: 'bench', from: at, to }];
    if (kind === 'order') return [{ ...NOWHERE, place: 'picked', from: at, to }];
    const place = rackId === null ? undefined : places.get(rackId);
    if (!place) return [];
    const { rack, system } = place;
    return systemSpans(moves.get(rack.id) ?? [], system.id, at, to).map((span) => {
      const there = systemById(db, span.systemId) ?? system;
      return {
        place: 'rack',
        rackCode: rack.code,
        systemId: there.id,
        systemName: there.name,
        systemKind: there.kind,
        from: span.from,
        to: span.to,
      };
    });
  });
}

const NOWHERE = { rackCode: null, systemId: null, systemName: null, systemKind: null } as const;

/** Movements of a plug that stand, each with the kind of account that it went to. */
function stepsOf(db: Db, code: string): Step[] {
  return db.all<Step>(sql`
    SELECT m.at, t.kind, t.rack_id AS rackId
    FROM stock_movement AS m JOIN stock_account AS t ON t.id = m.to_account_id
    WHERE m.plug_code = ${code} AND m.reverses_id IS NULL
      AND NOT EXISTS (SELECT 1 FROM ${stockMovements} AS undo WHERE undo.reverses_id = m.id)
    ORDER BY m.id`);
}

interface RackMove {
  at: number;
  fromSystemId: string;
}

function rackMoves(db: Db, rackIds: readonly string[]): Map<string, RackMove[]> {
  const moves = new Map<string, RackMove[]>();
  const rows = db
    .select({
      rackId: auditLog.entityId,
      at: auditLog.at,
      fromSystemId: sql<string>`json_extract(${auditLog.before}, '$.systemId')`,
    })
    .from(auditLog)
    .where(
      and(eq(auditLog.entity, 'rack'), eq(auditLog.action, 'rack.moved'), inArray(auditLog.entityId, [...rackIds])),
    )
    .orderBy(asc(auditLog.id))
    .all();
  for (const { rackId, ...move } of rows) moves.set(rackId, [...(moves.get(rackId) ?? []), move]);
  return moves;
}

/** Systems that a rack stood in between two instants: before each move the one it came from, after the last today's. */
function systemSpans(moves: readonly RackMove[], systemNow: string, from: number, to: number | null) {
  const during = moves.filter(({ at }) => at > from && (to === null || at < to));
  const next = moves.find(({ at }) => to !== null && at >= to);
  const bounds = [from, ...during.map(({ at }) => at)];
  return bounds.map((start, index) => ({
    from: start,
    to: bounds[index + 1] ?? to,
    systemId: during[index]?.fromSystemId ?? next?.fromSystemId ?? systemNow,
  }));
}

function systemById(db: Db, id: string) {
  return db.select().from(systems).where(eq(systems.id, id)).get();
}
