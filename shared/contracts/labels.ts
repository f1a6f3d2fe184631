import { z } from 'zod';
import { LABEL_SHEET_IDS } from '../domain/label-sheets.ts';
import { done, id } from './common.ts';
import type { Endpoint } from './endpoint.ts';

/** Codes with commas between them. */
const codeList = z.string().trim().min(1).max(6000, 'At most 6,000 characters: print the rest as a second file.');

/** What labels are for: all plugs of a batch, plugs by their codes, or racks by their codes. */
const subject = {
  batchId: id.optional(),
  codes: codeList.optional(),
  racks: codeList.optional(),
};
type Subject = { batchId?: string | undefined; codes?: string | undefined; racks?: string | undefined };
const namesOneThing = ({ batchId, codes, racks }: Subject) =>
  [batchId, codes, racks].filter((each) => each !== undefined).length === 1;
const chooseOne = { message: 'Choose a batch, plugs or racks to print labels for.', path: ['batchId'] };

export const LabelSubject = z.strictObject(subject).refine(namesOneThing, chooseOne);
export type LabelSubject = z.infer<typeof LabelSubject>;

const shift = z.coerce.number().min(-5, 'At most 5 mm.').max(5, 'At most 5 mm.').default(0);
export const PrintLabels = z
  .strictObject({
    ...subject,
    sheet: z.enum(LABEL_SHEET_IDS),
    /** First free place of a part-used sheet, counted from 1 along the rows. */
    start: z.coerce.number().int().min(1).max(300).default(1),
    /** What the printer needs to hit the labels, mm to the right and down. */
    shiftX: shift,
    shiftY: shift,
    /** Draws the edge of every label, to check a sheet against the light. */
    edges: z.enum(['0', '1']).default('0'),
  })
  .refine(namesOneThing, chooseOne);
export type PrintLabels = z.infer<typeof PrintLabels>;

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
    method: 'get',
    path: '/api/labels',
    access: 'stock.label',
    summary: 'A PDF of labels for plugs or racks',
    query: PrintLabels,
    answer: 'file',
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
