import { DomainError } from '../errors.ts';
import { addDays, daysBetween, type Day } from './days.ts';

export { GROWTH_FORMS, type GrowthFormCode } from './growth-forms.ts';

/** A size that is more than ten years away is never reached. */
const LONGEST_DAYS = 3652;

/** Sale grades by the largest measure of a piece, mm; common practice, no source. A grade ends where the next begins. */
export const GRADES = [
  { code: 'nub', label: 'Nub', minMm: 0 },
  { code: 'small', label: 'Small frag', minMm: 15 },
  { code: 'frag', label: 'Frag', minMm: 25 },
  { code: 'large', label: 'Large frag', minMm: 40 },
  { code: 'colony', label: 'Colony', minMm: 70 },
  { code: 'show', label: 'Show colony', minMm: 120 },
] as const;

export type Grade = (typeof GRADES)[number];
export type GradeCode = Grade['code'];

/** What is known of a batch's size. */
export interface SizeBasis {
  /** Size when cut, mm. */
  startMm: number;
  /** Linear extension, mm a week. */
  mmPerWeek: number;
  cutDay: Day;
  /** The newest measurement, which outweighs the plan. */
  measured?: { day: Day; mm: number };
}

/**
 * The grade of a piece.
 *
 * @param sizeMm largest measure, mm, zero or more
 * @throws {DomainError} `domain.out_of_range`
 */
export function gradeOf(sizeMm: number): Grade {
  const grade = GRADES.findLast(({ minMm }) => sizeMm >= minMm);
  if (!grade) {
    throw new DomainError('domain.out_of_range', 'A size is zero or more millimetres.', { details: { sizeMm } });
  }
  return grade;
}

/** A grade by its code. */
export function gradeByCode(code: GradeCode): Grade {
  const grade = GRADES.find((each) => each.code === code);
  if (!grade) throw new DomainError('input.invalid', 'Choose a grade from the list.', { details: { code } });
  return grade;
}

/**
 * Likely size on a day: linear growth from the cut, or from the newest measurement; between the two, the straight line
 * that joins them. A day before the cut counts as the cut day.
 *
 * @returns mm, never below zero
 */
export function sizeEstimate(basis: SizeBasis, day: Day): number {
  const { startMm, mmPerWeek, cutDay, measured } = basis;
  const age = Math.max(0, daysBetween(cutDay, day));
  if (!measured) return Math.max(0, startMm + (mmPerWeek * age) / 7);
  const measuredAge = daysBetween(cutDay, measured.day);
  if (age >= measuredAge) return Math.max(0, measured.mm + (mmPerWeek * (age - measuredAge)) / 7);
  return startMm + ((measured.mm - startMm) * age) / measuredAge;
}

/**
 * The first day on which a batch is both healed and of a size.
 *
 * @param minMm the size wanted, mm
 * @param healDays days from the cut until skinned over
 * @returns the day, or null where it will not grow so large within ten years
 */
export function saleableDay(basis: SizeBasis, minMm: number, healDays: number): Day | null {
  const healed = addDays(basis.cutDay, Math.ceil(healDays));
  if (sizeEstimate(basis, healed) >= minMm) return healed;
  const lastKnown = basis.measured && basis.measured.day > healed ? basis.measured.day : healed;
  const missing = minMm - sizeEstimate(basis, lastKnown);
  if (missing > 0 && !(basis.mmPerWeek > 0)) return null;
  const days = (missing / basis.mmPerWeek) * 7;
  if (missing > 0) return days > LONGEST_DAYS ? null : addDays(lastKnown, Math.ceil(trimmed(days)));
  return dayOnTheWay(basis, minMm);
}

/** Whether the cut has skinned over by a day. */
export function isHealed(cutDay: Day, healDays: number, day: Day): boolean {
  return daysBetween(cutDay, day) >= healDays;
}

/** The day on the straight line from the cut to the measurement; only for a size that lies between the two. */
function dayOnTheWay({ startMm, cutDay, measured }: SizeBasis, minMm: number): Day {
  if (!measured) return cutDay;
  const part = (minMm - startMm) / (measured.mm - startMm);
  return addDays(cutDay, Math.ceil(trimmed(part * daysBetween(cutDay, measured.day))));
}

/** Takes away the last bits of rounding, so that exactly 21 days stay 21. */
function trimmed(days: number): number {
  return Number(days.toFixed(9));
}
