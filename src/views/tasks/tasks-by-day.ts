import type { Task } from '@shared/contracts/tasks.ts';
import { type Day, daysBetween } from '@shared/domain/days.ts';
import { formatDay, formatLongDay } from '@/formatting/format-day.ts';

/** Tasks of one day, or of all the days before today. */
export interface TaskDay {
  key: string;
  title: string;
  tasks: Task[];
}

const DAYS_BY_NAME = 7;

/** Tasks in the order of their days: the late ones together, a week day by day, and what is further off by its date. */
export function tasksByDay(tasks: readonly Task[], today: Day): TaskDay[] {
  const days = new Map<string, TaskDay>();
  for (const task of tasks) {
    if (task.dueOn === null) continue;
    const key = task.dueOn < today ? 'late' : task.dueOn;
    const day = days.get(key) ?? { key, title: titleOf(task.dueOn, today), tasks: [] };
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
  return away < DAYS_BY_NAME ? formatLongDay(day) : formatDay(day, today);
}

/** Those of a set time first, in the order of the clock; the others keep their order. */
function byTime(a: Task, b: Task): number {
  return (a.dueOn ?? '').localeCompare(b.dueOn ?? '') || (a.dueMinute ?? 1440) - (b.dueMinute ?? 1440);
}
