import { DONE } from '../../shared/contracts/common.ts';
import { labelEndpoints } from '../../shared/contracts/labels.ts';
import type { Api } from '../http/api.ts';
import { labelContents, labelSupplies } from '../queries/labels.ts';
import { renderLabelSheet } from '../services/label-sheet.ts';
import { takeLabels } from '../services/take-labels.ts';

export function labelRoutes(api: Api): void {
  const { db, config } = api.deps;

  api.act(labelEndpoints.print, async ({ query }) => {
    const { sheet, start, shiftX, shiftY, edges, ...subject } = query;
    const { title, labels } = labelContents(db, subject, config.publicUrl);
    return {
      fileName: `labels-${title.toLowerCase().replace(/[^a-z0-9]+/g, '-')}.pdf`,
      contentType: 'application/pdf',
      content: await renderLabelSheet({ sheetId: sheet, labels, start, shiftX, shiftY, edges: edges === '1', title }),
      inline: true,
    };
  });
  api.read(labelEndpoints.contents, (_db, { query }) => labelContents(db, query, config.publicUrl));
  api.read(labelEndpoints.supplies, () => ({ items: labelSupplies(db) }));
  api.write(labelEndpoints.take, (write, { body }) => {
    takeLabels(write, body);
    return DONE;
  });
}
