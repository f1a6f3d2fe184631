import { z } from 'zod';
import { done, id, idParams, instant, listQuery, pageOf } from './common.ts';
import type { Endpoint } from './endpoint.ts';
import { printerName, stockId } from './label-stocks.ts';

/** Codes with commas between them. */
const codeList = z.string().trim().min(1).max(6000, 'At most 6,000 characters: print the rest as a second file.');

/** What labels are for: plugs of a batch or by their codes, racks, tanks, or the boxes of an order. */
const subject = {
  batchId: id.optional(),
  codes: codeList.optional(),
  racks: codeList.optional(),
  tanks: codeList.optional(),
  orderId: id.optional(),
};
type Subject = { [What in keyof typeof subject]?: string | undefined };
const namesOneThing = ({ batchId, codes, racks, tanks, orderId }: Subject) =>
  [batchId, codes, racks, tanks, orderId].filter((each) => each !== undefined).length === 1;
const chooseOne = {
  message: 'Choose a batch, plugs, racks, tanks or an order to print labels for.',
  path: ['batchId'],
};

export const LabelSubject = z.strictObject(subject).refine(namesOneThing, chooseOne);
export type LabelSubject = z.infer<typeof LabelSubject>;

const place = z.int('Enter a whole number.').min(1, 'At least 1.').max(5000, 'At most 5,000.');
/** A subject and which of its labels, counted from 1: all where they are left out. */
const PrintedSubject = z
  .strictObject({ ...subject, from: place.optional(), to: place.optional() })
  .refine(namesOneThing, chooseOne);
export type PrintedSubject = z.infer<typeof PrintedSubject>;

export const PrintLabels = z.strictObject({
  subject: PrintedSubject,
  stockId,
  /** First free place of a part-used sheet, counted from 1 along the rows. */
  start: z.int('Enter a whole number.').min(1, 'At least 1.').max(1600).default(1),
  /** Whose saved fit is used; without one, labels are drawn where they belong. */
  printer: printerName.nullable().default(null),
  /** Draws the edge of every label, to check a sheet against the light. */
  edges: z.boolean().default(false),
});
export type PrintLabels = z.infer<typeof PrintLabels>;

/** A run of labels that can be printed again. */
export const LabelPrint = PrintLabels.extend({
  id,
  title: z.string(),
  labels: z.int(),
  stockName: z.string(),
  at: instant,
  by: z.string(),
});
export type LabelPrint = z.infer<typeof LabelPrint>;

export const LabelContents = z.object({
  /** Where the labels are from, as a title. */
  title: z.string(),
  /** The one batch that all labels belong to, if they do. */
  batchId: id.nullable(),
  labels: z.array(
    z.object({
      qrText: z.string(),
      code: z.string(),
      glyphCode: z.string().nullable(),
      rows: z.array(z.string()),
    }),
  ),
});
export type LabelContents = z.infer<typeof LabelContents>;

export const LabelSupply = z.object({ id, name: z.string(), onHand: z.number() });
export type LabelSupply = z.infer<typeof LabelSupply>;

export const TakeLabels = z.strictObject({
  itemId: id,
  batchId: id,
  labels: z.int('Enter a whole number.').min(1, 'At least 1.').max(10_000, 'At most 10,000 at once.'),
});
export type TakeLabels = z.infer<typeof TakeLabels>;

export const labelEndpoints = {
  print: {
    method: 'post',
    path: '/api/labels/prints',
    access: 'stock.label',
    summary: 'Note a run of labels, whose PDF is then made',
    body: PrintLabels,
    response: LabelPrint,
    creates: true,
  },
  prints: {
    method: 'get',
    path: '/api/labels/prints',
    access: 'stock.label',
    summary: 'Runs of labels, the latest first',
    query: listQuery.omit({ search: true }),
    response: pageOf(LabelPrint),
  },
  file: {
    method: 'get',
    path: '/api/labels/prints/:id/file',
    access: 'stock.label',
    summary: 'The PDF of a run of labels; closing the connection stops it',
    params: idParams,
    answer: 'file',
  },
  progress: {
    method: 'get',
    path: '/api/labels/prints/:id/progress',
    access: 'stock.label',
    summary: 'How many labels of a run are drawn by now, while its PDF is made',
    params: idParams,
    response: z.object({ done: z.int(), labels: z.int() }),
  },
  contents: {
    method: 'get',
    path: '/api/labels/contents',
    access: 'stock.label',
    summary: 'What the labels say',
    query: LabelSubject,
    response: LabelContents,
  },
  supplies: {
    method: 'get',
    path: '/api/labels/supplies',
    access: 'stock.label',
    summary: 'Blank labels on hand',
    response: z.object({ items: z.array(LabelSupply) }),
  },
  take: {
    method: 'post',
    path: '/api/labels/takings',
    access: 'stock.label',
    summary: 'Take blank labels from the supplies for a batch',
    body: TakeLabels,
    response: done,
    creates: true,
  },
} as const satisfies Record<string, Endpoint>;
