import type { SetUpFarm } from '../../shared/contracts/session.ts';
import { DomainError } from '../../shared/errors.ts';
import { inWrite, type Write } from '../db/write.ts';
import { farms, users } from '../db/schema/index.ts';
import type { Deps } from '../deps.ts';
import { hasUsers } from '../queries/session.ts';
import { assertCurrency, assertTimeZone } from './farm-checks.ts';
import { hashPassword } from './passwords.ts';
import { addUsualMethods } from './test-method-service.ts';
import { assertStrongPassword } from './weak-passwords.ts';

/**
 * Makes the farm and its owner, once: whoever comes second is refused, also when both come at the same moment.
 * @returns the owner's id
 * @throws {DomainError} `rule.refused` when someone can sign in already; `input.invalid`
 */
export async function setUpFarm(deps: Deps, input: SetUpFarm): Promise<string> {
  assertEmpty(deps.db);
  assertTimeZone(input.timeZone);
  assertCurrency(input.currency);
  assertStrongPassword(input.password, [input.ownerName, input.email, input.farmName]);
  const passwordHash = await hashPassword(input.password);
  const owner = { userId: deps.newId(), name: input.ownerName, role: 'owner' as const, storeId: null };
  inWrite(deps, owner, (write) => {
    assertEmpty(write.tx);
    insertFarm(write, input);
    addUsualMethods(write);
    write.tx
      .insert(users)
      .values({
        id: owner.userId,
        email: input.email,
        name: owner.name,
        role: owner.role,
        passwordHash,
        createdAt: write.now,
      })
      .run();
    write.audit({ action: 'user.created', entity: 'user', entityId: owner.userId, after: { role: 'owner' } });
  });
  return owner.userId;
}

function insertFarm(write: Write, { farmName, timeZone, currency }: SetUpFarm): void {
  const farm = { name: farmName, timeZone, currency };
  write.tx
    .insert(farms)
    .values({ id: 1, ...farm, createdAt: write.now })
    .onConflictDoUpdate({ target: farms.id, set: farm })
    .run();
  write.audit({ action: 'farm.created', entity: 'farm', entityId: '1', after: farm });
}

function assertEmpty(db: Write['tx']): void {
  if (hasUsers(db)) throw new DomainError('rule.refused', 'This farm is set up already. Sign in instead.');
}
