import { and, eq, isNull } from 'drizzle-orm';
import type { Invitation, InvitePerson } from '../../shared/contracts/people.ts';
import type { AcceptInvitation, InvitationInfo } from '../../shared/contracts/session.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Role } from '../../shared/permissions.ts';
import type { Db } from '../db/client.ts';
import { inWrite, type Write } from '../db/write.ts';
import { mailedTokens, stores, users } from '../db/schema/index.ts';
import type { Deps } from '../deps.ts';
import { farmOf } from '../queries/farm.ts';
import { toInvitation } from '../queries/people.ts';
import { queueMail } from './mail-templates.ts';
import { type MailedToken, newToken, openToken } from './mailed-tokens.ts';
import { hashPassword } from './passwords.ts';
import { storeOfRole } from './person-service.ts';
import { assertStrongPassword } from './weak-passwords.ts';

const INVITATION_LIFE = 7 * 86_400_000;

/**
 * Invites someone by e-mail. An open invitation to the same address is replaced.
 * @throws {DomainError} `record.duplicate` when the e-mail has an account; `input.invalid` at `storeId`
 */
export function invite(write: Write, { email, role, storeId }: InvitePerson): Invitation {
  if (write.tx.select().from(users).where(eq(users.email, email)).get()) {
    throw new DomainError('record.duplicate', 'Someone with this e-mail has an account already.', {
      fields: [{ path: 'email', message: 'This e-mail has an account already.' }],
    });
  }
  const store = storeOfRole(write.tx, role, storeId ?? null);
  closeOpen(write, email);
  const row = write.tx
    .insert(mailedTokens)
    .values({
      id: write.newId(),
      kind: 'invitation',
      email,
      role,
      storeId: store?.id ?? null,
      createdBy: write.actor.name,
      ...freshLink(write, email, role, store?.name ?? null),
    })
    .returning()
    .get();
  const invitation = toInvitation(row, store?.name ?? null, write.now);
  write.audit({ action: 'invitation.created', entity: 'invitation', entityId: row.id, after: invitation });
  return invitation;
}

/** Sends the invitation again with a new link; the old one stops working. */
export function resendInvitation(write: Write, id: string): Invitation {
  const { token: row, storeName } = unusedInvitation(write.tx, id);
  const renewed = write.tx
    .update(mailedTokens)
    .set(freshLink(write, row.email, roleOf(row), storeName))
    .where(eq(mailedTokens.id, id))
    .returning()
    .get();
  write.audit({ action: 'invitation.sent_again', entity: 'invitation', entityId: id });
  return toInvitation(renewed, storeName, write.now);
}

/** Takes an invitation back; its link stops working. @throws {DomainError} `record.not_found` once it was accepted */
export function revokeInvitation(write: Write, id: string): void {
  const { token: row, storeName } = unusedInvitation(write.tx, id);
  write.tx.delete(mailedTokens).where(eq(mailedTokens.id, id)).run();
  const before = toInvitation(row, storeName, write.now);
  write.audit({ action: 'invitation.revoked', entity: 'invitation', entityId: id, before });
}

/** What the invited person is told before they accept. @throws {DomainError} `token.invalid` */
export function invitationInfo(db: Db, token: string, now: number): InvitationInfo {
  const row = openToken(db, 'invitation', token, now);
  const store = row.storeId === null ? null : db.select().from(stores).where(eq(stores.id, row.storeId)).get();
  return { email: row.email, role: roleOf(row), farmName: farmOf(db).name, storeName: store?.name ?? null };
}

/**
 * Makes the invited person's account.
 * @returns their id
 * @throws {DomainError} `token.invalid`; `input.invalid` at `password`
 */
export async function acceptInvitation(deps: Deps, { token, name, password }: AcceptInvitation): Promise<string> {
  const invitation = openToken(deps.db, 'invitation', token, deps.clock.now());
  assertStrongPassword(password, [name, invitation.email, farmOf(deps.db).name]);
  const passwordHash = await hashPassword(password);
  const { email, storeId } = invitation;
  const person = { userId: deps.newId(), name, role: roleOf(invitation), storeId };
  inWrite(deps, person, (write) => {
    const { id } = openToken(write.tx, 'invitation', token, write.now);
    write.tx
      .insert(users)
      .values({ id: person.userId, email, name, role: person.role, storeId, passwordHash, createdAt: write.now })
      .run();
    write.tx
      .update(mailedTokens)
      .set({ usedAt: write.now, userId: person.userId })
      .where(eq(mailedTokens.id, id))
      .run();
    write.audit({
      action: 'user.created',
      entity: 'user',
      entityId: person.userId,
      after: { name, email, role: person.role, storeId },
    });
  });
  return person.userId;
}

/** A new link's columns; the mail that carries it goes out with this transaction. */
function freshLink(write: Write, email: string, role: Role, storeName: string | null) {
  const { token, tokenHash } = newToken();
  queueMail(write, 'invitation', email, { token, role, storeName, invitedBy: write.actor.name });
  return { tokenHash, createdAt: write.now, expiresAt: write.now + INVITATION_LIFE };
}

function closeOpen(write: Write, email: string): void {
  write.tx
    .delete(mailedTokens)
    .where(and(eq(mailedTokens.email, email), eq(mailedTokens.kind, 'invitation'), isNull(mailedTokens.usedAt)))
    .run();
}

function unusedInvitation(db: Db, id: string): { token: MailedToken; storeName: string | null } {
  const row = db
    .select({ token: mailedTokens, storeName: stores.name })
    .from(mailedTokens)
    .leftJoin(stores, eq(stores.id, mailedTokens.storeId))
    .where(and(eq(mailedTokens.id, id), eq(mailedTokens.kind, 'invitation'), isNull(mailedTokens.usedAt)))
    .get();
  if (!row) throw new DomainError('record.not_found', 'This invitation was accepted or taken back.');
  return row;
}

function roleOf(row: MailedToken): Role {
  if (row.role === null) throw new Error(`Invitation ${row.id} names no role.`);
  return row.role;
}
