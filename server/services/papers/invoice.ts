import type { InvoiceContent } from '../../../shared/contracts/invoices.ts';
import { DomainError } from '../../../shared/errors.ts';
import type { Db } from '../../db/client.ts';
import type { FileAnswer } from '../../file-answer.ts';
import { invoiceOf } from '../../queries/orders.ts';
import { amountText, moneyText } from '../money-text.ts';
import { MARGIN, PAGE, Paper, RIGHT } from './paper.ts';

const COLUMNS = { code: MARGIN, name: MARGIN + 44, grade: 300, quantity: 405, price: 470, amount: RIGHT };
const ROW = 21;

/** The invoice of a shipped order. @throws {DomainError} `record.not_found` before it is shipped */
export async function invoiceFile(db: Db, orderId: string): Promise<FileAnswer> {
  const invoice = invoiceOf(db, orderId);
  if (!invoice) throw new DomainError('record.not_found', 'The invoice is made when the order is shipped.');
  return {
    fileName: `invoice-${invoice.number}.pdf`,
    contentType: 'application/pdf',
    content: await renderInvoice(invoice.content),
    inline: true,
  };
}

/** Drawn from what the invoice said on its day, so that every print of it is the same. */
export function renderInvoice(content: InvoiceContent): Promise<Buffer> {
  const paper = new Paper(`Invoice ${content.number}`);
  drawHead(paper, content);
  drawLines(paper, content);
  drawTotals(paper, content);
  return paper.finish([content.farm.name, content.farm.email, content.farm.phone].filter(Boolean).join('   ·   '));
}

function drawHead(paper: Paper, { farm, store, ...content }: InvoiceContent): void {
  paper.text(farm.name, MARGIN, MARGIN, { size: 17, bold: true });
  const farmHeight = paper.block(farm.address, MARGIN, MARGIN + 24, 230, { size: 9, soft: true });
  paper.textEnd('Invoice', RIGHT, MARGIN, { size: 17 });
  paper.textEnd(`No. ${content.number}`, RIGHT, MARGIN + 24, { size: 11, bold: true });

  const top = MARGIN + 24 + Math.max(farmHeight, 24) + 26;
  paper.rule(top, 1.2);
  paper.text('Billed to', MARGIN, top + 16, { size: 8.5, soft: true });
  paper.text(store.name, MARGIN, top + 30, { size: 11, bold: true });
  const storeHeight = paper.block(store.address, MARGIN, top + 46, 240, { size: 10 });
  const facts: [string, string][] = [
    ['Issued', content.issuedOn],
    ['Ordered', content.placedOn],
    ['Order', String(content.orderNumber)],
    ['Store', store.code],
    ['Carrier', [content.carrier, content.tracking].filter(Boolean).join(' ')],
  ];
  facts.forEach(([label, value], index) => {
    const y = top + 16 + index * 15;
    paper.text(label, 350, y, { size: 9, soft: true });
    paper.textEnd(value, RIGHT, y, { size: 9.5 });
  });
  paper.y = top + 46 + Math.max(storeHeight, 48) + 26;
}

function drawLines(paper: Paper, { lines, currency }: InvoiceContent): void {
  drawColumnHeads(paper, currency);
  for (const { code, name, grade, quantity, priceMinor, amountMinor } of lines) {
    if (paper.room(ROW * 2)) drawColumnHeads(paper, currency);
    const y = paper.y;
    paper.text(code, COLUMNS.code, y, { bold: true });
    paper.text(name, COLUMNS.name, y);
    paper.text(grade, COLUMNS.grade, y, { soft: true });
    paper.textEnd(String(quantity), COLUMNS.quantity, y);
    paper.textEnd(amountText(priceMinor, currency), COLUMNS.price, y);
    paper.textEnd(amountText(amountMinor, currency), COLUMNS.amount, y);
    paper.rule(y + 16, 0.25);
    paper.y += ROW;
  }
}

function drawColumnHeads(paper: Paper, currency: string): void {
  const style = { size: 8.5, soft: true };
  const y = paper.y;
  paper.text('Line', COLUMNS.code, y, style);
  paper.text('Grade', COLUMNS.grade, y, style);
  paper.textEnd('Pieces', COLUMNS.quantity, y, style);
  paper.textEnd('Each', COLUMNS.price, y, style);
  paper.textEnd(`Amount, ${currency}`, COLUMNS.amount, y, style);
  paper.rule(y + 15);
  paper.y += 23;
}

function drawTotals(paper: Paper, content: InvoiceContent): void {
  const { currency, refundedMinor, totalMinor } = content;
  const paid = content.paidMinor - refundedMinor;
  const rows: [string, string][] = [
    ['Sum', amountText(content.subtotalMinor, currency)],
    [`Tax ${content.taxPercent} %`, amountText(content.taxMinor, currency)],
  ];
  paper.room(120);
  paper.y += 8;
  for (const [label, value] of rows) {
    paper.text(label, 350, paper.y, { soft: true });
    paper.textEnd(value, RIGHT, paper.y);
    paper.y += 17;
  }
  paper.doc
    .moveTo(350, paper.y + 1)
    .lineTo(RIGHT, paper.y + 1)
    .lineWidth(1.2)
    .stroke('#111111');
  paper.text('Total', 350, paper.y + 10, { size: 13, bold: true });
  paper.textEnd(moneyText(totalMinor, currency), RIGHT, paper.y + 10, { size: 13, bold: true });
  paper.y += 38;
  if (refundedMinor > 0) {
    const words = `Paid ${moneyText(content.paidMinor, currency)}, of which ${moneyText(refundedMinor, currency)} was given back.`;
    paper.y += paper.block(words, 350, paper.y, RIGHT - 350, { size: 9, soft: true });
  }
  const settled =
    paid >= totalMinor ? 'Paid in full. Nothing is due.' : `Due: ${moneyText(totalMinor - paid, currency)}`;
  paper.text(settled, 350, Math.min(paper.y + 4, PAGE.height - 80), { size: 10, bold: true });
}
