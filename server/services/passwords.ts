import { argon2id, hash, verify } from 'argon2';

/** A hash of no one's password, so that an unknown account costs as much time as a known one. */
const dummyHash = hash('there is no such account', { type: argon2id });

/** The password's argon2id hash, with the library's memory and time cost. */
export function hashPassword(password: string): Promise<string> {
  return hash(password, { type: argon2id });
}

/** Whether the password is right. Without a hash (no such account) it takes as long and is false. */
export async function isPassword(passwordHash: string | null, password: string): Promise<boolean> {
  const matches = await verify(passwordHash ?? (await dummyHash), password);
  return matches && passwordHash !== null;
}
