import { createRequire } from 'node:module';
import QRCode from 'qrcode';
import { glyphOf } from '../../shared/domain/glyph.ts';
import { type LabelContent, type LabelLayout, layoutLabel } from '../../shared/domain/label-layout.ts';
import type { LabelMeasures } from '../../shared/domain/label-sheets.ts';
import { qrRuns } from '../../shared/domain/qr-runs.ts';

export const POINTS_PER_MM = 72 / 25.4;
export const MONO_FILE = createRequire(import.meta.url).resolve(
  '@fontsource/roboto-mono/files/roboto-mono-latin-500-normal.woff',
);
/** Fine enough not to disturb, thick enough for a printer of 600 dpi, mm. */
const HAIRLINE = 0.08;

/** Draws a label with its top left corner at the origin; lengths are mm. */
export function drawLabel(doc: PDFKit.PDFDocument, sheet: LabelMeasures, label: LabelContent): void {
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

/** The edge of a label whose top left corner is the origin. */
export function drawEdge(doc: PDFKit.PDFDocument, { shape, width, height }: LabelMeasures): void {
  if (shape === 'round') doc.circle(width / 2, height / 2, width / 2);
  else doc.rect(0, 0, width, height);
  doc.lineWidth(HAIRLINE).stroke('#999999');
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
