import { and, eq, isNotNull, isNull } from 'drizzle-orm';
import type { Reservoir } from '../../shared/contracts/reservoirs.ts';
import { type AlertKind, type Condition, emptying, overdue } from '../../shared/domain/alert-rules.ts';
import { addDays, MS_PER_DAY, startOfDay } from '../../shared/domain/days.ts';
import { levelCondition } from '../../shared/domain/level-alert.ts';
import { testErrorOf } from '../../shared/domain/test-error.ts';
import type { Db } from '../db/client.ts';
import { tasks } from '../db/schema/index.ts';
import { farmOf } from './farm.ts';
import { demandChangeOf } from './demand-change.ts';
import { overfillOf } from './overfill.ts';
import { latestReadings, readingsBetween } from './readings.ts';
import { listReservoirs } from './reservoirs.ts';
import { bandsOf, type SystemRow } from './systems.ts';

const LOOK_BACK_DAYS = 28;
/** A smaller change of demand, per day, calls for nothing, however sure it is (common practice, no source). */
const LEAST_CHANGE_MEQ_L = 0.05;

/** Kinds of the alerts that are open, by subject: what is open ends later than it would begin. */
export type OpenKinds = ReadonlyMap<string, AlertKind>;

/** What about a system should be known at once. */
export function conditionsOf(db: Db, system: SystemRow, now: number, open: OpenKinds): Condition[] {
  if (system.retiredAt !== null) return [];
  return [
    ...levelConditions(db, system, now, open),
    ...testConditions(db, system, now),
    ...reservoirConditions(db, system, now, open),
  ];
}

/** Demand that changed, and overfills that would harm: they take long to work out and change slowly. */
export function slowConditionsOf(db: Db, system: SystemRow, now: number): Condition[] {
  if (system.retiredAt !== null) return [];
  return [...demandConditions(db, system, now), ...overfillConditions(db, system, now)];
}

function demandConditions(db: Db, system: SystemRow, now: number): Condition[] {
  const change = demandChangeOf(db, system, now);
  if (!change || change.direction === 'none' || Math.abs(change.now - change.expected) < LEAST_CHANGE_MEQ_L) return [];
  const { now: is, expected, half, since } = change;
  return [
    {
      ...{ subject: `demand:${system.id}`, urgency: 'today', measure: Math.abs(is - expected) / half },
      facts: { kind: 'demand_changed', expected, now: is, half, since },
    },
  ];
}

/** A standing risk: told once, and quiet when somebody knows. */
function overfillConditions(db: Db, { id }: SystemRow, now: number): Condition[] {
  const { reservoir, litres, effect, broken, largest } = overfillOf(db, id, now);
  if (!reservoir?.isOnline || !effect || broken.length === 0) return [];
  const { before, atOnce } = effect;
  const changeMeqL = atOnce.alkalinityMeqL - before.alkalinityMeqL;
  return [
    {
      ...{ subject: `overfill:${id}`, urgency: 'soon', measure: 0, reservoirId: reservoir.id },
      facts: {
        kind: 'overfill_risk',
        code: reservoir.code,
        litres: Math.round(litres),
        changeMeqL,
        ph: atOnce.phNbs,
        harmlessL: Math.floor(largest?.litres ?? 0) || null,
      },
    },
  ];
}

function levelConditions(db: Db, { id }: SystemRow, now: number, open: OpenKinds): Condition[] {
  return bandsOf(db, id).flatMap(({ parameter, low, high }) => {
    const subject = `level:${id}:${parameter}`;
    const kind = open.get(subject);
    const readings = readingsBetween(db, id, parameter, now - LOOK_BACK_DAYS * MS_PER_DAY, now);
    const condition = levelCondition({
      ...{ parameter, band: { low, high }, readings, now },
      testSd: testErrorOf(parameter, readings.at(-1)?.method ?? '').sd,
      open: kind === 'out_of_band' || kind === 'drifting' ? kind : null,
    });
    return condition ? [{ subject, ...condition }] : [];
  });
}

