import { DONE } from '../../shared/contracts/common.ts';
import { labelEndpoints } from '../../shared/contracts/labels.ts';
import type { Api } from '../http/api.ts';
import { labelPrint, listLabelPrints, printedContents } from '../queries/label-prints.ts';
import { labelFit, labelStock } from '../queries/label-stocks.ts';
import { labelContents, labelSupplies } from '../queries/labels.ts';
import { renderLabelSheet } from '../services/label-sheet.ts';
import { notePrint } from '../services/print-labels.ts';
import { takeLabels } from '../services/take-labels.ts';

export function labelRoutes(api: Api): void {
  const { db, config } = api.deps;
  /** Labels drawn so far, of the runs whose PDFs are being made. */
  const drawn = new Map<string, number>();

  api.write(labelEndpoints.print, (write, { body }) => notePrint(write, body, config.publicUrl));
  api.read(labelEndpoints.prints, (_db, { query }) => listLabelPrints(db, query));
  api.read(labelEndpoints.progress, (_db, { params }) => {
    const { id, labels } = labelPrint(db, params.id);
    return { done: drawn.get(id) ?? 0, labels };
  });
  api.act(labelEndpoints.file, async ({ params, response }) => {
    const { id, subject, stockId, printer, start, edges } = labelPrint(db, params.id);
    const { title, labels } = printedContents(db, subject, config.publicUrl);
    const stopped = new AbortController();
    response.once('close', () => {
      stopped.abort();
    });
    try {
      return {
        fileName: `labels-${title.toLowerCase().replace(/[^a-z0-9]+/g, '-')}.pdf`,
        contentType: 'application/pdf',
        content: await renderLabelSheet(
          { sheet: labelStock(db, stockId), labels, start, fit: labelFit(db, stockId, printer), edges, title },
          { onDrawn: (count) => drawn.set(id, count), signal: stopped.signal },
        ),
        inline: true,
      };
    } finally {
      drawn.delete(id);
    }
  });
  api.read(labelEndpoints.contents, (_db, { query }) => labelContents(db, query, config.publicUrl));
  api.read(labelEndpoints.supplies, () => ({ items: labelSupplies(db) }));
  api.write(labelEndpoints.take, (write, { body }) => {
    takeLabels(write, body);
    return DONE;
  });
}
