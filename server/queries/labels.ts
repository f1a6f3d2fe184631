import { and, asc, eq, inArray, isNull, sql } from 'drizzle-orm';
import type { LabelContents, LabelSubject, LabelSupply } from '../../shared/contracts/labels.ts';
import type { LabelContent } from '../../shared/domain/label-layout.ts';
import { formatPlugCode, parsePlugCode, plugUrl } from '../../shared/domain/plug-code.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { batches, items, lines, lots, plugs } from '../db/schema/index.ts';
import { inGivenOrder, listOf } from './label-lists.ts';
import { boxLabels, rackLabels, tankLabels } from './place-labels.ts';

interface PlugOnLabel {
  code: string;
  number: number;
  batchId: string;
  batchCode: string;
  cutOn: string;
  lineCode: string;
}

/**
 * What the labels of a batch, of some plugs, racks or tanks, or of the boxes of an order say.
 *
 * @param origin address of the farm's pages, which the QR codes lead to
 * @throws {DomainError} `record.not_found` naming the codes that do not exist; `input.invalid` for what is no code
 */
export function labelContents(db: Db, subject: LabelSubject, origin: string): LabelContents {
  if (subject.racks !== undefined) return rackLabels(db, subject.racks, origin);
  if (subject.tanks !== undefined) return tankLabels(db, subject.tanks, origin);
  if (subject.orderId !== undefined) return boxLabels(db, subject.orderId, origin);
  const found = subject.batchId === undefined ? plugsByCode(db, subject.codes ?? '') : plugsOf(db, subject.batchId);
  const batchIds = [...new Set(found.map(({ batchId }) => batchId))];
  const [first] = found;
  return {
    title: batchIds.length === 1 && first ? `Batch ${first.batchCode}` : `Plugs of ${batchIds.length} batches`,
    batchId: batchIds.length === 1 ? (batchIds[0] ?? null) : null,
    labels: found.map((plug) => plugLabel(plug, origin)),
  };
}

/** Blank labels and how many are on hand. */
export function labelSupplies(db: Db): LabelSupply[] {
  return db
    .select({ id: items.id, name: items.name, onHand: sql<number>`coalesce(sum(${lots.remaining}), 0)` })
    .from(items)
    .leftJoin(lots, eq(lots.itemId, items.id))
    .where(and(eq(items.kind, 'label'), isNull(items.retiredAt)))
    .groupBy(items.id)
    .orderBy(asc(items.name))
    .all();
}

function plugLabel(plug: PlugOnLabel, origin: string): LabelContent & { rows: string[] } {
  return {
    qrText: plugUrl(origin, plug.code),
    code: formatPlugCode(plug.code),
    glyphCode: plug.lineCode,
    rows: [`${plug.lineCode} ${plug.number}`, `cut ${plug.cutOn}`, plug.batchCode],
  };
}

function plugsOf(db: Db, batchId: string): PlugOnLabel[] {
  const found = selectPlugs(db).where(eq(plugs.batchId, batchId)).orderBy(asc(plugs.number)).all();
  if (found.length === 0) throw new DomainError('record.not_found', 'There is no such batch, or it has no plugs.');
  return found;
}

/** The plugs in the order in which their codes were given. */
function plugsByCode(db: Db, list: string): PlugOnLabel[] {
  const codes = listOf(list).map((text) => {
    const parsed = parsePlugCode(text);
    if ('code' in parsed) return parsed.code;
    const message = `"${text.slice(0, 40)}" is not a plug code.`;
    throw new DomainError('input.invalid', message, { fields: [{ path: 'codes', message }] });
  });
  const byCode = new Map(
    selectPlugs(db)
      .where(inArray(plugs.code, codes))
      .all()
      .map((plug) => [plug.code, plug]),
  );
  return inGivenOrder(codes, byCode, 'plug');
}

function selectPlugs(db: Db) {
  return db
    .select({
      code: plugs.code,
      number: plugs.number,
      batchId: plugs.batchId,
      batchCode: batches.code,
      cutOn: batches.cutOn,
      lineCode: lines.code,
    })
    .from(plugs)
    .innerJoin(batches, eq(batches.id, plugs.batchId))
    .innerJoin(lines, eq(lines.id, batches.lineId))
    .$dynamic();
}
