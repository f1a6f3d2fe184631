import { MS_PER_DAY } from './days.ts';
import { supplyWithin, type SupplyInterval } from './reservoir-use.ts';
import { tQuantile95 } from './student-t.ts';

/** One alkalinity test. */
export interface AlkalinityReading {
  at: number;
  /** Level, meq/L. */
  meqL: number;
  /** Standard deviation of the test, meq/L, above zero. */
  sd: number;
}

/** Part of the system's water replaced at an instant by water of another alkalinity. */
export interface WaterChange {
  at: number;
  /** 0 to 1. */
  fraction: number;
  alkalinityMeqL: number;
}

export interface DemandInputs {
  readings: readonly AlkalinityReading[];
  /** Everything that was added, as meq/L of the system over stretches of time (a single dose has from = to). */
  supply: readonly SupplyInterval[];
  waterChanges: readonly WaterChange[];
}

export interface DemandPoint {
  at: number;
  measuredMeqL: number;
  /** The level that the estimate gives for this instant. */
  fittedMeqL: number;
  /** The level as it would have been had nothing been added or changed: falls by the demand. */
  correctedMeqL: number;
}

interface DemandBasis {
  from: number;
  to: number;
  readings: number;
  /** Mean of all that was added between the first and the last reading used, meq/L a day. */
  supplyMeqLPerDay: number;
}

export type DemandEstimate =
  | (DemandBasis & {
      enough: true;
      /** What the corals took, meq/L a day. */
      demandMeqLPerDay: number;
      standardError: number;
      /** 95 % interval. */
      low: number;
      high: number;
      points: DemandPoint[];
    })
  | (DemandBasis & { enough: false; reason: 'too_few_readings' | 'too_short' });

export const DEFAULT_WINDOW_DAYS = 14;
const FEWEST_READINGS = 3;
const SHORTEST_DAYS = 2;

/** Farms that test once a week have two or three tests in a fortnight: a thin window is widened so far. */
const WIDENED = 2;

/**
 * Alkalinity demand of a system over a window, from its tests and all that was added between them.
 *
 * With a steady demand D the level at any reading is a·A₀ − b·D + c, where a, b and c follow from the dates, the supply
 * and the water changes alone (a change of fraction f keeps 1 − f of all three and adds f times the new water's
 * alkalinity). A₀ and D come from weighted least squares on all readings of the window. The error is that of the tests
 * themselves, or larger where the readings scatter more than the tests should.
 *
 * @param until end of the window, epoch ms
 * @param windowDays length of the window; where it holds fewer than three tests, twice as long
 */
export function estimateDemand(
  inputs: DemandInputs,
  until: number,
  windowDays: number = DEFAULT_WINDOW_DAYS,
): DemandEstimate {
  const windowFrom = until - windowDays * MS_PER_DAY;
  const readings = readingsOf(inputs, until, windowDays);
  const first = readings[0];
  const from = first?.at ?? windowFrom;
  const to = readings.at(-1)?.at ?? until;
  const days = (to - from) / MS_PER_DAY;
  const basis: DemandBasis = {
    ...{ from, to, readings: readings.length },
    supplyMeqLPerDay: days > 0 ? supplyWithin(inputs.supply, from, to) / days : 0,
  };
  if (!first || readings.length < FEWEST_READINGS) return { ...basis, enough: false, reason: 'too_few_readings' };
  if (days < SHORTEST_DAYS) return { ...basis, enough: false, reason: 'too_short' };

  const rows = levelRows(readings, inputs);
  const fit = fitRows(rows);
  return { ...basis, enough: true, ...fit, points: rows.map((row) => pointOf(row, fit, from)) };
}

/** The usable readings of the window in order of time, or of the widened one where the window holds too few. */
function readingsOf({ readings }: DemandInputs, until: number, windowDays: number): AlkalinityReading[] {
  const within = (days: number) =>
    readings.filter(
      ({ at, meqL, sd }) => at >= until - days * MS_PER_DAY && at <= until && sd > 0 && Number.isFinite(meqL),
    );
  const usual = within(windowDays);
  return (usual.length < FEWEST_READINGS ? within(windowDays * WIDENED) : usual).sort((a, b) => a.at - b.at);
}

