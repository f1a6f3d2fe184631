import { createRequire } from 'node:module';
import PDFDocument from 'pdfkit';
import QRCode from 'qrcode';
import { glyphOf } from '../../shared/domain/glyph.ts';
import { type LabelContent, type LabelLayout, layoutLabel } from '../../shared/domain/label-layout.ts';
import {
  LABEL_SHEETS,
  type LabelSheet,
  type LabelSheetId,
  PAPERS,
  placesFor,
} from '../../shared/domain/label-sheets.ts';
import { qrRuns } from '../../shared/domain/qr-runs.ts';
import { pdfBytes } from './pdf-bytes.ts';

const POINTS_PER_MM = 72 / 25.4;
const MONO_FILE = createRequire(import.meta.url).resolve(
  '@fontsource/roboto-mono/files/roboto-mono-latin-500-normal.woff',
);
/** Fine enough not to disturb, thick enough for a printer of 600 dpi, mm. */
const HAIRLINE = 0.08;

export interface LabelRun {
  sheetId: LabelSheetId;
  labels: readonly LabelContent[];
  start: number;
  shiftX: number;
  shiftY: number;
  edges: boolean;
  title: string;
}

/** A PDF of labels in true millimetres: vector QR codes and embedded type, black on white. */
export async function renderLabelSheet(run: LabelRun): Promise<Buffer> {
  const sheet = LABEL_SHEETS[run.sheetId];
  const paper = PAPERS[sheet.paper];
  const places = placesFor(sheet, run.labels.length, run.start);
  const doc = new PDFDocument({
    autoFirstPage: false,
    size: [paper.width * POINTS_PER_MM, paper.height * POINTS_PER_MM],
    margin: 0,
    info: { Title: `Labels: ${run.title}`, Creator: 'Limestead' },
  });
  const finished = pdfBytes(doc);
  keepTrueSize(doc);
  doc.registerFont('mono', MONO_FILE);

  let openPage = -1;
  run.labels.forEach((label, index) => {
    const place = places[index];
    if (!place) return;
    if (place.page !== openPage) {
      doc.addPage();
      // From here on lengths are millimetres.
      doc.scale(POINTS_PER_MM);
      openPage = place.page;
    }
    doc.save();
    doc.translate(place.x + run.shiftX, place.y + run.shiftY);
    if (sheet.cutLines || run.edges) drawEdge(doc, sheet);
    drawLabel(doc, sheet, label);
    doc.restore();
  });
  doc.end();
  return finished;
}

function drawLabel(doc: PDFKit.PDFDocument, sheet: LabelSheet, label: LabelContent): void {
  // The smallest version that holds the text; M restores about 15 % of what algae or a scratch hide.
  const { modules } = QRCode.create(label.qrText, { errorCorrectionLevel: 'M' });
  const layout = layoutLabel(sheet, label, modules.size);
  drawQr(doc, modules, layout.qr);
  if (layout.glyph && label.glyphCode !== null) drawGlyph(doc, label.glyphCode, layout.glyph);
  for (const { text, x, y, size, anchor } of layout.texts) {
    doc.font('mono').fontSize(size).fillColor('black');
    const left = anchor === 'middle' ? x - doc.widthOfString(text) / 2 : x;
    doc.text(text, left, y, { lineBreak: false, baseline: 'alphabetic' });
  }
}

function drawQr(doc: PDFKit.PDFDocument, modules: QRCode.BitMatrix, qr: LabelLayout['qr']): void {
  const [left, top] = [qr.x + qr.quiet, qr.y + qr.quiet];
  for (const run of qrRuns(modules.size, (row, column) => modules.get(row, column) === 1)) {
    doc.rect(left + run.x * qr.module, top + run.y * qr.module, run.length * qr.module, qr.module);
  }
  doc.fill('black');
}

function drawGlyph(doc: PDFKit.PDFDocument, code: string, box: { x: number; y: number; side: number }): void {
  const glyph = glyphOf(code);
  doc.save();
  doc.translate(box.x, box.y).scale(box.side / 100);
  doc.lineWidth(glyph.stroke).lineCap('round');
  for (const { cx, cy, radius, septa } of glyph.corallites) {
    doc.circle(cx, cy, radius);
    for (const { x1, y1, x2, y2 } of septa) doc.moveTo(x1, y1).lineTo(x2, y2);
  }
  doc.stroke('black');
  doc.restore();
}

function drawEdge(doc: PDFKit.PDFDocument, { shape, width, height }: LabelSheet): void {
  if (shape === 'round') doc.circle(width / 2, height / 2, width / 2);
  else doc.rect(0, 0, width, height);
  doc.lineWidth(HAIRLINE).stroke('#999999');
}

/** Asks PDF viewers not to shrink the page to the printer's margins. */
function keepTrueSize(doc: PDFKit.PDFDocument): void {
  // pdfkit has no option for it; the document's catalogue is where PDF keeps it (ISO 32000-1, table 150).
  const { _root: root } = doc as unknown as { _root: { data: Record<string, unknown> } };
  root.data.ViewerPreferences = doc.ref({ PrintScaling: 'None' });
}
