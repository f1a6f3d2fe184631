import { useQuery, useQueryClient } from '@tanstack/vue-query';
import { type EditNotifications, notificationEndpoints } from '@shared/contracts/notifications.ts';
import { callApi } from '@/api/call-api.ts';

const KEY = ['account', 'notifications'] as const;

/** What the signed-in person hears of by e-mail and in their calendar. */
export function useNotificationChoices() {
  return useQuery({ queryKey: KEY, queryFn: ({ signal }) => callApi(notificationEndpoints.show, { signal }) });
}

export function useNotificationActs() {
  const client = useQueryClient();

  async function renewing<T>(act: Promise<T>): Promise<T> {
    const answer = await act;
    await client.invalidateQueries({ queryKey: KEY });
    return answer;
  }

  return {
    edit: (ifMatch: number, body: EditNotifications) =>
      renewing(callApi(notificationEndpoints.edit, { ifMatch, body })),
    renewCalendar: () => renewing(callApi(notificationEndpoints.renewCalendar, {})),
    endCalendar: () => renewing(callApi(notificationEndpoints.endCalendar, {})),
  };
}
