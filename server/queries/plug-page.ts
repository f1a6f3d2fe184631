import { desc, eq, sql } from 'drizzle-orm';
import type { PlugPage } from '../../shared/contracts/stock.ts';
import { dayOf } from '../../shared/domain/days.ts';
import { isSaleable, outlook, paceOf, type Outlook } from '../../shared/domain/line-pace.ts';
import type { Role } from '../../shared/permissions.ts';
import type { Db } from '../db/client.ts';
import { orders, sizeReadings } from '../db/schema/index.ts';
import { measuredSizes, sizeBasis } from './batch-size.ts';
import { stockOfBatch } from './batches.ts';
import { toLineRef } from './colonies.ts';
import { farmOf } from './farm.ts';
import { findPlug, type PlacedPlug } from './find-plugs.ts';
import { rackPlace, toRackRef } from './places.ts';
import { plugLife } from './plug-life.ts';
import { measuredPlugSizes } from './plug-size.ts';
import { plugStays } from './plug-stays.ts';
import { causeLabel, stockActs } from './stock-acts.ts';
import { waterLived } from './water-lived.ts';
import { openWithholds, toReason } from './withholds.ts';

/** Everything about one plug, by what was scanned or typed. @throws {DomainError} `record.not_found` */
export function plugPage(db: Db, text: string, viewer: { now: number; role: Role }): PlugPage {
  const plug = findPlug(db, text);
  const { timeZone } = farmOf(db);
  const today = dayOf(viewer.now, timeZone);
  const stock = stockOfBatch(db, plug.batchId, today);
  const { batch, line, cut, colonyCode, counts } = stock;
  const measured = measuredPlugSizes(db, [plug.code]).get(plug.code) ?? measuredSizes(db, [batch.id]).get(batch.id);
  const size = outlook(sizeBasis(batch, line, measured, timeZone), paceOf(line).healDays, today);
  const measurements = measurementsOf(db, plug.code);
  const acts = stockActs(db, sql`m.plug_code = ${plug.code}`, viewer);
  const stays = plugStays(db, { code: plug.code, cutOn: batch.cutOn }, timeZone);
  const withholds = openWithholds(db, { ...plug, plugCode: plug.code });
  const rack = plug.rackId === null ? null : toRackRef(rackPlace(db, plug.rackId));
  const lastMove = acts.find(({ undone, kind }) => !undone && kind !== 'reversal');

  return {
    code: plug.code,
    number: plug.number,
    state: stateOf(plug, size, withholds.length > 0, rack?.systemKind === 'quarantine'),
    gone: hasLeft(plug)
      ? {
          kind: plug.undoneAt === null ? (plug.kind ?? '') : 'undone',
          detail: goneDetail(plug),
          at: plug.undoneAt ?? lastMove?.at ?? viewer.now,
        }
      : null,
    line: toLineRef(line),
    batch: { id: batch.id, code: batch.code, pieces: batch.pieces, alive: counts.alive, cutOn: batch.cutOn },
    mother: { id: cut.colonyId, code: colonyCode },
    rack,
    position: plug.position,
    size,
    measurements,
    life: plugLife(db, { code: plug.code, healedOn: size.healedOn, measurements, acts }, stays, {
      timeZone,
      now: viewer.now,
    }),
    water: waterLived(db, stays, viewer.now),
    withholds: withholds.map(toReason),
    heldFor: { orderNumber: orderNumber(db, plug), batchHeld: counts.held },
    acts,
  };
}

function stateOf(plug: PlacedPlug, size: Outlook, withheld: boolean, quarantine: boolean): PlugPage['state'] {
  if (hasLeft(plug)) return 'gone';
  if (plug.kind === 'order') return 'picked';
  if (withheld) return 'withheld';
  if (plug.rackId === null) return 'bench';
  if (quarantine) return 'quarantine';
  if (isSaleable(size)) return 'saleable';
  return size.healed ? 'growing' : 'healing';
}

function hasLeft({ kind, undoneAt }: PlacedPlug): boolean {
  return undoneAt !== null || (kind !== null && kind !== 'rack' && kind !== 'cut' && kind !== 'order');
}

function goneDetail({ kind, detail }: PlacedPlug): string {
  return kind === 'lost' ? causeLabel(detail) : '';
}

function orderNumber(db: Db, plug: PlacedPlug): number | null {
  if (plug.kind !== 'order') return null;
  return db.select({ number: orders.number }).from(orders).where(eq(orders.id, plug.detail)).get()?.number ?? null;
}

function measurementsOf(db: Db, code: string): PlugPage['measurements'] {
  return db
    .select()
    .from(sizeReadings)
    .where(eq(sizeReadings.plugCode, code))
    .orderBy(desc(sizeReadings.at))
    .limit(50)
    .all()
    .reverse();
}
