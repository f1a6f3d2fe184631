import { DONE } from '../../shared/contracts/common.ts';
import { notificationEndpoints } from '../../shared/contracts/notifications.ts';
import type { Api } from '../http/api.ts';
import { calendarOf } from '../queries/calendar-feed.ts';
import { showChoices } from '../queries/notifications.ts';
import { editChoices, endCalendar, renewCalendar } from '../services/notification-service.ts';

/** What a person hears of by e-mail and in their calendar. */
export function notificationRoutes(api: Api): void {
  const { clock, config } = api.deps;
  api.read(notificationEndpoints.show, (db, { caller }) => showChoices(db, caller.userId));
  api.write(notificationEndpoints.edit, (write, { caller, ifMatch, body }) =>
    editChoices(write, caller.userId, ifMatch, body),
  );
  api.write(notificationEndpoints.renewCalendar, (write, { caller }) => ({
    url: `${config.publicUrl}/api/calendar/${renewCalendar(write, caller.userId)}.ics`,
  }));
  api.write(notificationEndpoints.endCalendar, (write, { caller }) => {
    endCalendar(write, caller.userId);
    return DONE;
  });
  api.read(notificationEndpoints.calendar, (db, { params }) =>
    calendarOf(db, params.token, config.publicUrl, clock.now()),
  );
}