/** Alkalinity is what slips within days; the other tests are asked for by their tasks. */
function testConditions(db: Db, { id }: SystemRow, now: number): Condition[] {
  if (!bandsOf(db, id).some(({ parameter }) => parameter === 'alkalinity')) return [];
  const last = latestReadings(db, id).find(({ parameter }) => parameter === 'alkalinity');
  const measure = overdue(last?.takenAt ?? null, testDueAt(db, id), now);
  if (measure === null) return [];
  const facts = { kind: 'test_overdue', parameter: 'alkalinity', lastAt: last?.takenAt ?? null } as const;
  return [{ subject: `test:${id}:alkalinity`, urgency: 'today', measure, facts }];
}

/** The end of the first day on which a task asks for the test; null where none does. */
function testDueAt(db: Db, systemId: string): number | null {
  const planned = db
    .select({ dueOn: tasks.dueOn, parameter: tasks.parameter })
    .from(tasks)
    .where(and(eq(tasks.systemId, systemId), eq(tasks.kind, 'test'), isNull(tasks.endedAt), isNotNull(tasks.dueOn)))
    .all();
  const days = planned.flatMap(({ dueOn, parameter }) =>
    dueOn !== null && (parameter === null || parameter === 'alkalinity') ? [dueOn] : [],
  );
  const [first] = days.sort();
  return first === undefined ? null : startOfDay(addDays(first, 1), farmOf(db).timeZone);
}

function reservoirConditions(db: Db, { id }: SystemRow, now: number, open: OpenKinds): Condition[] {
  const feeding = listReservoirs(db, now, id);
  const online = feeding.find(({ state }) => state === 'online');
  const ready = feeding.find(({ state, levelL }) => state === 'standby' && levelL > 0);
  if (!online) return ready ? [limewaterOff(id, ready)] : [];
  // A reservoir that feeds several systems is told of where it belongs.
  if (online.systemId !== id) return [];
  return [...runsEmpty(online, ready, now, open), ...wantsReplacing(online, now)];
}

function limewaterOff(systemId: string, ready: Reservoir): Condition {
  return {
    ...{ subject: `off:${systemId}`, urgency: 'today', measure: 0, reservoirId: ready.id },
    facts: { kind: 'limewater_off', code: ready.code },
  };
}

function runsEmpty(online: Reservoir, ready: Reservoir | undefined, now: number, open: OpenKinds): Condition[] {
  const { id: reservoirId, code, emptyAt } = online;
  const subject = `empty:${reservoirId}`;
  const state =
    emptyAt === null ? null : emptying(emptyAt, now, { isOpen: open.has(subject), isOtherReady: ready !== undefined });
  if (emptyAt === null || state === null) return [];
  const facts = { kind: 'reservoir_empty', code, emptyAt, readyCode: ready?.code ?? null } as const;
  return [{ subject, reservoirId, ...state, facts }];
}

function wantsReplacing({ id: reservoirId, code, strengthLow, lastCheck, dueAt }: Reservoir, now: number): Condition[] {
  const low: Condition[] =
    strengthLow && lastCheck
      ? [
          {
            ...{
              subject: `strength:${reservoirId}`,
              reservoirId,
              urgency: 'today',
              measure: 10 - lastCheck.strengthLeft * 10,
            },
            facts: { kind: 'strength_low', code, strengthLeft: lastCheck.strengthLeft },
          },
        ]
      : [];
  const due: Condition[] =
    dueAt !== null && dueAt <= now
      ? [
          {
            ...{
              subject: `replace:${reservoirId}`,
              reservoirId,
              urgency: 'soon',
              measure: (now - dueAt) / MS_PER_DAY / 3,
            },
            facts: { kind: 'replacement_due', code, dueAt },
          },
        ]
      : [];
  return [...low, ...due];
}
