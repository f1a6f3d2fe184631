import type { AlertKind } from '../../shared/domain/alert-rules.ts';
import type { Reservoir } from '../../shared/contracts/reservoirs.ts';
import type { Task } from '../../shared/contracts/tasks.ts';
import { dayOf } from '../../shared/domain/days.ts';
import type { Db } from '../db/client.ts';
import { openAlerts, type OpenAlert } from './alerts.ts';
import { farmOf } from './farm.ts';
import { listReservoirs } from './reservoirs.ts';
import { type TaskReader, tasksDueBy } from './tasks.ts';

const MOST_TASKS = 60;

/** What a person's daily mail tells of. */
export interface Digest {
  alerts: OpenAlert[];
  /** Due today or late, for this person. */
  tasks: Task[];
  /** Those that are online. */
  reservoirs: Reservoir[];
}

export function digestOf(db: Db, reader: TaskReader, mutedKinds: readonly AlertKind[], now: number): Digest {
  const today = dayOf(now, farmOf(db).timeZone);
  return {
    alerts: openAlerts(db, now).filter(({ kind }) => !mutedKinds.includes(kind)),
    tasks: tasksDueBy(db, today, MOST_TASKS, reader),
    reservoirs: listReservoirs(db, now).filter(({ state }) => state === 'online'),
  };
}

/** Reservoirs alone are no reason for a mail. */
export function isWorthTelling({ alerts, tasks }: Digest): boolean {
  return alerts.length + tasks.length > 0;
}
