import { asc, desc, eq, inArray } from 'drizzle-orm';
import type { ReadingImport } from '../../shared/contracts/reading-imports.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { readingImports } from '../db/schema/index.ts';

const MOST_SHOWN = 20;

/** The latest imports, newest first. */
export function listReadingImports(db: Db): ReadingImport[] {
  return db.select().from(readingImports).orderBy(desc(readingImports.at)).limit(MOST_SHOWN).all();
}

/** @throws {DomainError} `record.not_found` */
export function readingImport(db: Db, importId: string): ReadingImport {
  const row = db.select().from(readingImports).where(eq(readingImports.id, importId)).get();
  if (!row) throw new DomainError('record.not_found', 'This import is gone. Someone took it back.');
  return row;
}

/** The import that is to be done next: one that was broken off, or the one that waits longest. */
export function nextReadingImport(db: Db): ReadingImport | null {
  const open = inArray(readingImports.state, ['waiting', 'running']);
  return db.select().from(readingImports).where(open).orderBy(asc(readingImports.at)).limit(1).get() ?? null;
}
