import { DONE } from '../../shared/contracts/common.ts';
import { taskEndpoints } from '../../shared/contracts/tasks.ts';
import type { Api } from '../http/api.ts';
import { listOutcomes } from '../queries/task-outcomes.ts';
import { listTasks, showTask, taskPeople } from '../queries/tasks.ts';
import { withAlerts } from '../services/alert-service.ts';
import { completeTask, skipTask, undoOutcome } from '../services/task-outcomes.ts';
import { createTask, editTask, endTask, resumeTask } from '../services/task-service.ts';

export function taskRoutes(api: Api): void {
  const { clock } = api.deps;
  api.read(taskEndpoints.list, (db, { query, caller }) => listTasks(db, query, caller, clock.now()));
  api.read(taskEndpoints.people, (db) => ({ items: taskPeople(db) }));
  api.read(taskEndpoints.show, (db, { params }) => showTask(db, params.id));
  api.read(taskEndpoints.outcomes, (db, { query }) => listOutcomes(db, query));
  api.write(taskEndpoints.create, (write, { body }) => createTask(write, body));
  api.write(taskEndpoints.edit, (write, { params, body, ifMatch }) => editTask(write, params.id, ifMatch, body));
  api.write(taskEndpoints.end, (write, { params }) => endTask(write, params.id));
  api.write(taskEndpoints.resume, (write, { params }) => resumeTask(write, params.id));
  api.write(taskEndpoints.complete, (write, { params, body }) => {
    const settled = completeTask(write, params.id, body);
    return settled.task.systemId === null ? settled : withAlerts(write, settled.task.systemId, settled);
  });
  api.write(taskEndpoints.skip, (write, { params, body }) => skipTask(write, params.id, body));
  api.write(taskEndpoints.undo, (write, { params }) => {
    undoOutcome(write, params.id);
    return DONE;
  });
}
