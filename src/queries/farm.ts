import { useQuery, useQueryClient } from '@tanstack/vue-query';
import { type ChangeFarm, type FarmSettings, farmEndpoints } from '@shared/contracts/farm.ts';
import { callApi } from '@/api/call-api.ts';
import { useSessionStore } from '@/stores/session.ts';

const farmKeys = { settings: ['farm', 'settings'] as const };

export function useFarmSettings() {
  return useQuery({
    queryKey: farmKeys.settings,
    queryFn: ({ signal }) => callApi(farmEndpoints.show, { signal }),
  });
}

/** Saves settings; the session shows the farm's name and reckons in its zone, so it is loaded anew. */
export function useChangeFarm(): (ifMatch: number, body: ChangeFarm) => Promise<FarmSettings> {
  const client = useQueryClient();
  const session = useSessionStore();

  return async (ifMatch, body) => {
    const saved = await callApi(farmEndpoints.change, { ifMatch, body });
    client.setQueryData(farmKeys.settings, saved);
    await session.load();
    return saved;
  };
}
