import { DomainError } from '../errors.ts';

/** Paper by its portrait size, mm. */
export const PAPERS = {
  A4: { name: 'A4', width: 210, height: 297 },
  letter: { name: 'US Letter', width: 215.9, height: 279.4 },
} as const;

/** A sheet of labels; all lengths in mm, from the top left corner of the portrait page. */
export interface LabelSheet {
  id: LabelSheetId;
  name: string;
  paper: keyof typeof PAPERS;
  shape: 'rectangle' | 'square' | 'round';
  width: number;
  height: number;
  columns: number;
  rows: number;
  left: number;
  top: number;
  pitchX: number;
  pitchY: number;
  /** Printed on plain waterproof sheet: each label gets a fine outline to cut or punch along. */
  cutLines: boolean;
}

export const LABEL_SHEET_IDS = ['a4-65', 'a4-189', 'letter-80', 'plug-square', 'plug-round'] as const;
export type LabelSheetId = (typeof LABEL_SHEET_IDS)[number];

/** Half an inch: the head of a small plug. */
const PLUG_LABEL = 12.7;
/** The farm's own grid for plug labels: room for a punch between them, and more than 14 mm to each edge of A4. */
const PLUG_GRID = {
  paper: 'A4',
  ...{ width: PLUG_LABEL, height: PLUG_LABEL, columns: 12, rows: 18 },
  ...{ left: 16.15, top: 14.65, pitchX: 15, pitchY: 15, cutLines: true },
} as const satisfies Partial<LabelSheet>;

/**
 * The sheets that labels can be printed on.
 * @see template measurements in the Debian package glabels-data, for the three sheets that are sold ready cut
 */
export const LABEL_SHEETS: Readonly<Record<LabelSheetId, LabelSheet>> = {
  'a4-65': {
    ...{ id: 'a4-65', name: 'A4, 65 labels of 38.1 × 21.2 mm', paper: 'A4', shape: 'rectangle' },
    ...{ width: 38.1, height: 21.198, columns: 5, rows: 13 },
    ...{ left: 4.699, top: 10.901, pitchX: 40.601, pitchY: 21.198, cutLines: false },
  },
  'a4-189': {
    ...{ id: 'a4-189', name: 'A4, 189 labels of 25.4 × 10 mm', paper: 'A4', shape: 'rectangle' },
    ...{ width: 25.4, height: 10, columns: 7, rows: 27 },
    ...{ left: 5, top: 13, pitchX: 28.5, pitchY: 10.14, cutLines: false },
  },
  'letter-80': {
    ...{ id: 'letter-80', name: 'US Letter, 80 labels of 1.75 × 0.5 in', paper: 'letter', shape: 'rectangle' },
    ...{ width: 44.45, height: 12.7, columns: 4, rows: 20 },
    ...{ left: 7.144, top: 12.7, pitchX: 52.387, pitchY: 12.7, cutLines: false },
  },
  'plug-square': {
    ...PLUG_GRID,
    ...{ id: 'plug-square', name: 'Plug labels, 216 squares of 12.7 mm on A4', shape: 'square' },
  },
  'plug-round': {
    ...PLUG_GRID,
    ...{ id: 'plug-round', name: 'Plug labels, 216 rounds of 12.7 mm on A4', shape: 'round' },
  },
};

/** How many labels one sheet holds. */
export function labelsOn(sheet: LabelSheet): number {
  return sheet.columns * sheet.rows;
}

/**
 * Where the labels of a run come to lie: row by row from the first free place, then on fresh sheets from the first.
 *
 * @param start first free place of the first sheet, counted from 1 along the rows
 * @returns for each label its page from 0 and its top left corner, mm
 * @throws {DomainError} `input.invalid` where the sheet has no such place
 */
export function placesFor(
  sheet: LabelSheet,
  labels: number,
  start: number,
): { page: number; place: number; x: number; y: number }[] {
  const onSheet = labelsOn(sheet);
  if (!Number.isInteger(start) || start < 1 || start > onSheet) {
    const message = `This sheet has places 1 to ${onSheet}.`;
    throw new DomainError('input.invalid', message, { fields: [{ path: 'start', message }] });
  }
  return Array.from({ length: labels }, (_, index) => {
    const overall = start - 1 + index;
    const place = (overall % onSheet) + 1;
    return { page: Math.floor(overall / onSheet), place, ...cornerOf(sheet, place) };
  });
}

/** The top left corner of a place counted from 1 along the rows, mm. */
export function cornerOf(sheet: LabelSheet, place: number): { x: number; y: number } {
  const column = (place - 1) % sheet.columns;
  const row = Math.floor((place - 1) / sheet.columns);
  return { x: sheet.left + column * sheet.pitchX, y: sheet.top + row * sheet.pitchY };
}
