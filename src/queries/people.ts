import { keepPreviousData, useInfiniteQuery, useQuery, useQueryClient } from '@tanstack/vue-query';
import { type MaybeRefOrGetter, computed, toValue } from 'vue';
import { type ChangePerson, type InvitePerson, peopleEndpoints } from '@shared/contracts/people.ts';
import { storeEndpoints } from '@shared/contracts/stores.ts';
import { callApi } from '@/api/call-api.ts';

const peopleKeys = {
  all: ['people'] as const,
  list: (search: string) => ['people', 'list', search] as const,
  invitations: ['people', 'invitations'] as const,
  stores: ['people', 'stores'] as const,
};

export function usePeople(search: MaybeRefOrGetter<string>) {
  return useInfiniteQuery({
    queryKey: computed(() => peopleKeys.list(toValue(search))),
    queryFn: ({ pageParam, signal }) =>
      callApi(peopleEndpoints.list, {
        query: { search: toValue(search), ...(pageParam === null ? {} : { cursor: pageParam }) },
        signal,
      }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
    placeholderData: keepPreviousData,
  });
}

export function useInvitations() {
  return useQuery({
    queryKey: peopleKeys.invitations,
    queryFn: ({ signal }) => callApi(peopleEndpoints.invitations, { query: { limit: 200 }, signal }),
  });
}

/** Stores that a buyer can belong to. */
export function useStoreChoices() {
  return useQuery({
    queryKey: peopleKeys.stores,
    queryFn: ({ signal }) => callApi(storeEndpoints.list, { query: { limit: 200 }, signal }),
    select: ({ items }) => items.filter(({ retiredAt }) => retiredAt === null),
  });
}

/** Everything that changes who belongs to the farm; each act renews what pages show. */
export function usePeopleActs() {
  const client = useQueryClient();

  async function renewing<T>(act: Promise<T>): Promise<T> {
    const answer = await act;
    await client.invalidateQueries({ queryKey: peopleKeys.all });
    return answer;
  }

  return {
    change: (id: string, ifMatch: number, body: ChangePerson) =>
      renewing(callApi(peopleEndpoints.change, { params: { id }, ifMatch, body })),
    invite: (body: InvitePerson, idempotencyKey: string) =>
      renewing(callApi(peopleEndpoints.invite, { body, idempotencyKey })),
    resend: (id: string) => renewing(callApi(peopleEndpoints.resend, { params: { id } })),
    revoke: (id: string) => renewing(callApi(peopleEndpoints.revoke, { params: { id } })),
  };
}
