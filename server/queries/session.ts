import { asc, count, eq } from 'drizzle-orm';
import type { Session, SessionUser } from '../../shared/contracts/session.ts';
import type { Role } from '../../shared/permissions.ts';
import type { Config } from '../config.ts';
import type { Db } from '../db/client.ts';
import { stores, users } from '../db/schema/index.ts';
import { findFarm } from './farm.ts';

/** What each demo person can try, shown beside their sign-in. */
const DEMO_ROLES: Record<Role, string> = {
  owner: 'Sees and changes everything: prices, costs, people and settings',
  grower: 'Tests water, mixes limewater, cuts, scans and keeps the supplies',
  sales: 'Looks after stores, picks and packs their orders',
  viewer: 'Reads and exports records, costs and the audit log',
  buyer: 'Orders frags for one store and pays for them',
};

/** Who is signed in, on which farm, and whether the farm must be set up first. */
export function sessionOf(
  db: Db,
  config: Pick<Config, 'demo'>,
  signedIn: { userId: string; csrfToken: string } | null,
): Session {
  const farm = findFarm(db);
  return {
    user: signedIn ? sessionUser(db, signedIn.userId) : null,
    farm: farm && { name: farm.name, timeZone: farm.timeZone, currency: farm.currency },
    csrfToken: signedIn?.csrfToken ?? '',
    needsSetup: !hasUsers(db),
    demoSignIns: config.demo ? demoSignIns(db) : [],
  };
}

/** Whether anyone can sign in yet. */
export function hasUsers(db: Db): boolean {
  return (db.select({ users: count() }).from(users).get()?.users ?? 0) > 0;
}

function sessionUser(db: Db, userId: string): SessionUser | null {
  const row = db
    .select({ user: users, storeName: stores.name })
    .from(users)
    .leftJoin(stores, eq(stores.id, users.storeId))
    .where(eq(users.id, userId))
    .get();
  if (!row) return null;
  const { id, name, email, role, storeId } = row.user;
  return { id, name, email, role, storeId, storeName: row.storeName };
}

function demoSignIns(db: Db): Session['demoSignIns'] {
  return db
    .select()
    .from(users)
    .where(eq(users.demo, true))
    .orderBy(asc(users.createdAt), asc(users.id))
    .all()
    .filter((user) => user.disabledAt === null)
    .map(({ name, email, role }) => ({ name, email, role, does: DEMO_ROLES[role] }));
}
