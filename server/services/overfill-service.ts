import { eq } from 'drizzle-orm';
import type { LogOverfill, Overfill } from '../../shared/contracts/overfills.ts';
import { dayOf, MS_PER_DAY, MS_PER_HOUR, offsetAt } from '../../shared/domain/days.ts';
import { OVERFILL_TEST_HOURS } from '../../shared/domain/overfill-card.ts';
import { DomainError } from '../../shared/errors.ts';
import { overfills } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { farmOf } from '../queries/farm.ts';
import { overfillOf } from '../queries/overfill.ts';
import { overfillRow, showOverfill } from '../queries/overfills.ts';
import { eventsInOrder, lastEvent, type ReservoirRow, reservoirRow, showReservoir } from '../queries/reservoirs.ts';
import { systemRow, type SystemRow } from '../queries/systems.ts';
import { actTime } from './act-time.ts';
import { addEvent, assertFits, removeEvent } from './reservoir-events.ts';
import { createTask, endTasksOf } from './task-service.ts';

/** An overfill takes no time beside the days that demand is told from. */
const AT_ONCE_MS = 1000;

/**
 * Logs limewater that ran in all at once: as two levels of the reservoir, just before and just after, so that what the
 * system got is known to have come then, and as tests that are due after it.
 */
export function logOverfill(write: Write, systemId: string, input: LogOverfill): Overfill {
  const system = systemRow(write.tx, systemId);
  const at = actTime(write, input.at);
  const reservoir = reservoirOf(write, systemId, input.reservoirId);
  const beforeL = input.levelBeforeL ?? expectedLevel(write, reservoir, at);
  assertFits(reservoir, beforeL, 'levelBeforeL');
  const { usableL, levelL } = showReservoir(write.tx, reservoir.id, write.now);
  const litres = input.litres ?? Math.max(0, beforeL - (levelL - usableL));
  assertRanIn(reservoir, litres, beforeL);

  const note = input.note === '' ? 'Overfill' : `Overfill. ${input.note}`;
  const { alkalinityMeqL } = reservoir;
  const last = lastEvent(write.tx, reservoir.id);
  const hasTimeBefore = last === undefined || last.at <= at - AT_ONCE_MS;
  const beforeEvent = hasTimeBefore
    ? addEvent(write, reservoir, { kind: 'level', at: at - AT_ONCE_MS, levelL: beforeL, alkalinityMeqL, note })
    : null;
  const now = reservoirRow(write.tx, reservoir.id);
  const after = addEvent(write, now, { kind: 'level', at, levelL: beforeL - litres, alkalinityMeqL, note });
  const row = write.tx
    .insert(overfills)
    .values({
      ...{ id: write.newId(), systemId, reservoirId: reservoir.id, eventId: after.id },
      ...{ beforeEventId: beforeEvent?.id ?? null, litres, alkalinityMeqL, at, by: write.actor.name, note: input.note },
    })
    .returning()
    .get();
  write.audit({ action: 'overfill.logged', entity: 'overfill', entityId: row.id, after: row });
  askForTests(write, system, row.id, at);
  return showOverfill(write.tx, row.id);
}

/** Takes an overfill back with its levels and the tests that are still to do, where nothing was logged for the reservoir since. */
export function undoOverfill(write: Write, overfillId: string): void {
  const row = overfillRow(write.tx, overfillId);
  if (lastEvent(write.tx, row.reservoirId)?.id !== row.eventId) {
    throw new DomainError('rule.refused', 'Something was logged for the reservoir after this. Take that back first.');
  }
  for (const eventId of [row.eventId, row.beforeEventId]) {
    const event = eventsInOrder(write.tx, row.reservoirId).find(({ id }) => id === eventId);
    if (event) removeEvent(write, reservoirRow(write.tx, row.reservoirId), event);
  }
  endTasksOf(write, overfillId);
  write.tx.delete(overfills).where(eq(overfills.id, overfillId)).run();
  write.audit({ action: 'overfill.undone', entity: 'overfill', entityId: overfillId, before: row });
}

function reservoirOf(write: Write, systemId: string, chosenId: string | undefined): ReservoirRow {
  const ask = chosenId === undefined ? {} : { reservoirId: chosenId };
  const { reservoir } = overfillOf(write.tx, systemId, write.now, ask);
  if (reservoir) return reservoirRow(write.tx, reservoir.id);
  throw new DomainError('rule.refused', 'No limewater stands ready for this system, so none can have run in.');
}

/** The last known level less the usual use since. */
function expectedLevel(write: Write, reservoir: ReservoirRow, at: number): number {
  const { litresPerDay, levelAt, state } = showReservoir(write.tx, reservoir.id, write.now);
  if (litresPerDay === null || levelAt === null || state !== 'online') return reservoir.levelL;
  return Math.max(0, reservoir.levelL - (litresPerDay * Math.max(0, at - levelAt)) / MS_PER_DAY);
}

function assertRanIn({ code }: ReservoirRow, litres: number, beforeL: number): void {
  if (litres > 0 && litres <= beforeL) return;
  const message =
    litres > 0
      ? `${code} held about ${beforeL.toFixed(1)} L then. Enter less, or what stood in it before.`
      : `${code} held nothing above its intake.`;
  throw new DomainError('input.invalid', message, { fields: [{ path: 'litres', message }] });
}

/** Tests of the water after 1, 4 and 24 hours, where they are still to come. */
function askForTests(write: Write, system: SystemRow, overfillId: string, at: number): void {
  const { timeZone } = farmOf(write.tx);
  for (const hours of OVERFILL_TEST_HOURS) {
    const due = at + hours * MS_PER_HOUR;
    if (due < write.now - MS_PER_HOUR) continue;
    createTask(
      write,
      {
        ...{ kind: 'test', title: `Test after the overfill, ${hours} h`, systemId: system.id, reservoirId: null },
        ...{ parameter: null, repeat: null, startsOn: dayOf(due, timeZone), dueMinute: minuteOfDay(due, timeZone) },
        ...{ assigneeId: null, assigneeRole: null, note: 'pH, alkalinity, salinity and temperature.' },
      },
      overfillId,
    );
  }
}

function minuteOfDay(instant: number, timeZone: string): number {
  return Math.floor(((instant + offsetAt(instant, timeZone)) % MS_PER_DAY) / 60_000);
}
