import { asc } from 'drizzle-orm';
import type { TodayEntry, TodayText } from '../../../shared/contracts/today.ts';
import { MS_PER_DAY } from '../../../shared/domain/days.ts';
import { systemTitle } from '../../../shared/domain/system-title.ts';
import type { Db } from '../../db/client.ts';
import { systems } from '../../db/schema/index.ts';
import { readingsBetween } from '../readings.ts';
import { bandsOf, type SystemRow } from '../systems.ts';
import { actOf, type TodayContext } from './source.ts';
import { reservoirEntries } from './reservoirs.ts';

const TEST_EVERY_DAYS = 3;
const LOOK_BACK_DAYS = 60;
/** A fall is told from readings of this long, at least a day apart. */
const FALL_WINDOW_MS = 4 * MS_PER_DAY;
const WARN_BEFORE_MS = 3 * MS_PER_DAY;

interface Alkalinity {
  value: number;
  at: number;
  /** Change over the readings of the window; null where they are too close together. */
  change: { by: number; overMs: number } | null;
}

/** Alkalinity out of its band or about to leave it, tests that are due, and reservoirs that run empty. */
export function waterToday(db: Db, context: TodayContext): TodayEntry[] {
  const rows = db.select().from(systems).orderBy(asc(systems.code)).all();
  return [...rows.flatMap((system) => alkalinityEntries(db, context, system)), ...reservoirEntries(db, context)];
}

function alkalinityEntries(db: Db, context: TodayContext, system: SystemRow): TodayEntry[] {
  const band = bandsOf(db, system.id).find(({ parameter }) => parameter === 'alkalinity');
  if (!band) return [];
  const latest = alkalinityOf(db, system.id, context.now);
  if (!latest || context.now - latest.at > TEST_EVERY_DAYS * MS_PER_DAY) return [testDue(context, system, latest)];
  if (latest.value < band.low || latest.value > band.high) return [outOfBand(context, system, latest, band)];
  const leavesAt = leavesBandAt(latest, band);
  return leavesAt !== null && leavesAt - context.now < WARN_BEFORE_MS
    ? [falling(context, system, latest, leavesAt)]
    : [];
}

function alkalinityOf(db: Db, systemId: string, now: number): Alkalinity | null {
  const recent = readingsBetween(db, systemId, 'alkalinity', now - LOOK_BACK_DAYS * MS_PER_DAY, now);
  const last = recent.at(-1);
  if (!last) return null;
  const first = recent.find(({ at }) => at >= last.at - FALL_WINDOW_MS);
  const overMs = first ? last.at - first.at : 0;
  const change = first && overMs >= MS_PER_DAY ? { by: last.value - first.value, overMs } : null;
  return { value: last.value, at: last.at, change };
}

/** When the fall of the last days reaches the lower end; null while it does not fall. */
function leavesBandAt({ value, at, change }: Alkalinity, { low }: { low: number }): number | null {
  if (!change || change.by >= 0) return null;
  return at + ((value - low) / -change.by) * change.overMs;
}

function outOfBand(
  context: TodayContext,
  system: SystemRow,
  latest: Alkalinity,
  band: { low: number; high: number },
): TodayEntry {
  const isLow = latest.value < band.low;
  return {
    id: `alkalinity-${system.id}`,
    tone: 'brick',
    group: 'now',
    title: [`${systemTitle(system)}: alkalinity `, { quantity: 'alkalinity', value: latest.value }],
    detail: [
      `${isLow ? 'Below' : 'Above'} its band, which ${isLow ? 'begins' : 'ends'} at `,
      { quantity: 'alkalinity', value: isLow ? band.low : band.high },
      ...changeWords(latest),
      '. Test again, then correct.',
    ],
    act: actOf(context, 'water.log', 'Test', `/water/log?system=${system.id}`, `/water/systems/${system.id}`),
  };
}

function changeWords({ change }: Alkalinity): TodayText {
  if (!change || change.by === 0) return [];
  const days = Math.round(change.overMs / MS_PER_DAY);
  return [
    `; it ${change.by < 0 ? 'fell' : 'rose'} by `,
    { quantity: 'alkalinity', value: Math.abs(change.by), difference: true },
    days === 1 ? ' in a day' : ` in ${days} days`,
  ];
}

function falling(context: TodayContext, system: SystemRow, latest: Alkalinity, leavesAt: number): TodayEntry {
  const days = Math.max(1, Math.round((leavesAt - context.now) / MS_PER_DAY));
  return {
    id: `alkalinity-${system.id}`,
    tone: 'ochre',
    group: 'today',
    title: [`${systemTitle(system)}: alkalinity falls, now `, { quantity: 'alkalinity', value: latest.value }],
    detail: [
      days === 1 ? 'It leaves its band in about a day' : `It leaves its band in about ${days} days`,
      ...changeWords(latest),
      '.',
    ],
    act: { label: 'See', to: `/water/systems/${system.id}` },
  };
}

function testDue(context: TodayContext, system: SystemRow, latest: Alkalinity | null): TodayEntry {
  const days = latest && Math.floor((context.now - latest.at) / MS_PER_DAY);
  return {
    id: `test-${system.id}`,
    tone: 'ochre',
    group: 'today',
    title: [`Test alkalinity in ${systemTitle(system)}`],
    detail: [
      days === null ? `It was not tested in the last ${LOOK_BACK_DAYS} days.` : `The last test was ${days} days ago.`,
    ],
    act: actOf(context, 'water.log', 'Test', `/water/log?system=${system.id}`, `/water/systems/${system.id}`),
  };
}
