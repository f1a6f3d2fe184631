import { DomainError } from '../errors.ts';
import { addDays, daysBetween, type Day } from './days.ts';
import { GROWTH_FORMS, type GrowthForm } from './growth-forms.ts';
import { GRADES, gradeOf, isHealed, saleableDay, sizeEstimate, type Grade, type SizeBasis } from './growth.ts';

/** What a line says of its own growth; null: as its growth form. */
export interface LineGrowth {
  growthForm: string;
  startMm: number | null;
  mmPerWeek: number | null;
  healDays: number | null;
}

export type Pace = Pick<GrowthForm, 'startMm' | 'mmPerWeek' | 'healDays' | 'restDays'>;

/** Nubs are not sold to stores (common practice), so the next grade is the smallest that is. */
export const SMALLEST_SOLD: Grade = GRADES[1];

/** @throws {DomainError} `input.invalid` for a growth form that is not known */
export function growthFormByCode(code: string): GrowthForm {
  const form = GROWTH_FORMS.find((each) => each.code === code);
  if (!form) throw new DomainError('input.invalid', 'Choose a growth form from the list.', { details: { code } });
  return form;
}

/** Start size (mm), growth (mm a week), healing and rest (days) of a line: its own figures, else its growth form's. */
export function paceOf(line: LineGrowth): Pace {
  const form = growthFormByCode(line.growthForm);
  return {
    startMm: line.startMm ?? form.startMm,
    mmPerWeek: line.mmPerWeek ?? form.mmPerWeek,
    healDays: line.healDays ?? form.healDays,
    restDays: form.restDays,
  };
}

/** How large a batch or plug likely is on a day, and when stores can have it. */
export interface Outlook {
  mm: number;
  mmPerWeek: number;
  grade: Grade['code'];
  healed: boolean;
  healedOn: Day;
  /** First day healed and large enough for the smallest grade that is sold; null: not within ten years. */
  saleableOn: Day | null;
  measuredOn: Day | null;
}

/** Size, grade and healing on a day, by the growth that is known. */
export function outlook(basis: SizeBasis, healDays: number, day: Day): Outlook {
  const mm = sizeEstimate(basis, day);
  return {
    mm,
    mmPerWeek: basis.mmPerWeek,
    grade: gradeOf(mm).code,
    healed: isHealed(basis.cutDay, healDays, day),
    healedOn: addDays(basis.cutDay, Math.ceil(healDays)),
    saleableOn: saleableDay(basis, SMALLEST_SOLD.minMm, healDays),
    measuredOn: basis.measured?.day ?? null,
  };
}

/** Whether a piece of this outlook may be sold: healed and of a grade that stores take. */
export function isSaleable({ healed, grade }: Pick<Outlook, 'healed' | 'grade'>): boolean {
  return healed && grade !== GRADES[0].code;
}

/** First day on which a mother has rested since its last cut; null: never cut. */
export function nextCutFrom(lastCutOn: Day | null, restDays: number): Day | null {
  return lastCutOn === null ? null : addDays(lastCutOn, restDays);
}

/** Whether a mother may be cut on a day without cutting its rest short. A day before the last cut is not rested. */
export function isRested(lastCutOn: Day | null, restDays: number, day: Day): boolean {
  return lastCutOn === null || daysBetween(lastCutOn, day) >= restDays;
}
