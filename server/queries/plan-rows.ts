import { and, asc, count, desc, eq, inArray, isNull, lt, or, sql } from 'drizzle-orm';
import { z } from 'zod';
import type { Page } from '../../shared/contracts/common.ts';
import { Advice, AdviceFacts, type AnsweredAdvice, type DosingPlan } from '../../shared/contracts/plan.ts';
import { ADVICE_KINDS, ADVICE_RULES } from '../../shared/domain/dosing-plan/facts.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { dosingAdvice, dosingPlans, items } from '../db/schema/index.ts';
import { pageFrom, readCursor } from './cursor.ts';
import { systemRow } from './systems.ts';

export type PlanRow = typeof dosingPlans.$inferSelect;
export type AdviceRow = typeof dosingAdvice.$inferSelect;

/** The plan that runs in a system. */
export function runningPlan(db: Db, systemId: string): PlanRow | undefined {
  return db
    .select()
    .from(dosingPlans)
    .where(and(eq(dosingPlans.systemId, systemId), isNull(dosingPlans.toAt)))
    .get();
}

export function toPlan(db: Db, row: PlanRow): DosingPlan {
  const ids = row.supplements.map(({ itemId }) => itemId);
  const named = ids.length === 0 ? [] : db.select().from(items).where(inArray(items.id, ids)).all();
  return {
    ...row,
    supplements: row.supplements.map(({ itemId, amountPerDay }) => {
      const item = named.find(({ id }) => id === itemId);
      return { itemId, name: item?.name ?? 'Supplement', unit: item?.unit ?? '', amountPerDay };
    }),
  };
}

/** @throws {DomainError} `record.not_found` */
export function adviceRow(db: Db, adviceId: string): AdviceRow {
  const row = db.select().from(dosingAdvice).where(eq(dosingAdvice.id, adviceId)).get();
  if (!row) throw new DomainError('record.not_found', 'This answer is not known. Choose one from the list.');
  return row;
}

/** The last answer to a system's advice that was not taken back. */
export function lastAnswer(db: Db, systemId: string): AdviceRow | undefined {
  return db
    .select()
    .from(dosingAdvice)
    .where(and(eq(dosingAdvice.systemId, systemId), isNull(dosingAdvice.takenBackAt)))
    .orderBy(desc(dosingAdvice.at), desc(sql`rowid`))
    .limit(1)
    .get();
}

/** Advice that was answered, newest first. */
export function listAnswers(
  db: Db,
  systemId: string,
  { cursor, limit }: { cursor?: string | undefined; limit: number },
): Page<AnsweredAdvice> {
  systemRow(db, systemId);
  const wanted = eq(dosingAdvice.systemId, systemId);
  const rows = db
    .select({ answer: dosingAdvice, order: sql<number>`rowid` })
    .from(dosingAdvice)
    .where(and(wanted, cursor ? before(cursor) : undefined))
    .orderBy(desc(dosingAdvice.at), desc(sql`rowid`))
    .limit(limit + 1)
    .all();
  const total = db.select({ total: count() }).from(dosingAdvice).where(wanted).get()?.total ?? 0;
  const last = lastAnswer(db, systemId);
  return pageFrom(rows, limit, total, {
    item: ({ answer }) => toAnswer(answer, last?.id === answer.id),
    cursor: ({ answer, order }) => [answer.at, order],
  });
}

/** Plans of a system from the oldest on. */
export function planBefore(db: Db, { systemId, fromAt }: PlanRow): PlanRow | undefined {
  return db
    .select()
    .from(dosingPlans)
    .where(and(eq(dosingPlans.systemId, systemId), eq(dosingPlans.toAt, fromAt)))
    .orderBy(asc(dosingPlans.fromAt))
    .limit(1)
    .get();
}

function before(cursor: string) {
  const [at, order] = readCursor(cursor, z.tuple([z.number(), z.number()]));
  return or(lt(dosingAdvice.at, at), and(eq(dosingAdvice.at, at), lt(sql`rowid`, order)));
}

/** What was kept is read by its contract: it may have been written by an older version. */
function toAnswer({ inputs, advice, kind, rules, systemId: _, ...row }: AdviceRow, isLast: boolean): AnsweredAdvice {
  return {
    ...row,
    kind: z.enum(ADVICE_KINDS).parse(kind),
    rules: rules.flatMap((rule) => z.enum(ADVICE_RULES).safeParse(rule).data ?? []),
    facts: AdviceFacts.parse(inputs),
    advice: Advice.parse(advice),
    isLast,
  };
}
