import { and, asc, eq, inArray, isNull, sql } from 'drizzle-orm';
import type { LabelContents, LabelSubject, LabelSupply } from '../../shared/contracts/labels.ts';
import type { LabelContent } from '../../shared/domain/label-layout.ts';
import { formatPlugCode, parsePlugCode, plugUrl } from '../../shared/domain/plug-code.ts';
import { rackUrl } from '../../shared/domain/scan-text.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { batches, items, lines, lots, plugs, racks, systems, tanks } from '../db/schema/index.ts';

interface PlugOnLabel {
  code: string;
  number: number;
  batchId: string;
  batchCode: string;
  cutOn: string;
  lineCode: string;
}

/**
 * What the labels of a batch, of some plugs or of some racks say.
 *
 * @param origin address of the farm's pages, which the QR codes lead to
 * @throws {DomainError} `record.not_found` naming the codes that do not exist; `input.invalid` for what is no code
 */
export function labelContents(db: Db, subject: LabelSubject, origin: string): LabelContents {
  if (subject.racks !== undefined) return rackLabels(db, listOf(subject.racks), origin);
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

function rackLabels(db: Db, codes: readonly string[], origin: string): LabelContents {
  const upper = codes.map((code) => code.toUpperCase());
  const rows = db
    .select({ code: racks.code, tankCode: tanks.code, systemCode: systems.code })
    .from(racks)
    .innerJoin(tanks, eq(tanks.id, racks.tankId))
    .innerJoin(systems, eq(systems.id, tanks.systemId))
    .where(inArray(racks.code, upper))
    .all();
  const found = inGivenOrder(upper, new Map(rows.map((row) => [row.code, row])), 'rack');
  return {
    title: found.length === 1 ? `Rack ${found[0]?.code ?? ''}` : `${found.length} racks`,
    batchId: null,
    labels: found.map(({ code, tankCode, systemCode }) => ({
      qrText: rackUrl(origin, code),
      code,
      glyphCode: null,
      rows: [`tank ${tankCode}`, `system ${systemCode}`],
    })),
  };
}

function inGivenOrder<Found>(codes: readonly string[], byCode: ReadonlyMap<string, Found>, noun: string): Found[] {
  const missing = codes.filter((code) => !byCode.has(code));
  if (missing.length > 0) {
    const shown = missing.slice(0, 5).join(', ');
    throw new DomainError(
      'record.not_found',
      `There is no ${noun} ${shown}${missing.length > 5 ? ' and others' : ''}.`,
      {
        details: { missing: missing.slice(0, 100) },
      },
    );
  }
  return codes.flatMap((code) => byCode.get(code) ?? []);
}

function listOf(text: string): string[] {
  const parts = text
    .split(',')
    .map((part) => part.trim())
    .filter((part) => part !== '');
  return [...new Set(parts)];
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
