import { useQuery } from '@tanstack/vue-query';
import { type MaybeRefOrGetter, computed, toValue } from 'vue';
import { sessionEndpoints } from '@shared/contracts/session.ts';
import { callApi } from '@/api/call-api.ts';

const invitationKeys = { one: (token: string) => ['invitations', token] as const };

/** What an invitation is for. */
export function useInvitation(token: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => invitationKeys.one(toValue(token))),
    queryFn: ({ signal }) => callApi(sessionEndpoints.invitation, { params: { token: toValue(token) }, signal }),
  });
}
