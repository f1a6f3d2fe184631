import { integer, text } from 'drizzle-orm/sqlite-core';

/** Column shapes shared by all tables, so that one kind of value is stored in one way. */
export const id = () => text('id').primaryKey();
/** An instant: milliseconds since 1970 in UTC. */
export const instant = (name: string) => integer(name);
/** A day of the farm, `YYYY-MM-DD`. */
export const day = (name: string) => text(name);
/** Counts edits of a row; `If-Match` holds the one that the editor saw. */
export const version = () => integer('version').notNull().default(1);
