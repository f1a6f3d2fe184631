import type { Task } from '@shared/contracts/tasks.ts';
import { type Day, daysBetween } from '@shared/domain/days.ts';
import { repeatWords } from '@shared/domain/repeat-words.ts';
import { TASK_KINDS, type TaskKind } from '@shared/domain/task-kinds.ts';
import type { ParameterCode } from '@shared/domain/units.ts';
import { type Role, ROLE_LABELS } from '@shared/permissions.ts';
import { parameterOf } from '@/views/water/water-labels.ts';

const KIND_LABELS: Record<TaskKind, string> = {
  test: 'Test',
  refill: 'Mix limewater',
  changeover: 'Swap the reservoir',
  calibration: 'Calibrate',
  pump_service: 'Service a pump',
  cleaning: 'Clean',
  other: 'Something else',
};

export const KIND_CHOICES = TASK_KINDS.map((value) => ({ value, title: KIND_LABELS[value] }));

/** What a task is called until someone names it otherwise. */
export function usualTitle(kind: TaskKind | null, parameter: ParameterCode | null): string {
  if (kind === null || kind === 'other') return '';
  if (kind !== 'test') return KIND_LABELS[kind];
  const label = parameter === null ? 'the water' : parameterOf(parameter).label;
  return `Test ${label === 'pH' ? label : label.toLowerCase()}`;
}

/** Code of the system before what is to do, as on Today. */
export function taskTitle({ systemCode, title }: Pick<Task, 'systemCode' | 'title'>): string {
  return systemCode === null ? title : `${systemCode}: ${title}`;
}

/** Who reads: what is theirs anyway is not said. */
export interface TaskLineReader {
  id: string;
  role: Role;
}

/** When, how often and by whom, in one line. */
export function taskLine(task: Task, today: Day, reader: TaskLineReader | null): string {
  const late = task.dueOn === null ? 0 : daysBetween(task.dueOn, today);
  return [
    ...(late > 0 ? [late === 1 ? 'due yesterday' : `due ${late} days ago`] : []),
    ...(task.dueMinute === null ? [] : [`at ${clockOf(task.dueMinute)}`]),
    repeatWords(task.repeat),
    ...(task.reservoirCode === null ? [] : [`reservoir ${task.reservoirCode}`]),
    ...(task.assigneeName === null || task.assigneeId === reader?.id ? [] : [`for ${task.assigneeName}`]),
    ...(task.assigneeRole === null || task.assigneeRole === reader?.role
      ? []
      : [`for the ${ROLE_LABELS[task.assigneeRole].toLowerCase()}`]),
  ].join(' · ');
}

/** "08:30", from minutes after midnight. */
export function clockOf(minute: number): string {
  return `${String(Math.floor(minute / 60)).padStart(2, '0')}:${String(minute % 60).padStart(2, '0')}`;
}

/** Minutes after midnight from "08:30"; null where nothing was typed. */
export function minuteOf(clock: string | null): number | null {
  const [hour = Number.NaN, minute = Number.NaN] = (clock ?? '').split(':').map(Number);
  return Number.isInteger(hour * 60 + minute) ? hour * 60 + minute : null;
}
