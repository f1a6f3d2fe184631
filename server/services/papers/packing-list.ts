import { dayOf } from '../../../shared/domain/days.ts';
import { gradeByCode } from '../../../shared/domain/growth.ts';
import { formatPlugCode } from '../../../shared/domain/plug-code.ts';
import type { Db } from '../../db/client.ts';
import type { FileAnswer } from '../../file-answer.ts';
import { farmOf } from '../../queries/farm.ts';
import { orderLinesOf, orderRow, pickedPlugs } from '../../queries/orders.ts';
import { progressOf } from '../../queries/pick-plan.ts';
import { storeRow } from '../../queries/stores.ts';
import { MARGIN, Paper, RIGHT } from './paper.ts';

const CODES_IN_A_ROW = 7;
const CODE_WIDTH = (RIGHT - MARGIN) / CODES_IN_A_ROW;

/** What is in the boxes, plug by plug, for the packer and for whoever opens them. */
export async function packingListFile(db: Db, orderId: string): Promise<FileAnswer> {
  const order = orderRow(db, orderId);
  return {
    fileName: `packing-list-${order.number}.pdf`,
    contentType: 'application/pdf',
    content: await renderPackingList(db, orderId),
    inline: true,
  };
}

function renderPackingList(db: Db, orderId: string): Promise<Buffer> {
  const order = orderRow(db, orderId);
  const farm = farmOf(db);
  const store = storeRow(db, order.storeId);
  const paper = new Paper(`Packing list ${order.number}`);
  paper.text(farm.name, MARGIN, MARGIN, { size: 17, bold: true });
  paper.textEnd('Packing list', RIGHT, MARGIN, { size: 17 });
  paper.textEnd(`Order ${order.number}`, RIGHT, MARGIN + 24, { size: 11, bold: true });
  paper.rule(MARGIN + 50, 1.2);
  paper.text('To', MARGIN, MARGIN + 64, { size: 8.5, soft: true });
  paper.text(store.name, MARGIN, MARGIN + 78, { size: 11, bold: true });
  const height = paper.block(store.address, MARGIN, MARGIN + 94, 260);
  const { picked } = progressOf(orderLinesOf(db, orderId));
  const facts = [
    `${picked} ${picked === 1 ? 'plug' : 'plugs'}`,
    order.boxes > 0 ? `${order.boxes} ${order.boxes === 1 ? 'box' : 'boxes'}` : 'Not packed yet',
    ...(order.packedAt === null ? [] : [`Packed ${dayOf(order.packedAt, farm.timeZone)}`]),
    ...(order.tracking === '' ? [] : [`${order.carrier} ${order.tracking}`]),
  ];
  facts.forEach((fact, index) => paper.textEnd(fact, RIGHT, MARGIN + 64 + index * 15));
  paper.y = MARGIN + 94 + Math.max(height, 44) + 22;
  drawPlugs(paper, db, orderId);
  return paper.finish(`${farm.name}   ·   Live corals: open soon, keep warm, keep this side up.`);
}

function drawPlugs(paper: Paper, db: Db, orderId: string): void {
  const plugs = pickedPlugs(db, orderId);
  for (const line of orderLinesOf(db, orderId)) {
    const codes = plugs.filter(({ orderLineId }) => orderLineId === line.id).map(({ pick }) => pick.plugCode);
    paper.room(60);
    paper.rule(paper.y);
    paper.text(`${line.lineCode} ${line.tradeName}`, MARGIN, paper.y + 9, { size: 11, bold: true });
    paper.textEnd(`${gradeByCode(line.grade).label}, ${codes.length} of ${line.quantity}`, RIGHT, paper.y + 9);
    paper.y += 30;
    for (let start = 0; start < codes.length; start += CODES_IN_A_ROW) {
      paper.room(18);
      codes.slice(start, start + CODES_IN_A_ROW).forEach((code, index) => {
        paper.text(formatPlugCode(code), MARGIN + index * CODE_WIDTH, paper.y, { mono: true, size: 9.5 });
      });
      paper.y += 16;
    }
    paper.y += 12;
  }
}
