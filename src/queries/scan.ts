import { useQuery, useQueryClient } from '@tanstack/vue-query';
import { stockEndpoints } from '@shared/contracts/stock.ts';
import type { LossCause, LossSeen } from '@shared/domain/losses.ts';
import { callApi } from '@/api/call-api.ts';

const RACK_CHOICES = ['racks', 'choices'];

/** Racks by code, to know a rack's label from a plug's. */
export function useRackChoices() {
  return useQuery({
    queryKey: RACK_CHOICES,
    queryFn: ({ signal }) => callApi(stockEndpoints.listRacks, { query: {}, signal }),
  });
}

/**
 * The acts of the scan page. Each takes the idempotency key of its scan, so that a scan that got no answer can be sent
 * again and counts once.
 */
export function useScanActs() {
  const client = useQueryClient();

  /** An act on stock shows on many pages: each asks anew when it is opened next. */
  async function changing<T>(call: Promise<T>): Promise<T> {
    const answer = await call;
    await client.invalidateQueries({ refetchType: 'none' });
    // How many positions of the rack are free is said on the scan page itself.
    void client.invalidateQueries({ queryKey: RACK_CHOICES });
    return answer;
  }

  return {
    findPlug: (code: string) => callApi(stockEndpoints.showPlug, { params: { code } }),
    place: (code: string, rackId: string, startPosition: string | null, idempotencyKey: string) =>
      changing(
        callApi(stockEndpoints.placePlugs, {
          body: { codes: [code], rackId, ...(startPosition === null ? {} : { startPosition }) },
          idempotencyKey,
        }),
      ),
    recordLoss: (code: string, seen: LossSeen, cause: LossCause, idempotencyKey: string) =>
      changing(callApi(stockEndpoints.recordLoss, { body: { codes: [code], seen, cause }, idempotencyKey })),
    measure: (plugCode: string, sizeMm: number, idempotencyKey: string) =>
      changing(callApi(stockEndpoints.measure, { body: { plugCode, sizesMm: [sizeMm] }, idempotencyKey })),
    undoAct: (groupId: string) =>
      changing(callApi(stockEndpoints.undoAct, { params: { groupId }, body: { note: 'Undone at the scanner' } })),
    undoMeasurement: (id: string) => changing(callApi(stockEndpoints.undoMeasurement, { params: { id } })),
  };
}
