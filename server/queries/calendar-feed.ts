import { createHash } from 'node:crypto';
import { and, eq, isNull } from 'drizzle-orm';
import type { Task } from '../../shared/contracts/tasks.ts';
import { addDays, type Day, instantAt } from '../../shared/domain/days.ts';
import { type CalendarEvent, calendarText, recurrenceOf } from '../../shared/domain/icalendar.ts';
import { nextDue } from '../../shared/domain/repeat-rule.ts';
import { repeatWords } from '../../shared/domain/repeat-words.ts';
import { DomainError } from '../../shared/errors.ts';
import { mayUse } from '../../shared/permissions.ts';
import type { Db } from '../db/client.ts';
import { calendarFeeds, users } from '../db/schema/index.ts';
import type { FileAnswer } from '../file-answer.ts';
import { farmOf } from './farm.ts';
import { tasksDueBy } from './tasks.ts';

const MOST_TASKS = 500;
const END_OF_PLANS: Day = '2199-12-31';
/** Work at a set time is written out for so long, each time in UTC, so that clock changes are right in every zone. */
const TIMED_DAYS = 56;
const USUAL_MINUTES = 30;

/**
 * The tasks of the person whose calendar has this secret.
 *
 * @throws {DomainError} `record.not_found` for a secret that is no one's, or of someone who left
 */
export function calendarOf(db: Db, token: string, publicUrl: string, now: number): FileAnswer {
  const tokenHash = createHash('sha256').update(token).digest('hex');
  const found = db
    .select({ person: users })
    .from(calendarFeeds)
    .innerJoin(users, eq(users.id, calendarFeeds.userId))
    .where(and(eq(calendarFeeds.tokenHash, tokenHash), isNull(users.disabledAt)))
    .get();
  if (!found || !mayUse(found.person.role, 'water.read')) {
    throw new DomainError('record.not_found', 'There is no such calendar. Make a new address under your account.');
  }
  const { id: userId, role } = found.person;
  const { name, timeZone } = farmOf(db);
  const events = tasksDueBy(db, END_OF_PLANS, MOST_TASKS, { userId, role }).flatMap((task) =>
    eventsOf(task, { publicUrl, timeZone, now }),
  );
  return {
    ...{ fileName: 'tasks.ics', contentType: 'text/calendar; charset=utf-8', inline: true },
    content: calendarText(`${name}: tasks`, events),
  };
}

interface FeedContext {
  publicUrl: string;
  timeZone: string;
  now: number;
}

function eventsOf(task: Task, { publicUrl, timeZone, now }: FeedContext): CalendarEvent[] {
  const { id, systemCode, title, dueOn, dueMinute, repeat, startsOn, note } = task;
  if (dueOn === null) return [];
  const host = new URL(publicUrl).hostname;
  const words = {
    stamp: now,
    summary: systemCode === null ? title : `${systemCode}: ${title}`,
    description: [note, repeat === null ? '' : `Due ${repeatWords(repeat)}.`].filter((text) => text !== '').join('\n'),
    url: `${publicUrl}/tasks?task=${id}`,
  };
  if (dueMinute !== null) {
    return timedDays(task, dueOn).map((day) => ({
      ...{ uid: `task-${id}-${day}@${host}`, ...words },
      when: { at: instantAt(day, dueMinute, timeZone), minutes: USUAL_MINUTES },
    }));
  }
  // A day that its rule does not name, left from a former rule, stands alone.
  const isNamed = repeat !== null && nextDue(repeat, startsOn, addDays(dueOn, -1)) === dueOn;
  return [
    {
      ...{ uid: `task-${id}@${host}`, ...words, when: { day: dueOn } },
      recurrence: isNamed ? recurrenceOf(repeat) : null,
      moreDays: repeat?.every === 'dates' ? repeat.dates.filter((day) => day > dueOn).sort() : [],
    },
  ];
}

function timedDays({ repeat, startsOn }: Task, dueOn: Day): Day[] {
  const days = [dueOn];
  if (repeat?.every === 'after_done') return days;
  const until = addDays(dueOn, TIMED_DAYS);
  for (let day = nextDue(repeat, startsOn, dueOn); day !== null && day <= until; day = nextDue(repeat, startsOn, day)) {
    days.push(day);
  }
  return days;
}
