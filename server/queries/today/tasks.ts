import type { Task } from '../../../shared/contracts/tasks.ts';
import type { TodayEntry } from '../../../shared/contracts/today.ts';
import { daysBetween } from '../../../shared/domain/days.ts';
import { repeatWords } from '../../../shared/domain/repeat-words.ts';
import type { Db } from '../../db/client.ts';
import { openAlerts, type OpenAlert } from '../alerts.ts';
import { tasksDueBy } from '../tasks.ts';
import { actOf, type TodayContext } from './source.ts';

/** More than this is a list to open. */
const MOST_TASKS = 8;
const READ_AT_ONCE = 100;

/** The reader's tasks that are due today or late. A test that an alert asks for already is not named twice. */
export function tasksToday(db: Db, context: TodayContext): TodayEntry[] {
  const asked = new Set(openAlerts(db, context.now).flatMap(asksFor));
  const due = tasksDueBy(db, context.today, READ_AT_ONCE, context.reader).filter((task) => !asked.has(workOf(task)));
  const shown = due.length > MOST_TASKS ? due.slice(0, MOST_TASKS - 1) : due;
  const more = due.length - shown.length;
  return [...shown.map((task) => toEntry(context, task)), ...(more > 0 ? [moreTasks(more)] : [])];
}

/** What an alert that nobody acknowledged asks for, in the words of {@link workOf}. */
function asksFor({ systemId, facts, acknowledgedAt }: OpenAlert): string[] {
  if (acknowledgedAt !== null) return [];
  if (facts.kind === 'test_overdue' || facts.kind === 'out_of_band') return [`${systemId} test ${facts.parameter}`];
  return facts.kind === 'reservoir_empty' ? [`${systemId} changeover`] : [];
}

function workOf({ systemId, kind, parameter }: Task): string {
  return [systemId, kind, parameter].filter((part) => part !== null).join(' ');
}

function toEntry(context: TodayContext, task: Task): TodayEntry {
  const { id, title, systemCode, dueOn } = task;
  const there = actThere(context, task);
  const toDo = dueOn !== null && context.may('water.log') && there === null;
  return {
    ...{ id: `task-${id}`, ...urgencyOf(context, task) },
    title: [systemCode === null ? title : `${systemCode}: ${title}`],
    detail: detailOf(context, task),
    act: there ?? { label: 'See', to: `/tasks?task=${id}` },
    ...(toDo ? { task: { id, dueOn } } : {}),
  };
}

/** What is logged elsewhere settles its task there; null for what is only said to be done. */
function actThere(context: TodayContext, { id, kind, systemId }: Task): TodayEntry['act'] | null {
  if (systemId === null) return null;
  const act = (label: string, to: string) => actOf(context, 'water.log', label, to, `/tasks?task=${id}`);
  if (kind === 'test') return act('Test', `/water/log?system=${systemId}`);
  if (kind === 'refill') return act('Mix', `/water/mix?system=${systemId}`);
  return kind === 'changeover' ? act('Swap', `/water/systems/${systemId}`) : null;
}

/** Single work at a set time, such as a test after an overdose, can't wait once its time has come. */
function urgencyOf(
  { now, today }: TodayContext,
  { dueOn, dueMinute, lateFrom, repeat }: Task,
): Pick<TodayEntry, 'tone' | 'group'> {
  const isLate = lateFrom !== null && lateFrom <= now;
  if (isLate && repeat === null && dueMinute !== null) return { tone: 'brick', group: 'now' };
  return { tone: isLate || (dueOn !== null && dueOn < today) ? 'ochre' : 'slate', group: 'today' };
}

function detailOf({ today }: TodayContext, { dueOn, dueMinute, repeat, assigneeName }: Task): TodayEntry['detail'] {
  const late = dueOn === null ? 0 : daysBetween(dueOn, today);
  const when =
    late > 0
      ? `Due ${late === 1 ? 'yesterday' : `${late} days ago`}`
      : dueMinute === null
        ? 'Due today'
        : `Due at ${clockWords(dueMinute)}`;
  const often = repeat === null ? '' : `, ${repeatWords(repeat)}`;
  return [`${when}${often}${assigneeName === null ? '' : `; for ${assigneeName}`}.`];
}

function clockWords(minute: number): string {
  return `${String(Math.floor(minute / 60)).padStart(2, '0')}:${String(minute % 60).padStart(2, '0')}`;
}

function moreTasks(more: number): TodayEntry {
  return {
    ...{ id: 'tasks-more', tone: 'slate', group: 'today' },
    title: [`${more} more tasks`],
    detail: ['They are due today or late.'],
    act: { label: 'See all', to: '/tasks' },
  };
}
