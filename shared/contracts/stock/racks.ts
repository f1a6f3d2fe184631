import { z } from 'zod';
import { calendarDay, id, idParams, instant, labelCode, version } from '../common.ts';
import type { Endpoint } from '../endpoint.ts';
import { grade, LineRef, RackRef } from './values.ts';

const rows = z.int('Enter a whole number.').min(1, 'At least one row.').max(26, 'At most 26 rows.');
const columns = z.int('Enter a whole number.').min(1, 'At least one column.').max(99, 'At most 99 columns.');

export const CreateRack = z.strictObject({ code: labelCode, tankId: id, rows, columns });
export type CreateRack = z.infer<typeof CreateRack>;
export const EditRack = z.strictObject({ code: labelCode, rows, columns, retired: z.boolean() }).partial();
export type EditRack = z.infer<typeof EditRack>;
export const MoveRack = z.strictObject({ tankId: id });
export type MoveRack = z.infer<typeof MoveRack>;

export const Rack = RackRef.extend({
  rows: z.int(),
  columns: z.int(),
  plugs: z.int(),
  colonies: z.int(),
  createdAt: instant,
  retiredAt: instant.nullable(),
  version,
});
export type Rack = z.infer<typeof Rack>;

/** A plug as the rack map draws it. `position` is null for one that stands loose on the rack. */
export const RackPlug = z.object({
  code: z.string(),
  position: z.string().nullable(),
  batchId: z.string(),
  batchCode: z.string(),
  lineId: z.string(),
  lineCode: z.string(),
  number: z.int(),
  cutOn: calendarDay,
  sizeMm: z.number(),
  grade,
  /** Days until saleable by growth; 0: now; null: not within ten years. */
  daysToGrade: z.int().nullable(),
  withheld: z.boolean(),
});
export type RackPlug = z.infer<typeof RackPlug>;

export const RackPage = Rack.extend({
  places: z.array(RackPlug),
  lines: z.array(LineRef.extend({ plugs: z.int(), oldestCutOn: calendarDay })),
  mothers: z.array(z.object({ id: z.string(), code: z.string(), lineCode: z.string() })),
  /** Open reasons why plugs here are kept from sale. */
  withholds: z.array(z.object({ id: z.string(), reason: z.string(), scope: z.string(), startedAt: instant })),
  /** Changes with every act on the rack: what was seen is what is counted. */
  saleable: z.int(),
  saleableIn14Days: z.int(),
});
export type RackPage = z.infer<typeof RackPage>;

export const rackEndpoints = {
  listRacks: {
    method: 'get',
    path: '/api/racks',
    access: 'stock.read',
    summary: 'Racks by system and tank',
    query: z.strictObject({
      systemId: id.optional(),
      tankId: id.optional(),
      code: labelCode.optional(),
      retired: z.enum(['no', 'only', 'all']).default('no'),
    }),
    response: z.object({ items: z.array(Rack) }),
  },
  createRack: {
    method: 'post',
    path: '/api/racks',
    access: 'stock.work',
    summary: 'Add a rack to a tank',
    body: CreateRack,
    response: Rack,
    creates: true,
  },
  showRack: {
    method: 'get',
    path: '/api/racks/:id',
    access: 'stock.read',
    summary: 'One rack with what stands where',
    params: idParams,
    response: RackPage,
  },
  editRack: {
    method: 'patch',
    path: '/api/racks/:id',
    access: 'stock.work',
    summary: 'Change a rack',
    params: idParams,
    body: EditRack,
    response: Rack,
    edits: true,
  },
  moveRack: {
    method: 'post',
    path: '/api/racks/:id/move',
    access: 'stock.work',
    summary: 'Move a whole rack to another tank',
    params: idParams,
    body: MoveRack,
    response: Rack,
    creates: true,
  },
  listTanks: {
    method: 'get',
    path: '/api/stock/tanks',
    access: 'stock.read',
    summary: 'Tanks that a rack can stand in',
    response: z.object({
      items: z.array(RackRef.omit({ id: true, code: true }).extend({ tankCode: z.string(), racks: z.int() })),
    }),
  },
} as const satisfies Record<string, Endpoint>;
