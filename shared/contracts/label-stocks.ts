import { z } from 'zod';
import { LABEL_PAPERS, LABEL_SHAPES } from '../domain/label-sheets.ts';
import { done, idParams, shortText, version } from './common.ts';
import type { Endpoint } from './endpoint.ts';

const side = z.number('Enter millimetres.').min(8, 'At least 8 mm.').max(300, 'At most 300 mm.');
const distance = z.number('Enter millimetres.').min(0, 'Not below zero.').max(300, 'At most 300 mm.');
const count = z.int('Enter a whole number.').min(1, 'At least 1.').max(40, 'At most 40.');

/** A stock of the farm's own: a sheet by its grid, or a roll; lengths in mm. */
export const LabelStockFields = z.strictObject({
  name: shortText.max(60, 'At most 60 characters.'),
  paper: z.enum(LABEL_PAPERS),
  shape: z.enum(LABEL_SHAPES),
  width: side,
  height: side,
  columns: count,
  rows: count,
  left: distance,
  top: distance,
  pitchX: distance,
  pitchY: distance,
  cutLines: z.boolean(),
});
export type LabelStockFields = z.infer<typeof LabelStockFields>;

export const EditLabelStock = LabelStockFields.partial().extend({
  /** A stock that is no longer bought; what was printed on it can be printed again. */
  retired: z.boolean().optional(),
});
export type EditLabelStock = z.infer<typeof EditLabelStock>;

/** Own stocks go by a uuid, those of the product by a name. */
export const stockId = z.string().min(1, 'Choose a stock.').max(40);
export const LabelStock = LabelStockFields.extend({
  id: stockId,
  /** Comes with the product: its measures cannot be changed. */
  shipped: z.boolean(),
  retired: z.boolean(),
  version,
});
export type LabelStock = z.infer<typeof LabelStock>;

export const printerName = z.string().trim().min(1, 'Name the printer.').max(40, 'At most 40 characters.');
const measured = z.number('Enter what you measured.').min(0, 'Not below zero.').max(300, 'At most 300 mm.');

/** What was measured on a calibration page, mm. */
export const MeasureFit = z.strictObject({
  stockId,
  printer: printerName,
  left: measured,
  top: measured,
  across: measured,
  down: measured,
});
export type MeasureFit = z.infer<typeof MeasureFit>;

export const SavedFit = z.object({
  stockId,
  printer: printerName,
  shiftX: z.number(),
  shiftY: z.number(),
  scaleX: z.number(),
  scaleY: z.number(),
  savedAt: z.int(),
  by: z.string(),
});
export type SavedFit = z.infer<typeof SavedFit>;

export const labelStockEndpoints = {
  list: {
    method: 'get',
    path: '/api/label-stocks',
    access: 'stock.label',
    summary: 'Label stocks of the product and of the farm, and what printers need to hit them',
    response: z.object({ items: z.array(LabelStock), fits: z.array(SavedFit) }),
  },
  create: {
    method: 'post',
    path: '/api/label-stocks',
    access: 'stock.label',
    summary: 'Add a label stock by its measures',
    body: LabelStockFields,
    response: LabelStock,
    creates: true,
  },
  edit: {
    method: 'patch',
    path: '/api/label-stocks/:id',
    access: 'stock.label',
    summary: 'Change or retire an own label stock',
    params: idParams,
    body: EditLabelStock,
    response: LabelStock,
    edits: true,
  },
  calibration: {
    method: 'get',
    path: '/api/label-stocks/:stockId/calibration',
    access: 'stock.label',
    summary: 'A PDF with rules, to measure what a printer shifts and stretches',
    params: z.strictObject({ stockId }),
    /** A printer: the page is drawn with its saved fit, to check it. */
    query: z.strictObject({ printer: printerName.optional() }),
    answer: 'file',
  },
  fit: {
    method: 'put',
    path: '/api/label-fits',
    access: 'stock.label',
    summary: 'Save what a printer needs to hit the labels of a stock, from what was measured',
    body: MeasureFit,
    response: SavedFit,
  },
  forgetFit: {
    method: 'delete',
    path: '/api/label-fits',
    access: 'stock.label',
    summary: 'Forget what a printer needs on a stock',
    query: z.strictObject({ stockId, printer: printerName }),
    response: done,
  },
} as const satisfies Record<string, Endpoint>;
