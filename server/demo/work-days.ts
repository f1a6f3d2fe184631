import { and, eq, gte, isNotNull, isNull, lte } from 'drizzle-orm';
import { addDays, dayOf, type Day, startOfDay } from '../../shared/domain/days.ts';
import { PARAMETER_CODES } from '../../shared/domain/units.ts';
import { alerts, notificationChoices, readings, tasks, users } from '../db/schema/index.ts';
import { SYSTEM, type Write } from '../db/write.ts';
import { acknowledgeAlert, evaluateAlerts, weighRisks } from '../services/alert-service.ts';
import { lastAnnouncement } from '../services/notification-service.ts';
import { completeTask, skipTask } from '../services/task-outcomes.ts';
import { createTask } from '../services/task-service.ts';
import { settleTasks } from '../services/task-settling.ts';
import type { Chance } from './chance.ts';
import { FARM } from './scenario/farm.ts';
import { TASKS, type TaskSpec } from './scenario/tasks.ts';
import { daysToEnd, growerOf, timeOn, type World } from './world.ts';

/** The farm has written its work down since so many days; what lies before has left no trace. */
const WORK_DAYS = 40;
/** In the last ones alerts are looked at after the swaps too, not each morning alone. */
const CLOSELY_DAYS = 10;
/** Part of the tasks that get done on their day, and of the rest that are skipped. */
const DONE_ON_ITS_DAY = 0.94;
const SKIPPED = 0.3;
const EXCUSES = ['Packing day, no hands left', 'Spare part is on its way', 'Looked clean, left it'];

/** Puts the tasks of the last weeks on the agenda, what became of them, and the alerts that rose and ended meanwhile. */
export function planWork(world: World): void {
  const { agenda, staff, days, now } = world;
  const chance = world.chance('tasks');
  const specs = new Map<string, TaskSpec>();
  days.forEach((day, index) => {
    const toEnd = daysToEnd(world, index);
    if (toEnd > WORK_DAYS) return;
    if (toEnd === Math.min(WORK_DAYS, days.length)) {
      agenda.put(timeOn(day, 7 * 60 + 20), staff.owner, (write) => writeDown(world, write, day, specs));
    }
    agenda.put(timeOn(day, 9 * 60 + 30), growerOf(world, index), (write) => settleByTests(world, write, day));
    agenda.put(timeOn(day, 9 * 60 + 31), SYSTEM, (write) => lookAtAll(world, write));
    agenda.put(timeOn(day, 16 * 60 + 20), growerOf(world, index), (write) =>
      doTheRest(write, chance, specs, { day, toEnd }),
    );
    if (toEnd <= CLOSELY_DAYS) agenda.put(timeOn(day, 11 * 60), SYSTEM, (write) => lookAtAll(world, write));
  });
  agenda.put(now, staff.grower, (write) => settleByTests(world, write, dayOf(now, FARM.timeZone)));
  agenda.put(now, staff.owner, (write) => {
    lookAtAll(world, write);
    for (const { id } of world.systems) weighRisks(write, id);
    knowOfStandingRisks(write);
    chooseMails(write);
  });
}

function writeDown(world: World, write: Write, day: Day, specs: Map<string, TaskSpec>): void {
  for (const spec of TASKS) {
    const system = world.systems.find(({ spec: { code } }) => code === spec.system);
    const assigneeId = spec.for === undefined ? null : world.staff[spec.for].userId;
    const task = createTask(write, {
      ...{ kind: spec.kind, title: spec.title, repeat: spec.repeat, parameter: spec.parameter ?? null },
      ...{ systemId: system?.id ?? null, reservoirId: spec.vessel ? (system?.reservoirs[0]?.id ?? null) : null },
      ...{ startsOn: addDays(day, spec.from ?? 0), dueMinute: spec.dueMinute ?? null },
      ...{ assigneeId, assigneeRole: assigneeId === null ? 'grower' : null, note: spec.note ?? '' },
    });
    specs.set(task.id, spec);
  }
}

/** The day's readings settle the tests that ask for them, as they do when people log them. */
function settleByTests(world: World, write: Write, day: Day): void {
  for (const { id: systemId } of world.systems) {
    const from = startOfDay(day, FARM.timeZone);
    const logged = write.tx
      .select()
      .from(readings)
      .where(and(eq(readings.systemId, systemId), gte(readings.takenAt, from), lte(readings.takenAt, write.now)))
      .all();
    for (const { id: cause, takenAt: at, parameter: code } of logged) {
      const parameter = PARAMETER_CODES.find((each) => each === code);
      settleTasks(write, { kind: 'test', systemId, parameter, at, cause });
    }
  }
}

function lookAtAll(world: World, write: Write): void {
  for (const { id } of world.systems) evaluateAlerts(write, id);
}

/** In the afternoon what is due gets done, most of it. Swaps and tests settle themselves. */
function doTheRest(
  write: Write,
  chance: Chance,
  specs: ReadonlyMap<string, TaskSpec>,
  { day, toEnd }: { day: Day; toEnd: number },
): void {
  const due = write.tx
    .select()
    .from(tasks)
    .where(and(isNull(tasks.endedAt), isNotNull(tasks.dueOn), lte(tasks.dueOn, day)))
    .all();
  for (const { id, kind, dueOn } of due) {
    const isLeft = toEnd <= (specs.get(id)?.undone ?? 0);
    if (kind === 'test' || kind === 'changeover' || isLeft || dueOn === null) continue;
    if (chance.happens(DONE_ON_ITS_DAY)) completeTask(write, id, { dueOn, note: '' });
    else if (chance.happens(SKIPPED)) skipTask(write, id, { dueOn, reason: chance.pick(EXCUSES) });
  }
}

/** Nobody is told each day of what everybody knows: full reservoirs are a risk, and their cut-offs are ordered. */
function knowOfStandingRisks(write: Write): void {
  const standing = write.tx
    .select({ id: alerts.id })
    .from(alerts)
    .where(and(eq(alerts.kind, 'overfill_risk'), isNull(alerts.closedAt)))
    .all();
  for (const { id } of standing) acknowledgeAlert(write, id);
}

/** The owner hears at once and each morning, the grower in the morning; what was raised so far, they have heard. */
function chooseMails(write: Write): void {
  const people = write.tx.select().from(users).where(isNull(users.disabledAt)).all();
  const heardUpTo = lastAnnouncement(write);
  const lastDigestOn = dayOf(write.now, FARM.timeZone);
  for (const { id: userId, email } of people) {
    const digestHour = { 'owner@example.com': 7, 'grower@example.com': 6 }[email];
    if (digestHour === undefined) continue;
    const alertsAtOnce = email === 'owner@example.com';
    write.tx
      .insert(notificationChoices)
      .values({ userId, alertsAtOnce, digestHour, mutedKinds: [], heardUpTo, lastDigestOn })
      .run();
  }
}
