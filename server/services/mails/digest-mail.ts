import { eq } from 'drizzle-orm';
import { z } from 'zod';
import type { Reservoir } from '../../../shared/contracts/reservoirs.ts';
import type { Task } from '../../../shared/contracts/tasks.ts';
import { type Day, dayOf, daysBetween } from '../../../shared/domain/days.ts';
import { users } from '../../db/schema/index.ts';
import type { Deps } from '../../deps.ts';
import type { OpenAlert } from '../../queries/alerts.ts';
import { type Digest, digestOf } from '../../queries/digest.ts';
import { farmOf } from '../../queries/farm.ts';
import { choicesRow } from '../../queries/notifications.ts';
import type { MailBody } from '../mail-templates.ts';
import { mailChoiceNote } from './alert-mail.ts';
import { mailBody } from './mail-layout.ts';
import { clockText, plainWords } from './plain-words.ts';

const Data = z.object({ userId: z.string() });
const MOST_TASKS = 15;
const MOST_ALERTS = 10;

/** The day's alerts, tasks and reservoirs, as they stand when the mail goes out. */
export function digestMail(deps: Deps, data: Record<string, unknown>): MailBody {
  const { userId } = Data.parse(data);
  const { db, clock, config } = deps;
  const person = db.select().from(users).where(eq(users.id, userId)).get();
  if (!person) throw new Error(`Person ${userId} is not known.`);
  const { name: farmName, timeZone } = farmOf(db);
  const now = clock.now();
  const digest = digestOf(db, { userId, role: person.role }, choicesRow(db, userId)?.mutedKinds ?? [], now);
  const summary = summaryOf(digest);
  return mailBody({
    subject: `Today: ${summary}`,
    ...{ farmName, heading: `Today at ${farmName}` },
    paragraphs: [
      `${summary.charAt(0).toUpperCase()}${summary.slice(1)}.`,
      ...digest.alerts.slice(0, MOST_ALERTS).map((alert) => alertLine(alert, timeZone)),
      ...moreLine(digest.alerts.length - MOST_ALERTS, 'alert'),
      ...quietLine(digest.quiet),
    ],
    rows: [
      ...digest.tasks.slice(0, MOST_TASKS).map((task) => ({
        label: task.systemCode === null ? task.title : `${task.systemCode}: ${task.title}`,
        value: dueWords(task, dayOf(now, timeZone)),
      })),
      ...moreLine(digest.tasks.length - MOST_TASKS, 'task').map((label) => ({ label, value: '' })),
      ...digest.reservoirs.map((reservoir) => reservoirRow(reservoir, timeZone)),
    ],
    act: { label: 'Open Today', url: `${config.publicUrl}/today` },
    note: mailChoiceNote(deps),
  });
}

function summaryOf({ alerts, tasks }: Digest): string {
  const parts = [
    ...(alerts.length > 0 ? [counted(alerts.length, 'open alert')] : []),
    ...(tasks.length > 0 ? [`${counted(tasks.length, 'task')} due`] : []),
  ];
  return parts.length > 0 ? parts.join(' and ') : 'nothing is due';
}

function alertLine({ title, detail }: OpenAlert, timeZone: string): string {
  return `${plainWords(title, timeZone)}. ${plainWords(detail, timeZone)}`;
}

function quietLine(quiet: number): string[] {
  if (quiet === 0) return [];
  return [`${counted(quiet, 'more alert')} ${quiet === 1 ? 'is' : 'are'} known, and quiet until worse.`];
}

function moreLine(more: number, what: string): string[] {
  return more > 0 ? [`And ${counted(more, `more ${what}`)}.`] : [];
}

function dueWords({ dueOn }: Task, today: Day): string {
  const late = dueOn === null ? 0 : daysBetween(dueOn, today);
  if (late <= 0) return 'today';
  return late === 1 ? 'since yesterday' : `for ${late} days`;
}

function reservoirRow({ code, systemCode, levelL, emptyAt }: Reservoir, timeZone: string) {
  const left = `${levelL.toFixed(0)} L left`;
  return {
    label: `Reservoir ${code} on ${systemCode}`,
    value: emptyAt === null ? left : `${left}, empty by ${clockText(emptyAt, timeZone)}`,
  };
}

function counted(count: number, noun: string): string {
  return count === 1 ? `1 ${noun}` : `${count} ${noun}s`;
}
