import type { CreateTask, Task } from '../../shared/contracts/tasks.ts';
import { createTask } from '../../server/services/task-service.ts';
import type { TestFarm } from './start-farm.ts';

/** A daily task for anyone, from today on, unless said otherwise. */
export function givenTask(farm: TestFarm, fields: Partial<CreateTask> = {}, cause = ''): Task {
  return farm.write((write) =>
    createTask(
      write,
      {
        ...{ kind: 'other', title: 'Rinse the filter socks', systemId: null, reservoirId: null, parameter: null },
        ...{ repeat: { every: 'days', interval: 1 }, startsOn: '2026-03-02', dueMinute: null },
        ...{ assigneeId: null, assigneeRole: null, note: '' },
        ...fields,
      },
      cause,
    ),
  );
}
