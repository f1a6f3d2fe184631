import { useQuery, useQueryClient } from '@tanstack/vue-query';
import {
  type EditLabelStock,
  type LabelStockFields,
  labelStockEndpoints,
  type MeasureFit,
} from '@shared/contracts/label-stocks.ts';
import { callApi } from '@/api/call-api.ts';

const stocksKey = ['label-stocks'] as const;

/** Label stocks of the farm and of the product, and what printers need to hit them. */
export function useLabelStocks() {
  return useQuery({
    queryKey: stocksKey,
    queryFn: ({ signal }) => callApi(labelStockEndpoints.list, { signal }),
  });
}

export function useLabelStockActs() {
  const client = useQueryClient();
  async function renewing<T>(call: Promise<T>): Promise<T> {
    const answer = await call;
    await client.invalidateQueries({ queryKey: stocksKey });
    return answer;
  }
  return {
    create: (body: LabelStockFields, idempotencyKey: string) =>
      renewing(callApi(labelStockEndpoints.create, { body, idempotencyKey })),
    edit: (id: string, ifMatch: number, body: EditLabelStock) =>
      renewing(callApi(labelStockEndpoints.edit, { params: { id }, ifMatch, body })),
    saveFit: (body: MeasureFit) => renewing(callApi(labelStockEndpoints.fit, { body })),
    forgetFit: (stockId: string, printer: string) =>
      renewing(callApi(labelStockEndpoints.forgetFit, { query: { stockId, printer } })),
  };
}
