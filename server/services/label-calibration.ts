import { calibrationRules, type LabelFit } from '../../shared/domain/label-fit.ts';
import { cornerOf, labelsOn, pageOf } from '../../shared/domain/label-places.ts';
import type { LabelSheet } from '../../shared/domain/label-sheets.ts';
import { drawEdge } from './draw-label.ts';
import { addLabelPage, openLabelPdf } from './label-sheet.ts';
import { pdfBytes } from './pdf-bytes.ts';

const RULE_LINE = 0.2;

/** A page with the edges of all labels and two rules to measure, mm; drawn as the fit says, to find or to check it. */
export async function renderCalibration(sheet: LabelSheet, fit: LabelFit): Promise<Buffer> {
  const doc = openLabelPdf(sheet, `Calibration: ${sheet.name}`);
  const finished = pdfBytes(doc);
  addLabelPage(doc, fit);
  for (let place = 1; place <= labelsOn(sheet); place += 1) {
    const { x, y } = cornerOf(sheet, place);
    doc.save();
    doc.translate(x, y);
    drawEdge(doc, sheet);
    doc.restore();
  }
  drawRules(doc, sheet);
  doc.end();
  return finished;
}

function drawRules(doc: PDFKit.PDFDocument, sheet: LabelSheet): void {
  const { left, top, across, down } = calibrationRules(sheet);
  const tick = Math.min(...Object.values(pageOf(sheet))) < 60 ? 1 : 2;
  doc.lineWidth(RULE_LINE).lineCap('butt');
  doc.moveTo(left, top).lineTo(left + across, top);
  doc.moveTo(left, top).lineTo(left, top + down);
  for (let mm = 0; mm <= across; mm += 1)
    doc.moveTo(left + mm, top).lineTo(left + mm, top + lengthOf(mm, across, tick));
  for (let mm = 0; mm <= down; mm += 1) doc.moveTo(left, top + mm).lineTo(left + lengthOf(mm, down, tick), top + mm);
  doc.stroke('black');
  if (tick < 2) return;
  doc.font('mono').fontSize(3).fillColor('black');
  const options = { lineBreak: false, baseline: 'alphabetic' } as const;
  for (let mm = 10; mm < across; mm += 10) doc.text(String(mm), left + mm + 0.6, top + 7.5, options);
  for (let mm = 10; mm < down; mm += 10) doc.text(String(mm), left + 7.5, top + mm - 0.6, options);
  doc.text(`across ${across} mm, ${left} mm from the left edge`, left + 12, top + 14, options);
  doc.text(`down ${down} mm, ${top} mm from the top edge`, left + 12, top + 19, options);
}

/** Longer ticks at tens and fives, the longest at both ends. */
function lengthOf(mm: number, end: number, tick: number): number {
  if (mm === 0 || mm === end) return 4 * tick;
  return mm % 10 === 0 ? 3 * tick : mm % 5 === 0 ? 2 * tick : tick;
}
