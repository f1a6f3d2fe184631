import { z } from 'zod';
import { POWDER_CODES, recipeConflict } from '../domain/stock-solutions.ts';
import { done, id, idParams, instant, labelCode, nothing, noteText, shortText } from './common.ts';
import type { Endpoint } from './endpoint.ts';

const solutionLitres = z.number('Enter the litres.').min(0.01, 'At least 0.01 L.').max(10_000, 'At most 10,000 L.');

const recipePart = z.strictObject({
  itemId: id,
  powder: z.enum(POWDER_CODES, 'Choose which salt it is.'),
  purity: z.number('Enter the purity.').min(0.05, 'At least 5 %.').max(1, 'At most 100 %.'),
  grams: z.number('Enter the grams.').min(0.01, 'At least 0.01 g.').max(1_000_000, 'At most 1,000 kg.'),
});

export const SolutionBatch = z.object({
  id,
  lotId: id,
  lotCode: z.string(),
  litres: z.number(),
  remainingMl: z.number(),
  costMicro: z.int(),
  at: instant,
  by: z.string(),
});
export type SolutionBatch = z.infer<typeof SolutionBatch>;

/** A recipe with what one mL of it brings and what is left of its batches. */
export const StockSolution = z.object({
  id,
  itemId: id,
  code: z.string(),
  name: z.string(),
  litres: z.number(),
  note: z.string(),
  /** Of one mL. */
  alkalinityMeq: z.number(),
  calciumMg: z.number(),
  magnesiumMg: z.number(),
  onHandMl: z.number(),
  retired: z.boolean(),
  parts: z.array(
    z.object({
      itemId: id,
      itemName: z.string(),
      powder: z.enum(POWDER_CODES),
      purity: z.number(),
      grams: z.number(),
      /** Of the powder in the supplies, g. */
      onHandG: z.number(),
    }),
  ),
  /** The newest batches. */
  batches: z.array(SolutionBatch),
});
export type StockSolution = z.infer<typeof StockSolution>;

export const CreateStockSolution = z.strictObject({
  code: labelCode,
  name: shortText,
  litres: solutionLitres,
  note: noteText.default(''),
  parts: z
    .array(recipePart)
    .min(1, 'Add a powder.')
    .max(4, 'At most four powders.')
    .superRefine((parts, context) => {
      const conflict = recipeConflict(parts.map(({ powder }) => powder));
      if (conflict !== null)
        context.addIssue({ code: 'custom', path: [parts.length - 1, 'powder'], message: conflict });
      parts.forEach(({ itemId }, index) => {
        if (parts.findIndex((each) => each.itemId === itemId) === index) return;
        context.addIssue({ code: 'custom', path: [index, 'itemId'], message: 'Each supply once.' });
      });
    }),
});
export type CreateStockSolution = z.infer<typeof CreateStockSolution>;

export const MakeSolution = z.strictObject({
  /** The recipe is scaled to it. */
  litres: solutionLitres,
  at: instant.optional(),
});
export type MakeSolution = z.infer<typeof MakeSolution>;

export const stockSolutionEndpoints = {
  list: {
    method: 'get',
    path: '/api/stock-solutions',
    access: 'water.read',
    summary: 'Recipes of stock solutions, with what is left of each',
    query: nothing,
    response: z.object({ items: z.array(StockSolution) }),
  },
  create: {
    method: 'post',
    path: '/api/stock-solutions',
    access: 'water.configure',
    summary: 'Write down a recipe; it becomes a supplement of the supplies',
    body: CreateStockSolution,
    response: StockSolution,
    creates: true,
  },
  make: {
    method: 'post',
    path: '/api/stock-solutions/:id/batches',
    access: 'water.log',
    summary: 'Make a batch: powders leave the supplies, the solution enters them',
    params: idParams,
    body: MakeSolution,
    response: StockSolution,
    creates: true,
  },
  undoBatch: {
    method: 'delete',
    path: '/api/solution-batches/:id',
    access: 'water.log',
    summary: 'Take back a batch of which nothing was used',
    params: idParams,
    response: done,
  },
} as const satisfies Record<string, Endpoint>;
