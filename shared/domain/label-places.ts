import { DomainError } from '../errors.ts';
import { type LabelMeasures, PAPERS } from './label-sheets.ts';

/** Rounding of measures in inches, mm: labels may seem to overlap or leave the paper by this much. */
const ROUNDING_MM = 0.01;

/** The page that is printed on: the paper of a sheet; on a roll the label itself, mm. */
export function pageOf({ paper, width, height }: LabelMeasures): { width: number; height: number } {
  return paper === 'roll' ? { width, height } : PAPERS[paper];
}

/** How many labels one sheet holds; one on a roll. */
export function labelsOn({ columns, rows }: Pick<LabelMeasures, 'columns' | 'rows'>): number {
  return columns * rows;
}

/**
 * Where the labels of a run come to lie: row by row from the first free place, then on fresh sheets from the first.
 *
 * @param start first free place of the first sheet, counted from 1 along the rows
 * @returns for each label its page from 0 and its top left corner, mm
 * @throws {DomainError} `input.invalid` where the sheet has no such place
 */
export function placesFor(
  sheet: LabelMeasures,
  labels: number,
  start: number,
): { page: number; place: number; x: number; y: number }[] {
  const onSheet = labelsOn(sheet);
  if (!Number.isInteger(start) || start < 1 || start > onSheet) {
    throw refused([['start', onSheet === 1 ? 'A roll has place 1 alone.' : `This sheet has places 1 to ${onSheet}.`]]);
  }
  return Array.from({ length: labels }, (_, index) => {
    const overall = start - 1 + index;
    const place = (overall % onSheet) + 1;
    return { page: Math.floor(overall / onSheet), place, ...cornerOf(sheet, place) };
  });
}

/** The top left corner of a place counted from 1 along the rows, mm. */
export function cornerOf(sheet: LabelMeasures, place: number): { x: number; y: number } {
  const column = (place - 1) % sheet.columns;
  const row = Math.floor((place - 1) / sheet.columns);
  return { x: sheet.left + column * sheet.pitchX, y: sheet.top + row * sheet.pitchY };
}

/**
 * What is wrong with the measures of a label stock, by field: labels that overlap or leave the paper, rounds that are not
 * round, a roll of more than one. Empty where all is well.
 */
export function measureProblems(sheet: LabelMeasures): [field: keyof LabelMeasures, message: string][] {
  const page = pageOf(sheet);
  const right = sheet.left + (sheet.columns - 1) * sheet.pitchX + sheet.width;
  const bottom = sheet.top + (sheet.rows - 1) * sheet.pitchY + sheet.height;
  const over = (beyond: number) => `${beyond.toFixed(1)} mm too much: the last label leaves the paper.`;
  const problems: [keyof LabelMeasures, string, boolean][] = [
    ['height', 'A round label is as high as it is wide.', sheet.shape === 'round' && sheet.width !== sheet.height],
    ['columns', 'A roll has one label on a page.', sheet.paper === 'roll' && labelsOn(sheet) > 1],
    ['left', 'A roll has no margins.', sheet.paper === 'roll' && sheet.left + sheet.top > 0],
    ['pitchX', 'At least the width, or labels overlap.', sheet.columns > 1 && sheet.pitchX < sheet.width - ROUNDING_MM],
    ['pitchY', 'At least the height, or labels overlap.', sheet.rows > 1 && sheet.pitchY < sheet.height - ROUNDING_MM],
    [sheet.columns > 1 ? 'pitchX' : 'width', over(right - page.width), right > page.width + ROUNDING_MM],
    [sheet.rows > 1 ? 'pitchY' : 'height', over(bottom - page.height), bottom > page.height + ROUNDING_MM],
  ];
  return problems.flatMap(([field, message, holds]) => (holds ? [[field, message]] : []));
}

/** @throws {DomainError} `input.invalid` with a message at each field that `measureProblems` names */
export function assertMeasures(sheet: LabelMeasures): void {
  const problems = measureProblems(sheet);
  if (problems.length > 0) throw refused(problems);
}

function refused(problems: readonly (readonly [path: string, message: string])[]): DomainError {
  const [first] = problems;
  return new DomainError('input.invalid', first?.[1] ?? '', {
    fields: problems.map(([path, message]) => ({ path, message })),
  });
}
