import { useQuery } from '@tanstack/vue-query';
import { type MaybeRefOrGetter, computed, toValue } from 'vue';
import { publicEndpoints } from '@shared/contracts/public.ts';
import { callApi } from '@/api/call-api.ts';

/** The public side of a plug. */
export function usePublicPlug(code: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => ['public-plugs', toValue(code)]),
    queryFn: ({ signal }) => callApi(publicEndpoints.plug, { params: { code: toValue(code) }, signal }),
  });
}
