import type { Role } from '../../shared/permissions.ts';
import type { Deps } from '../deps.ts';
import type { Db } from './client.ts';
import { domainErrorOf } from './driver-errors.ts';
import { auditLog } from './schema/index.ts';

/** Who acts: a signed-in person, or the product itself (jobs, webhooks), whose id is null. */
export interface Actor {
  userId: string | null;
  name: string;
  role: Role | 'system';
  storeId: string | null;
}

export const SYSTEM: Actor = { userId: null, name: 'Limestead', role: 'system', storeId: null };

export interface AuditEntry {
  action: string;
  entity: string;
  entityId: string;
  before?: unknown;
  after?: unknown;
}

/** One change under way: everything written through it is kept or dropped together, and audited as `actor`'s. */
export interface Write {
  tx: Db;
  actor: Actor;
  now: number;
  newId: () => string;
  randomInt: (max: number) => number;
  audit(entry: AuditEntry): void;
}

/** Runs `change` in one immediate transaction. Driver errors with a known meaning become domain errors. */
export function inWrite<T>(deps: Deps, actor: Actor, change: (write: Write) => T): T {
  const now = deps.clock.now();
  try {
    return deps.db.transaction(
      (tx) =>
        change({
          tx,
          actor,
          now,
          newId: deps.newId,
          randomInt: deps.randomInt,
          audit: (entry) => {
            tx.insert(auditLog)
              .values({ at: now, actorId: actor.userId, actorName: actor.name, ...entry })
              .run();
          },
        }),
      { behavior: 'immediate' },
    );
  } catch (error) {
    throw domainErrorOf(error) ?? error;
  }
}
