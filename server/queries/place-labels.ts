import { eq, inArray } from 'drizzle-orm';
import type { LabelContents } from '../../shared/contracts/labels.ts';
import { boxCode, boxUrl, rackUrl, tankUrl } from '../../shared/domain/scan-text.ts';
import type { Db } from '../db/client.ts';
import { racks, systems, tanks } from '../db/schema/index.ts';
import { inGivenOrder, listOf } from './label-lists.ts';
import { orderRow } from './orders.ts';
import { storeRow } from './stores.ts';

type PlaceLabel = LabelContents['labels'][number];

export function rackLabels(db: Db, list: string, origin: string): LabelContents {
  const codes = listOf(list.toUpperCase());
  const rows = db
    .select({ code: racks.code, tankCode: tanks.code, systemCode: systems.code })
    .from(racks)
    .innerJoin(tanks, eq(tanks.id, racks.tankId))
    .innerJoin(systems, eq(systems.id, tanks.systemId))
    .where(inArray(racks.code, codes))
    .all();
  const found = inGivenOrder(codes, new Map(rows.map((row) => [row.code, row])), 'rack');
  const labels = found.map(({ code, tankCode, systemCode }) =>
    placeLabel(code, rackUrl(origin, code), [`tank ${tankCode}`, `system ${systemCode}`]),
  );
  return titled('Rack', 'racks', labels);
}

export function tankLabels(db: Db, list: string, origin: string): LabelContents {
  const codes = listOf(list.toUpperCase());
  const rows = db
    .select({ code: tanks.code, name: tanks.name, systemCode: systems.code })
    .from(tanks)
    .innerJoin(systems, eq(systems.id, tanks.systemId))
    .where(inArray(tanks.code, codes))
    .all();
  const found = inGivenOrder(codes, new Map(rows.map((row) => [row.code, row])), 'tank');
  const labels = found.map(({ code, name, systemCode }) =>
    placeLabel(code, tankUrl(origin, code), [name, `system ${systemCode}`]),
  );
  return titled('Tank', 'tanks', labels);
}

/** A label for each box of an order; for one where they are not counted yet. */
export function boxLabels(db: Db, orderId: string, origin: string): LabelContents {
  const order = orderRow(db, orderId);
  const store = storeRow(db, order.storeId);
  const boxes = Math.max(1, order.boxes);
  return {
    title: `Boxes of order ${order.number}`,
    batchId: null,
    labels: Array.from({ length: boxes }, (_, index) => {
      const code = boxCode(order.number, index + 1);
      const rows = [`box ${index + 1} of ${boxes}`, store.code, ...(order.shipOn ? [`ship ${order.shipOn}`] : [])];
      return placeLabel(code, boxUrl(origin, code), rows);
    }),
  };
}

function placeLabel(code: string, qrText: string, rows: string[]): PlaceLabel {
  return { qrText, code, glyphCode: null, rows };
}

function titled(one: string, many: string, labels: PlaceLabel[]): LabelContents {
  const title = labels.length === 1 ? `${one} ${labels[0]?.code ?? ''}` : `${labels.length} ${many}`;
  return { title, batchId: null, labels };
}
