import { useQuery } from '@tanstack/vue-query';
import { testMethodEndpoints } from '@shared/contracts/test-methods.ts';
import { callApi } from '@/api/call-api.ts';

export function useTestMethods() {
  return useQuery({
    queryKey: ['water', 'test-methods'],
    queryFn: ({ signal }) => callApi(testMethodEndpoints.list, { signal }),
    select: ({ items }) => items,
  });
}
