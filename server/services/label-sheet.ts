import { setImmediate } from 'node:timers/promises';
import PDFDocument from 'pdfkit';
import type { LabelFit } from '../../shared/domain/label-fit.ts';
import type { LabelContent } from '../../shared/domain/label-layout.ts';
import { pageOf, placesFor } from '../../shared/domain/label-places.ts';
import type { LabelMeasures } from '../../shared/domain/label-sheets.ts';
import { DomainError } from '../../shared/errors.ts';
import { drawEdge, drawLabel, MONO_FILE, POINTS_PER_MM } from './draw-label.ts';
import { pdfBytes } from './pdf-bytes.ts';

/** Drawn at a stretch; between them the server answers others. */
const LABELS_AT_A_STRETCH = 20;

interface LabelRun {
  sheet: LabelMeasures;
  labels: readonly LabelContent[];
  start: number;
  fit: LabelFit;
  edges: boolean;
  title: string;
}

/** How a run is followed, and stopped, while it is drawn. */
interface LabelRunWatch {
  onDrawn(labels: number): void;
  signal: AbortSignal;
}

/**
 * A PDF of labels in true millimetres: vector QR codes and embedded type, black on white.
 *
 * @throws {DomainError} `input.invalid` where the sheet has no such start; `service.unavailable` once stopped
 */
export async function renderLabelSheet(run: LabelRun, watch?: LabelRunWatch): Promise<Buffer> {
  const places = placesFor(run.sheet, run.labels.length, run.start);
  const doc = openLabelPdf(run.sheet, `Labels: ${run.title}`);
  const finished = pdfBytes(doc);

  let openPage = -1;
  for (const [index, label] of run.labels.entries()) {
    const place = places[index];
    if (!place) continue;
    if (place.page !== openPage) addLabelPage(doc, run.fit);
    openPage = place.page;
    doc.save();
    doc.translate(place.x, place.y);
    if (run.sheet.cutLines || run.edges) drawEdge(doc, run.sheet);
    drawLabel(doc, run.sheet, label);
    doc.restore();
    if ((index + 1) % LABELS_AT_A_STRETCH === 0) await pause(index + 1, watch);
  }
  doc.end();
  return finished;
}

/** A PDF whose pages are those of a label stock. */
export function openLabelPdf(sheet: LabelMeasures, title: string): PDFKit.PDFDocument {
  const page = pageOf(sheet);
  const doc = new PDFDocument({
    autoFirstPage: false,
    size: [page.width * POINTS_PER_MM, page.height * POINTS_PER_MM],
    margin: 0,
    info: { Title: title, Creator: 'Limestead' },
  });
  keepTrueSize(doc);
  doc.registerFont('mono', MONO_FILE);
  return doc;
}

/** A fresh page, on which lengths are millimetres, as the printer needs them. */
export function addLabelPage(doc: PDFKit.PDFDocument, fit: LabelFit): void {
  doc.addPage();
  doc.scale(POINTS_PER_MM);
  doc.translate(fit.shiftX, fit.shiftY);
  doc.scale(fit.scaleX, fit.scaleY);
}

async function pause(drawn: number, watch: LabelRunWatch | undefined): Promise<void> {
  watch?.onDrawn(drawn);
  await setImmediate();
  if (watch?.signal.aborted) throw new DomainError('service.unavailable', 'The labels were stopped.');
}

/** Asks PDF viewers not to shrink the page to the printer's margins. */
function keepTrueSize(doc: PDFKit.PDFDocument): void {
  // pdfkit has no option for it; the document's catalogue is where PDF keeps it (ISO 32000-1, table 150).
  const { _root: root } = doc as unknown as { _root: { data: Record<string, unknown> } };
  root.data.ViewerPreferences = doc.ref({ PrintScaling: 'None' });
}
