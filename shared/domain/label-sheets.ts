/** Paper by its portrait size, mm. */
export const PAPERS = {
  A4: { name: 'A4', width: 210, height: 297 },
  letter: { name: 'US Letter', width: 215.9, height: 279.4 },
} as const;

/** `roll`: every label is a page of its own. */
export const LABEL_PAPERS = ['A4', 'letter', 'roll'] as const;
export const LABEL_SHAPES = ['rectangle', 'round'] as const;

/** The measures of a label stock, a sheet or a roll; all lengths in mm, from the top left corner of the portrait page. */
export interface LabelMeasures {
  paper: (typeof LABEL_PAPERS)[number];
  shape: (typeof LABEL_SHAPES)[number];
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

export interface LabelSheet extends LabelMeasures {
  id: string;
  name: string;
}

/** Half an inch: the head of a small plug. */
const PLUG_LABEL = 12.7;
/** The farm's own grid for plug labels: room for a punch between them, and more than 14 mm to each edge of A4. */
const PLUG_GRID = {
  paper: 'A4',
  ...{ width: PLUG_LABEL, height: PLUG_LABEL, columns: 12, rows: 18 },
  ...{ left: 16.15, top: 14.65, pitchX: 15, pitchY: 15, cutLines: true },
} as const satisfies Partial<LabelSheet>;

/** A roll of labels, one below the other. */
export function rollOf(width: number, height: number): Omit<LabelMeasures, 'shape'> {
  return {
    ...{ paper: 'roll', width, height, columns: 1, rows: 1, left: 0, top: 0 },
    ...{ pitchX: width, pitchY: height, cutLines: false },
  };
}

/**
 * The label stocks that come with the product; farms add their own.
 * @see template measurements in the Debian package glabels-data, for the sheets that are sold ready cut; the rolls are
 *   sizes in common use (no source)
 */
export const LABEL_SHEETS: readonly LabelSheet[] = [
  {
    ...{ id: 'a4-65', name: 'A4, 65 labels of 38.1 × 21.2 mm', paper: 'A4', shape: 'rectangle' },
    ...{ width: 38.1, height: 21.198, columns: 5, rows: 13 },
    ...{ left: 4.699, top: 10.901, pitchX: 40.601, pitchY: 21.198, cutLines: false },
  },
  {
    ...{ id: 'a4-189', name: 'A4, 189 labels of 25.4 × 10 mm', paper: 'A4', shape: 'rectangle' },
    ...{ width: 25.4, height: 10, columns: 7, rows: 27 },
    ...{ left: 5, top: 13, pitchX: 28.5, pitchY: 10.14, cutLines: false },
  },
  {
    ...{ id: 'a4-21', name: 'A4, 21 labels of 64 × 38.1 mm', paper: 'A4', shape: 'rectangle' },
    ...{ width: 63.994, height: 38.1, columns: 3, rows: 7 },
    ...{ left: 7.479, top: 15.487, pitchX: 66.04, pitchY: 38.1, cutLines: false },
  },
  {
    ...{ id: 'letter-80', name: 'US Letter, 80 labels of 1.75 × 0.5 in', paper: 'letter', shape: 'rectangle' },
    ...{ width: 44.45, height: 12.7, columns: 4, rows: 20 },
    ...{ left: 7.144, top: 12.7, pitchX: 52.387, pitchY: 12.7, cutLines: false },
  },
  {
    ...{ id: 'letter-30', name: 'US Letter, 30 labels of 2.625 × 1 in', paper: 'letter', shape: 'rectangle' },
    ...{ width: 66.675, height: 25.4, columns: 3, rows: 10 },
    ...{ left: 3.969, top: 12.7, pitchX: 70.644, pitchY: 25.4, cutLines: false },
  },
  {
    ...{ id: 'letter-24-round', name: 'US Letter, 24 rounds of 1.625 in', paper: 'letter', shape: 'round' },
    ...{ width: 41.275, height: 41.275, columns: 4, rows: 6 },
    ...{ left: 10.559, top: 13.945, pitchX: 51.168, pitchY: 42.047, cutLines: false },
  },
  {
    ...PLUG_GRID,
    ...{ id: 'plug-square', name: 'Plug labels, 216 squares of 12.7 mm on A4', shape: 'rectangle' },
  },
  {
    ...PLUG_GRID,
    ...{ id: 'plug-round', name: 'Plug labels, 216 rounds of 12.7 mm on A4', shape: 'round' },
  },
  { ...rollOf(57.15, 31.75), id: 'roll-57', name: 'Roll, 57 × 32 mm (2¼ × 1¼ in)', shape: 'rectangle' },
  { ...rollOf(50.8, 25.4), id: 'roll-51', name: 'Roll, 51 × 25 mm (2 × 1 in)', shape: 'rectangle' },
  { ...rollOf(25.4, 25.4), id: 'roll-25', name: 'Roll, 25 × 25 mm (1 × 1 in)', shape: 'rectangle' },
];
