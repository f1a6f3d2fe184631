import { DONE } from '../../shared/contracts/common.ts';
import { labelStockEndpoints } from '../../shared/contracts/label-stocks.ts';
import type { Api } from '../http/api.ts';
import { labelFit, labelStock, listLabelFits, listLabelStocks } from '../queries/label-stocks.ts';
import { renderCalibration } from '../services/label-calibration.ts';
import { addLabelStock, editLabelStock, forgetLabelFit, saveLabelFit } from '../services/label-stock-service.ts';

export function labelStockRoutes(api: Api): void {
  const { db } = api.deps;

  api.read(labelStockEndpoints.list, () => ({ items: listLabelStocks(db), fits: listLabelFits(db) }));
  api.write(labelStockEndpoints.create, (write, { body }) => addLabelStock(write, body));
  api.write(labelStockEndpoints.edit, (write, { params, body, ifMatch }) =>
    editLabelStock(write, params.id, ifMatch, body),
  );
  api.act(labelStockEndpoints.calibration, async ({ params, query }) => ({
    fileName: 'label-calibration.pdf',
    contentType: 'application/pdf',
    content: await renderCalibration(
      labelStock(db, params.stockId),
      labelFit(db, params.stockId, query.printer ?? null),
    ),
    inline: true,
  }));
  api.write(labelStockEndpoints.fit, (write, { body }) => saveLabelFit(write, body));
  api.write(labelStockEndpoints.forgetFit, (write, { query }) => {
    forgetLabelFit(write, query.stockId, query.printer);
    return DONE;
  });
}
