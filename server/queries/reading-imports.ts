import { desc } from 'drizzle-orm';
import type { ReadingImport } from '../../shared/contracts/reading-imports.ts';
import type { Db } from '../db/client.ts';
import { readingImports } from '../db/schema/index.ts';

const MOST_SHOWN = 20;

/** The latest imports, newest first. */
export function listReadingImports(db: Db): ReadingImport[] {
  return db.select().from(readingImports).orderBy(desc(readingImports.at)).limit(MOST_SHOWN).all();
}
