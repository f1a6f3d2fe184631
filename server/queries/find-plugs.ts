import { eq, sql } from 'drizzle-orm';
import { formatPlugCode, parsePlugCode } from '../../shared/domain/plug-code.ts';
import { DomainError, type FieldError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { batches, cuts, plugs, racks, stockAccounts, systems, tanks } from '../db/schema/index.ts';

/** A plug and where it is now. `kind` is null until its first movement: it waits on the bench. */
export interface PlacedPlug {
  code: string;
  number: number;
  batchId: string;
  batchCode: string;
  lineId: string;
  accountId: string | null;
  kind: (typeof stockAccounts.$inferSelect)['kind'] | null;
  /** Cause of a loss, or the id of the order that it is picked for. */
  detail: string;
  position: string | null;
  rackId: string | null;
  rackCode: string | null;
  systemId: string | null;
  systemCode: string | null;
  /** Set where its cut was taken back. */
  undoneAt: number | null;
}

/**
 * Plugs by what was scanned or typed, in that order; a plug scanned twice comes once.
 *
 * @throws {DomainError} `record.not_found` at the fields that hold no known code, with the near right one where there is
 */
export function findPlugs(db: Db, texts: readonly string[], field = 'codes'): PlacedPlug[] {
  const parsed = texts.map((text) => parsePlugCode(text));
  const codes = parsed.flatMap((each) => ('code' in each ? [each.code] : []));
  const found = new Map(placedPlugs(db, codes).map((plug) => [plug.code, plug]));
  const fields: FieldError[] = parsed.flatMap((each, index) => {
    if ('code' in each && found.has(each.code)) return [];
    return { path: texts.length > 1 ? `${field}.${index}` : field, message: unknownPlug(texts[index] ?? '', each) };
  });
  if (fields[0]) {
    throw new DomainError('record.not_found', fields[0].message, { fields, details: suggestionIn(parsed) });
  }
  return [...new Set(codes)].flatMap((code) => found.get(code) ?? []);
}

/** One plug by what was scanned or typed. @throws {DomainError} `record.not_found` */
export function findPlug(db: Db, text: string, field = 'code'): PlacedPlug {
  const [plug] = findPlugs(db, [text], field);
  if (!plug) throw new DomainError('record.not_found', 'No plug has this code.');
  return plug;
}

function placedPlugs(db: Db, codes: readonly string[]): PlacedPlug[] {
  return db
    .select({
      code: plugs.code,
      number: plugs.number,
      batchId: plugs.batchId,
      batchCode: batches.code,
      lineId: batches.lineId,
      accountId: plugs.accountId,
      kind: stockAccounts.kind,
      detail: sql<string>`coalesce(${stockAccounts.detail}, '')`,
      position: plugs.position,
      rackId: racks.id,
      rackCode: racks.code,
      systemId: systems.id,
      systemCode: systems.code,
      undoneAt: cuts.undoneAt,
    })
    .from(plugs)
    .innerJoin(batches, eq(batches.id, plugs.batchId))
    .innerJoin(cuts, eq(cuts.id, batches.cutId))
    .leftJoin(stockAccounts, eq(stockAccounts.id, plugs.accountId))
    .leftJoin(racks, eq(racks.id, stockAccounts.rackId))
    .leftJoin(tanks, eq(tanks.id, racks.tankId))
    .leftJoin(systems, eq(systems.id, tanks.systemId))
    .where(sql`${plugs.code} IN (SELECT value FROM json_each(${JSON.stringify(codes)}))`)
    .all();
}

function unknownPlug(text: string, parsed: ReturnType<typeof parsePlugCode>): string {
  const shown = text.slice(0, 40);
  if ('code' in parsed) return `No plug has the code ${formatPlugCode(parsed.code)}.`;
  const hint = parsed.suggestion ? ` Did you mean ${formatPlugCode(parsed.suggestion)}?` : ' Scan it again.';
  return `${shown} is not a plug code.${hint}`;
}

function suggestionIn(parsed: readonly ReturnType<typeof parsePlugCode>[]): Record<string, unknown> {
  const suggestion = parsed.map((each) => ('suggestion' in each ? each.suggestion : undefined)).find(Boolean);
  return suggestion ? { suggestion } : {};
}
