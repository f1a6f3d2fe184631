import { asc, eq } from 'drizzle-orm';
import type { RackRef } from '../../shared/contracts/stock.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { racks, systems, tanks } from '../db/schema/index.ts';

export type RackRow = typeof racks.$inferSelect;
export interface RackPlace {
  rack: RackRow;
  tank: typeof tanks.$inferSelect;
  system: typeof systems.$inferSelect;
}

/** Racks with the tank and the system that they stand in. */
export function rackPlaces(db: Db) {
  return db
    .select({ rack: racks, tank: tanks, system: systems })
    .from(racks)
    .innerJoin(tanks, eq(tanks.id, racks.tankId))
    .innerJoin(systems, eq(systems.id, tanks.systemId))
    .orderBy(asc(systems.code), asc(tanks.code), asc(racks.code));
}

/** @throws {DomainError} `record.not_found` */
export function rackPlace(db: Db, rackId: string): RackPlace {
  const place = rackPlaces(db).where(eq(racks.id, rackId)).get();
  if (!place) throw new DomainError('record.not_found', 'This rack is not known. Choose one from the list.');
  return place;
}

/** The rack of an act that puts something on it. @throws {DomainError} `record.not_found`; `rule.refused` when retired */
export function rackInUse(db: Db, rackId: string): RackPlace {
  const place = rackPlace(db, rackId);
  if (place.rack.retiredAt === null) return place;
  throw new DomainError('rule.refused', `Rack ${place.rack.code} is retired. Choose another rack.`);
}

export function toRackRef({ rack, tank, system }: RackPlace): RackRef {
  return {
    id: rack.id,
    code: rack.code,
    tankId: tank.id,
    tankName: tank.name,
    systemId: system.id,
    systemCode: system.code,
    systemName: system.name,
    systemKind: system.kind,
  };
}
