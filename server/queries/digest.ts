import type { AlertKind } from '../../shared/domain/alert-rules.ts';
import type { Reservoir } from '../../shared/contracts/reservoirs.ts';
import type { Task } from '../../shared/contracts/tasks.ts';
import { TODAY_GROUPS } from '../../shared/contracts/today.ts';
import { dayOf } from '../../shared/domain/days.ts';
import type { Db } from '../db/client.ts';
import { openAlerts, type OpenAlert } from './alerts.ts';
import { farmOf } from './farm.ts';
import { listReservoirs } from './reservoirs.ts';
import { type TaskReader, tasksDueBy } from './tasks.ts';

const MOST_TASKS = 60;

/** What a person's daily mail tells of. */
export interface Digest {
  /** The most urgent first. */
  alerts: OpenAlert[];
  /** How many more are open that somebody knows of. */
  quiet: number;
  /** Due today or late, for this person. */
  tasks: Task[];
  /** Those that are online. */
  reservoirs: Reservoir[];
}

export function digestOf(db: Db, reader: TaskReader, mutedKinds: readonly AlertKind[], now: number): Digest {
  const today = dayOf(now, farmOf(db).timeZone);
  const heard = openAlerts(db, now).filter(({ kind }) => !mutedKinds.includes(kind));
  const loud = heard.filter(({ acknowledgedAt }) => acknowledgedAt === null);
  return {
    alerts: loud.sort((a, b) => TODAY_GROUPS.indexOf(a.urgency) - TODAY_GROUPS.indexOf(b.urgency)),
    quiet: heard.length - loud.length,
    tasks: tasksDueBy(db, today, MOST_TASKS, reader),
    reservoirs: listReservoirs(db, now).filter(({ state }) => state === 'online'),
  };
}

/** Reservoirs alone, and what somebody knows of, are no reason for a mail. */
export function isWorthTelling({ alerts, tasks }: Digest): boolean {
  return alerts.length + tasks.length > 0;
}
