import { taskOutcomes } from '../../../server/db/schema/index.ts';
import { evaluateAlerts } from '../../../server/services/alert-service.ts';
import { listAlerts } from '../../../server/queries/alerts.ts';
import { completeTask } from '../../../server/services/task-outcomes.ts';
import { renewCalendar } from '../../../server/services/notification-service.ts';
import { taskPeople } from '../../../server/queries/tasks.ts';
import { MEQ_PER_DKH } from '../../../shared/domain/units.ts';
import { givenTask } from '../given-tasks.ts';
import { givenReading, givenSystem } from '../given-water.ts';
import type { TestFarm } from '../start-farm.ts';

/** An open task, one that was done, an open alert and a person's calendar. */
export function givenTasksAndAlerts(farm: TestFarm) {
  const systemId = givenSystem(farm, { bands: [{ parameter: 'alkalinity', low: 7.5 * MEQ_PER_DKH, high: 3.3 }] });
  givenReading(farm, systemId, 7);
  farm.write((write) => evaluateAlerts(write, systemId));
  const done = givenTask(farm);
  farm.write((write) => completeTask(write, done.id, { dueOn: done.startsOn, note: '' }));
  const open = givenTask(farm);
  const userId = taskPeople(farm.db).find(({ role }) => role === 'grower')?.id ?? '';
  return {
    taskId: open.id,
    dueOn: open.startsOn,
    outcomeId: farm.db.select().from(taskOutcomes).get()?.id,
    alertId: listAlerts(farm.db, { limit: 1, state: 'open' }, farm.deps.clock.now()).items[0]?.id,
    calendarToken: farm.write((write) => renewCalendar(write, userId)),
  };
}
