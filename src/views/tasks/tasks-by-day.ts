import type { Task } from '@shared/contracts/tasks.ts';
import { type Day, daysBetween } from '@shared/domain/days.ts';
import { formatLongDay } from '@/formatting/format-day.ts';

/** Tasks of one day, or of all the days before today. */
export interface TaskDay {
  key: string;
  title: string;
  /** Of several days, so that each task names its own. */
  isLater: boolean;
  tasks: Task[];
}

const DAYS_BY_NAME = 7;

/** Tasks in the order of their days: the late ones together, a week day by day, and what is further off together. */
export function tasksByDay(tasks: readonly Task[], today: Day): TaskDay[] {
  const days = new Map<string, TaskDay>();
  for (const task of tasks) {
    if (task.dueOn === null) continue;
    const isLater = daysBetween(today, task.dueOn) >= DAYS_BY_NAME;
    const key = isLater ? 'later' : task.dueOn < today ? 'late' : task.dueOn;
    const day = days.get(key) ?? { key, title: isLater ? 'Later' : titleOf(task.dueOn, today), isLater, tasks: [] };
    day.tasks.push(task);
    days.set(key, day);
  }
  for (const day of days.values()) day.tasks.sort(byTime);
  return [...days.values()];
}

function titleOf(day: Day, today: Day): string {
  const away = daysBetween(today, day);
  if (away < 0) return 'Late';
  if (away === 0) return 'Today';
  if (away === 1) return 'Tomorrow';
  return formatLongDay(day);
}

/** Those of a set time first, in the order of the clock; the others by system. */
function byTime(a: Task, b: Task): number {
  return (
    (a.dueOn ?? '').localeCompare(b.dueOn ?? '') ||
    (a.dueMinute ?? 1440) - (b.dueMinute ?? 1440) ||
    (a.systemCode ?? '').localeCompare(b.systemCode ?? '') ||
    a.title.localeCompare(b.title)
  );
}
