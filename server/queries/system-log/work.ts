import { and, desc, eq, lt } from 'drizzle-orm';
import { taskOutcomes, tasks } from '../../db/schema/index.ts';
import type { LogSource } from './source.ts';

/** Work that was done or skipped. */
export const workLog: LogSource = {
  subject: 'work',
  read: (db, { id: systemId }, { before, limit }) =>
    db
      .select({ outcome: taskOutcomes, title: tasks.title })
      .from(taskOutcomes)
      .innerJoin(tasks, eq(tasks.id, taskOutcomes.taskId))
      .where(and(eq(tasks.systemId, systemId), lt(taskOutcomes.at, before)))
      .orderBy(desc(taskOutcomes.at))
      .limit(limit)
      .all()
      .map(({ outcome: { id, at, by, kind, note }, title }) => ({
        ...{ id: `work ${id}`, subject: 'work', at, by, note, reservoirId: null },
        title: [kind === 'done' ? `${title}: done` : `${title}: skipped`],
      })),
};
