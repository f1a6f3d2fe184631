import { useQuery } from '@tanstack/vue-query';
import { makeUpWaterEndpoints } from '@shared/contracts/make-up-water.ts';
import { saltBatchEndpoints } from '@shared/contracts/salt-batches.ts';
import { waterChangePlanEndpoints } from '@shared/contracts/water-change-plans.ts';
import { callApi } from '@/api/call-api.ts';

const KEY = ['water', 'new-water'] as const;

export function useSaltBatches() {
  return useQuery({
    queryKey: [...KEY, 'batches'],
    queryFn: ({ signal }) => callApi(saltBatchEndpoints.list, { signal }),
    select: ({ items }) => items,
  });
}

export function useMakeUpWater() {
  return useQuery({
    queryKey: [...KEY, 'make-up'],
    queryFn: ({ signal }) => callApi(makeUpWaterEndpoints.show, { signal }),
  });
}

export function useWaterChangePlans() {
  return useQuery({
    queryKey: [...KEY, 'plans'],
    queryFn: ({ signal }) => callApi(waterChangePlanEndpoints.list, { signal }),
  });
}
