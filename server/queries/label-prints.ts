import { and, count, desc, eq, lt, or } from 'drizzle-orm';
import { z } from 'zod';
import { instant, type Page } from '../../shared/contracts/common.ts';
import type { LabelContents, LabelPrint, PrintedSubject } from '../../shared/contracts/labels.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { labelPrints } from '../db/schema/index.ts';
import { pageFrom, readCursor } from './cursor.ts';
import { labelStock } from './label-stocks.ts';
import { labelContents } from './labels.ts';

type LabelPrintRow = typeof labelPrints.$inferSelect;

const Position = z.tuple([instant, z.uuid()]);

/** Runs of labels, the latest first. */
export function listLabelPrints(
  db: Db,
  { cursor, limit }: { cursor?: string | undefined; limit: number },
): Page<LabelPrint> {
  const [at, id] = cursor === undefined ? [] : readCursor(cursor, Position);
  const after =
    at === undefined || id === undefined
      ? undefined
      : or(lt(labelPrints.at, at), and(eq(labelPrints.at, at), lt(labelPrints.id, id)));
  const rows = db
    .select()
    .from(labelPrints)
    .where(after)
    .orderBy(desc(labelPrints.at), desc(labelPrints.id))
    .limit(limit + 1)
    .all();
  const total = db.select({ value: count() }).from(labelPrints).get()?.value ?? 0;
  return pageFrom(rows, limit, total, {
    item: (row) => toLabelPrint(db, row),
    cursor: (row) => [row.at, row.id],
  });
}

/** @throws {DomainError} `record.not_found` */
export function labelPrint(db: Db, id: string): LabelPrint {
  const row = db.select().from(labelPrints).where(eq(labelPrints.id, id)).get();
  if (!row) throw new DomainError('record.not_found', 'There is no such run of labels.');
  return toLabelPrint(db, row);
}

export function toLabelPrint(db: Db, { printer, ...row }: LabelPrintRow): LabelPrint {
  return { ...row, printer: printer === '' ? null : printer, stockName: labelStock(db, row.stockId).name };
}

/** The labels of a run; @throws {DomainError} `input.invalid` where the subject has none there */
export function printedContents(db: Db, { from = 1, to, ...subject }: PrintedSubject, origin: string): LabelContents {
  const contents = labelContents(db, subject, origin);
  const labels = contents.labels.slice(from - 1, to);
  if (labels.length > 0) return { ...contents, labels };
  const message = `There are labels 1 to ${contents.labels.length}.`;
  throw new DomainError('input.invalid', message, { fields: [{ path: 'subject.from', message }] });
}
