import { MS_PER_DAY, MS_PER_HOUR } from './days.ts';
import type { ParameterCode } from './units.ts';

/** What can be wrong with a system's water or limewater. */
export const ALERT_KINDS = [
  'out_of_band',
  'drifting',
  'demand_changed',
  'test_overdue',
  'reservoir_empty',
  'limewater_off',
  'strength_low',
  'replacement_due',
  'overfill_risk',
] as const;
export type AlertKind = (typeof ALERT_KINDS)[number];

export type AlertUrgency = 'now' | 'today' | 'soon';

/** How a parameter changed over the readings that were looked at. */
export interface SeenChange {
  changeBy: number;
  changeDays: number;
}

/** What was seen, by kind, in canonical units and instants. */
export type AlertFacts =
  | ({ kind: 'out_of_band'; parameter: ParameterCode; value: number; at: number; low: number; high: number } & {
      /** Where it counts as back in its band: a little inside of it, so that it does not flicker. */
      backAt: number;
      /** So much further out is worth hearing again. */
      step: number;
      change: SeenChange | null;
    })
  | { kind: 'drifting'; parameter: ParameterCode; value: number; at: number; leavesAt: number; change: SeenChange }
  /** Demand per day as stock and growth would have it and as it is, with half of the 95 % interval of the difference. */
  | { kind: 'demand_changed'; expected: number; now: number; half: number; since: number }
  | { kind: 'test_overdue'; parameter: ParameterCode; lastAt: number | null }
  | { kind: 'reservoir_empty'; code: string; emptyAt: number; readyCode: string | null }
  | { kind: 'limewater_off'; code: string }
  | { kind: 'strength_low'; code: string; strengthLeft: number }
  | { kind: 'replacement_due'; code: string; dueAt: number }
  /** What all of a reservoir at once would do, and how much of it would do no harm. */
  | { kind: 'overfill_risk'; code: string; litres: number; changeMeqL: number; ph: number; harmlessL: number | null };

/** What ended an alert: the test that shows it, or that what it was about is so no more. */
export type AlertEnd = { by: 'reading'; parameter: ParameterCode; value: number; at: number } | { by: 'change' };

/** What holds now and should be known. One subject is told of once, however it worsens. */
export interface Condition {
  subject: string;
  urgency: AlertUrgency;
  /** How bad it is, in steps: one more is worse by as much as is worth hearing again. */
  measure: number;
  facts: AlertFacts;
  reservoirId?: string;
}

/** Of an alert that is open, what the next step depends on. */
export interface StandingAlert {
  measure: number;
  /** How bad it was when someone said that they know; null while nobody did. */
  acknowledgedMeasure: number | null;
}

/**
 * What becomes of an alert. It stays quiet once acknowledged, and is told of again when it is worse by a whole step than
 * what was acknowledged, or, while nobody acknowledged it, than what was told.
 */
export function nextStep(
  alert: StandingAlert | undefined,
  condition: Condition | undefined,
): 'nothing' | 'open' | 'keep' | 'tell again' | 'close' {
  if (!condition) return alert ? 'close' : 'nothing';
  if (!alert) return 'open';
  const known = alert.acknowledgedMeasure ?? alert.measure;
  return condition.measure >= known + 1 ? 'tell again' : 'keep';
}

/** How long before it runs empty a reservoir is named in each group. */
const EMPTY_NOW_MS = 6 * MS_PER_HOUR;
const EMPTY_TODAY_MS = 24 * MS_PER_HOUR;
const EMPTY_SOON_MS = 48 * MS_PER_HOUR;
/** A later estimate ends the alert only when it is so much later. */
const EMPTY_CALM_MS = 54 * MS_PER_HOUR;

/**
 * How urgent it is that a reservoir runs empty, and in which of four steps it is: two days, a day, six hours, empty. Where
 * another stands ready, two days ahead is no news.
 *
 * @param isOpen whether it was told of already
 * @returns null while it lasts for longer
 */
export function emptying(
  emptyAt: number,
  now: number,
  { isOpen, isOtherReady }: { isOpen: boolean; isOtherReady: boolean },
): { urgency: AlertUrgency; measure: number } | null {
  const left = emptyAt - now;
  if (left > (isOpen ? EMPTY_CALM_MS : isOtherReady ? EMPTY_TODAY_MS : EMPTY_SOON_MS)) return null;
  if (left > EMPTY_TODAY_MS) return { urgency: 'soon', measure: 0 };
  if (left > EMPTY_NOW_MS) return { urgency: 'today', measure: 1 };
  return { urgency: 'now', measure: left > 0 ? 2 : 3 };
}

/** Without a plan of its own, alkalinity is to be tested so often (common practice, no source). */
const TEST_EVERY_MS = 3 * MS_PER_DAY;
/** Told of again after so many days more. */
const OVERDUE_STEP_MS = 3 * MS_PER_DAY;

/** How late a test is, in steps of three days; null while it is not. `dueAt`: when a task asks for it. */
export function overdue(lastAt: number | null, dueAt: number | null, now: number): number | null {
  const from = dueAt ?? (lastAt === null ? now : lastAt + TEST_EVERY_MS);
  if (dueAt === null && lastAt === null) return 0;
  return now > from ? (now - from) / OVERDUE_STEP_MS : null;
}
