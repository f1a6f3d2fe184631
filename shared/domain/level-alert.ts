import type { Condition, SeenChange } from './alert-rules.ts';
import { MS_PER_DAY } from './days.ts';
import type { ParameterCode } from './units.ts';

interface Band {
  low: number;
  high: number;
}
interface SeenValue {
  at: number;
  value: number;
}

export interface LevelInput {
  parameter: ParameterCode;
  band: Band;
  /** Readings of the last weeks, oldest first, in the canonical unit. */
  readings: readonly SeenValue[];
  /** Standard deviation of one test. */
  testSd: number;
  now: number;
  /** The kind that is open already: it takes more to end it than not to begin it. */
  open: 'out_of_band' | 'drifting' | null;
}

/** Back inside by this part of the band's width ends an alert. */
const BACK_INSIDE = 0.1;
const WARN_BEFORE_MS = 3 * MS_PER_DAY;
/** A drift that was told of ends when the edge is so far off. */
const CALM_BEFORE_MS = 4 * MS_PER_DAY;
/** Drift is told from the last days, or for what is tested weekly from the last weeks. */
const DRIFT_WINDOWS = [
  { lengthMs: 4 * MS_PER_DAY, spanMs: 1.5 * MS_PER_DAY, readings: 2 },
  { lengthMs: 28 * MS_PER_DAY, spanMs: 7 * MS_PER_DAY, readings: 3 },
] as const;
const FELT_AT_ONCE: readonly ParameterCode[] = ['temperature', 'salinity', 'ph'];
/**
 * What corals and evaporation move steadily. The others swing with the hour and the feeding, or are tested too seldom for
 * a few days' warning.
 */
const DRIFTING: readonly ParameterCode[] = ['alkalinity', 'calcium', 'magnesium', 'salinity'];
/** A normal error goes beyond this once in 200 times on one side: looked at daily, chance must rarely pass for a drift. */
const SURE_Z = 2.58;
/** A step worse is more than what a test may be off: half of its 95 % interval. */
const STEP_SDS = 1.96;

/**
 * Whether a parameter is out of its band or about to leave it. A drift counts only where the slope of the readings is
 * surer than chance, by least squares with the known error of a test.
 *
 * @returns null while all is well or nothing was tested
 */
export function levelCondition(input: LevelInput): Omit<Condition, 'subject'> | null {
  const last = input.readings.at(-1);
  if (!last) return null;
  return outOfBand(input, last) ?? drifting(input, last);
}

function outOfBand(input: LevelInput, last: SeenValue): Omit<Condition, 'subject'> | null {
  const { band, parameter, testSd, open } = input;
  const inside = (band.high - band.low) * BACK_INSIDE;
  const margin = open === 'out_of_band' ? inside : 0;
  const isLow = last.value < band.low + margin;
  if (!isLow && last.value <= band.high - margin) return null;
  const outside = Math.max(0, isLow ? band.low - last.value : last.value - band.high);
  const step = Math.max(testSd * STEP_SDS, Number.EPSILON);
  const drift = driftOf(input);
  return {
    urgency: isPressing(parameter, outside, step) ? 'now' : 'today',
    measure: outside / step,
    facts: {
      ...{ kind: 'out_of_band', parameter, value: last.value, at: last.at, ...band },
      backAt: isLow ? band.low + inside : band.high - inside,
      step,
      change: drift && { changeBy: drift.changeBy, changeDays: drift.changeDays },
    },
  };
}

/** Alkalinity slips within days, and a jump of what animals feel within hours can't wait; the rest is today's work. */
function isPressing(parameter: ParameterCode, outside: number, step: number): boolean {
  if (parameter === 'alkalinity') return outside > 0;
  return FELT_AT_ONCE.includes(parameter) && outside >= step;
}

function drifting(input: LevelInput, last: SeenValue): Omit<Condition, 'subject'> | null {
  const { band, parameter, now, open } = input;
  const drift = DRIFTING.includes(parameter) ? driftOf(input) : null;
  if (!drift || Math.abs(drift.slope) <= SURE_Z * drift.slopeSd) return null;
  const edge = drift.slope < 0 ? band.low : band.high;
  const leavesAt = last.at + ((edge - last.value) / drift.slope) * MS_PER_DAY;
  if (leavesAt - now >= (open === 'drifting' ? CALM_BEFORE_MS : WARN_BEFORE_MS)) return null;
  const { changeBy, changeDays } = drift;
  return {
    urgency: 'today',
    // One step below the edge, so that leaving the band is told of even where the drift was acknowledged.
    measure: -1,
    facts: { kind: 'drifting', parameter, value: last.value, at: last.at, leavesAt, change: { changeBy, changeDays } },
  };
}

interface Drift extends SeenChange {
  /** Per day. */
  slope: number;
  slopeSd: number;
}

function driftOf({ readings, testSd }: LevelInput): Drift | null {
  const last = readings.at(-1);
  if (!last) return null;
  for (const { lengthMs, spanMs, readings: least } of DRIFT_WINDOWS) {
    const seen = readings.filter(({ at }) => at >= last.at - lengthMs);
    const [first] = seen;
    if (!first || seen.length < least || last.at - first.at < spanMs) continue;
    return { ...slopeOf(seen, testSd), changeBy: last.value - first.value, changeDays: daysOf(last.at - first.at) };
  }
  return null;
}

function slopeOf(seen: readonly SeenValue[], testSd: number): { slope: number; slopeSd: number } {
  const meanAt = seen.reduce((sum, { at }) => sum + at, 0) / seen.length;
  const meanValue = seen.reduce((sum, { value }) => sum + value, 0) / seen.length;
  const days = seen.map(({ at }) => (at - meanAt) / MS_PER_DAY);
  const spread = days.reduce((sum, each) => sum + each * each, 0);
  const together = seen.reduce((sum, { value }, index) => sum + (days[index] ?? 0) * (value - meanValue), 0);
  return { slope: together / spread, slopeSd: testSd / Math.sqrt(spread) };
}

function daysOf(ms: number): number {
  return Math.max(1, Math.round(ms / MS_PER_DAY));
}