/**
 * Demand week by week, each point from its own window; weeks without enough data are left out.
 *
 * @param from first instant of interest
 * @param until last instant, the end of the newest window
 */
export function demandHistory(
  inputs: DemandInputs,
  from: number,
  until: number,
  windowDays: number = DEFAULT_WINDOW_DAYS,
): Extract<DemandEstimate, { enough: true }>[] {
  const weeks = Math.max(0, Math.floor((until - from) / (7 * MS_PER_DAY)));
  return Array.from({ length: weeks + 1 }, (_, index) => until - (weeks - index) * 7 * MS_PER_DAY)
    .map((end) => estimateDemand(inputs, end, windowDays))
    .filter((estimate) => estimate.enough);
}

interface LevelRow {
  reading: AlkalinityReading;
  /** Part of the first level that is still there. */
  kept: number;
  /** Days over which demand has worked, thinned by water changes. */
  days: number;
  /** Level that supply and new water have brought. */
  added: number;
}

function levelRows(readings: readonly AlkalinityReading[], { supply, waterChanges }: DemandInputs): LevelRow[] {
  const changes = [...waterChanges].sort((a, b) => a.at - b.at);
  let state = { at: readings[0]?.at ?? 0, kept: 1, days: 0, added: 0 };
  const advance = (at: number) => {
    const days = state.days + (at - state.at) / MS_PER_DAY;
    state = { at, kept: state.kept, days, added: state.added + supplyWithin(supply, state.at, at) };
  };
  // A change at the instant of a reading comes after it: people test, then change.
  let next = changes.findIndex(({ at }) => at >= state.at);
  return readings.map((reading) => {
    for (let change = changes[next]; next >= 0 && change && change.at < reading.at; change = changes[next]) {
      advance(change.at);
      state = changed(state, change);
      next += 1;
    }
    advance(reading.at);
    return { reading, kept: state.kept, days: state.days, added: state.added };
  });
}

function changed<State extends { kept: number; days: number; added: number }>(
  state: State,
  change: WaterChange,
): State {
  const left = 1 - change.fraction;
  const added = left * state.added + change.fraction * change.alkalinityMeqL;
  return { ...state, kept: left * state.kept, days: left * state.days, added };
}

interface Fit {
  startMeqL: number;
  demandMeqLPerDay: number;
  standardError: number;
  low: number;
  high: number;
}

/** Weighted least squares of measured − added on kept (A₀) and −days (D), by the normal equations of two unknowns. */
function fitRows(rows: readonly LevelRow[]): Fit {
  const total = (of: (row: LevelRow) => number) => rows.reduce((sum, row) => sum + of(row) / row.reading.sd ** 2, 0);
  const rest = (row: LevelRow) => row.reading.meqL - row.added;
  const kk = total((row) => row.kept ** 2);
  const kd = total((row) => -row.kept * row.days);
  const dd = total((row) => row.days ** 2);
  const ky = total((row) => row.kept * rest(row));
  const dy = total((row) => -row.days * rest(row));
  const determinant = kk * dd - kd * kd;
  const startMeqL = (dd * ky - kd * dy) / determinant;
  const demandMeqLPerDay = (kk * dy - kd * ky) / determinant;

  const freedom = rows.length - 2;
  const misfit = total((row) => (rest(row) - row.kept * startMeqL + row.days * demandMeqLPerDay) ** 2) / freedom;
  const standardError = Math.sqrt((kk / determinant) * Math.max(1, misfit));
  const reach = tQuantile95(freedom) * standardError;
  const [low, high] = [demandMeqLPerDay - reach, demandMeqLPerDay + reach];
  return { startMeqL, demandMeqLPerDay, standardError, low, high };
}

function pointOf({ reading, kept, days, added }: LevelRow, fit: Fit, from: number): DemandPoint {
  const fittedMeqL = kept * fit.startMeqL - days * fit.demandMeqLPerDay + added;
  const alone = fit.startMeqL - fit.demandMeqLPerDay * ((reading.at - from) / MS_PER_DAY);
  const correctedMeqL = alone + reading.meqL - fittedMeqL;
  return { at: reading.at, measuredMeqL: reading.meqL, fittedMeqL, correctedMeqL };
}
