import { eq } from 'drizzle-orm';
import { makePlugCode } from '../../shared/domain/plug-code.ts';
import { DomainError } from '../../shared/errors.ts';
import { plugs } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';

/** A farm would need tens of millions of plugs before this many drawn codes in a row were all taken. */
const MOST_TRIES = 20;

/** Makes the plugs of a batch, numbered from 1, each with a new random code. They are nowhere until moved. */
export function makePlugs(write: Write, batchId: string, count: number): string[] {
  return Array.from({ length: count }, (_, index) => {
    const code = unusedCode(write);
    write.tx
      .insert(plugs)
      .values({ code, batchId, number: index + 1, createdAt: write.now })
      .run();
    return code;
  });
}

function unusedCode({ tx, randomInt }: Write): string {
  for (let attempt = 0; attempt < MOST_TRIES; attempt += 1) {
    const code = makePlugCode(randomInt);
    if (!tx.select({ code: plugs.code }).from(plugs).where(eq(plugs.code, code)).get()) return code;
  }
  throw new DomainError('server.failed', 'No unused plug code could be drawn. Try again.');
}
