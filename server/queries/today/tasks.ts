import type { Task } from '../../../shared/contracts/tasks.ts';
import type { TodayEntry } from '../../../shared/contracts/today.ts';
import { daysBetween } from '../../../shared/domain/days.ts';
import { repeatWords } from '../../../shared/domain/repeat-words.ts';
import type { Db } from '../../db/client.ts';
import { openAlerts } from '../alerts.ts';
import { tasksDueBy } from '../tasks.ts';
import { actOf, type TodayContext } from './source.ts';

/** More than this is a list to open. */
const MOST_TASKS = 8;
const READ_AT_ONCE = 100;

/** The reader's tasks that are due today or late. A test that an alert asks for already is not named twice. */
export function tasksToday(db: Db, context: TodayContext): TodayEntry[] {
  const asked = new Set(
    openAlerts(db, context.now).flatMap(({ systemId, facts, acknowledgedAt }) =>
      acknowledgedAt === null && (facts.kind === 'test_overdue' || facts.kind === 'out_of_band')
        ? [`${systemId} ${facts.parameter}`]
        : [],
    ),
  );
  const due = tasksDueBy(db, context.today, READ_AT_ONCE, context.reader).filter(
    ({ systemId, parameter }) => !asked.has(`${systemId ?? ''} ${parameter ?? ''}`),
  );
  const shown = due.length > MOST_TASKS ? due.slice(0, MOST_TASKS - 1) : due;
  const more = due.length - shown.length;
  return [...shown.map((task) => toEntry(context, task)), ...(more > 0 ? [moreTasks(more)] : [])];
}

function toEntry(context: TodayContext, task: Task): TodayEntry {
  const { id, title, systemCode, dueOn, kind, systemId } = task;
  const isTest = kind === 'test' && systemId !== null;
  const toDo = dueOn !== null && context.may('water.log');
  return {
    ...{ id: `task-${id}`, ...urgencyOf(context, task) },
    title: [systemCode === null ? title : `${systemCode}: ${title}`],
    detail: detailOf(context, task),
    act: isTest
      ? actOf(context, 'water.log', 'Test', `/water/log?system=${systemId}`, `/tasks?task=${id}`)
      : { label: 'See', to: `/tasks?task=${id}` },
    ...(toDo && !isTest ? { task: { id, dueOn } } : {}),
  };
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
