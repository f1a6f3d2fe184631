import { eq } from 'drizzle-orm';
import type { Write } from '../db/write.ts';
import { sessions } from '../db/schema/index.ts';

/** Ends every session of a person, on all their devices. */
export function endSessionsOf(write: Write, userId: string): void {
  write.tx.delete(sessions).where(eq(sessions.userId, userId)).run();
}
