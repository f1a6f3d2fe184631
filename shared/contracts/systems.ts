import { z } from 'zod';
import { PARAMETER_CODES } from '../domain/units.ts';
import { id, idParams, instant, labelCode, nothing, noteText, shortText, version } from './common.ts';
import type { Endpoint } from './endpoint.ts';

export const SYSTEM_KINDS = ['growout', 'broodstock', 'quarantine'] as const;
export type SystemKind = (typeof SYSTEM_KINDS)[number];

export const SYSTEM_KIND_LABELS: Record<SystemKind, string> = {
  growout: 'Grow-out',
  broodstock: 'Broodstock',
  quarantine: 'Quarantine',
};

export const parameterCode = z.enum(PARAMETER_CODES, 'Choose one of the parameters.');
/** Litres that a farm could have. */
export const litres = z.number().min(0.001, 'At least 0.001 L.').max(10_000_000, 'At most 10,000,000 L.');

/** Where a parameter should stay, in its canonical unit. */
export const TargetBand = z.strictObject({ parameter: parameterCode, low: z.number(), high: z.number() });
export type TargetBand = z.infer<typeof TargetBand>;

export const Tank = z.object({ id, systemId: id, code: z.string(), name: z.string() });
export type Tank = z.infer<typeof Tank>;

export const System = z.object({
  id,
  code: z.string(),
  name: z.string(),
  kind: z.enum(SYSTEM_KINDS),
  netVolumeL: z.number(),
  /** Open water of all tanks and sumps; null where nobody measured it. */
  surfaceM2: z.number().nullable(),
  note: z.string(),
  bands: z.array(TargetBand),
  tanks: z.array(Tank),
  createdAt: instant,
  version,
});
export type System = z.infer<typeof System>;

const surfaceM2 = z
  .number()
  .min(0.01, 'At least 0.01 m².')
  .max(1_000_000, 'At most 1,000,000 m².')
  .nullable()
  .optional();

const bands = z
  .array(TargetBand)
  .max(PARAMETER_CODES.length)
  .superRefine((given, context) => {
    given.forEach((band, index) => {
      if (band.low >= band.high) {
        context.addIssue({ code: 'custom', path: [index, 'high'], message: 'The upper end must be above the lower.' });
      }
      if (given.findIndex((each) => each.parameter === band.parameter) !== index) {
        context.addIssue({ code: 'custom', path: [index, 'parameter'], message: 'One band for each parameter.' });
      }
    });
  });

export const CreateSystem = z.strictObject({
  code: labelCode,
  name: shortText,
  kind: z.enum(SYSTEM_KINDS, 'Choose what the system is for.'),
  netVolumeL: litres,
  surfaceM2,
  note: noteText.default(''),
  bands: bands.default([]),
});
export type CreateSystem = z.infer<typeof CreateSystem>;
export const EditSystem = z.strictObject({
  code: labelCode.optional(),
  name: shortText.optional(),
  kind: z.enum(SYSTEM_KINDS).optional(),
  netVolumeL: litres.optional(),
  surfaceM2,
  note: noteText.optional(),
  bands: bands.optional(),
});
export type EditSystem = z.infer<typeof EditSystem>;
export const CreateTank = z.strictObject({ systemId: id, code: labelCode, name: shortText });
export type CreateTank = z.infer<typeof CreateTank>;

export const systemEndpoints = {
  list: {
    method: 'get',
    path: '/api/systems',
    access: 'stock.read',
    summary: 'Systems with their tanks and target bands',
    query: nothing,
    response: z.object({ items: z.array(System) }),
  },
  show: {
    method: 'get',
    path: '/api/systems/:id',
    access: 'stock.read',
    summary: 'One system',
    params: idParams,
    response: System,
  },
  create: {
    method: 'post',
    path: '/api/systems',
    access: 'water.configure',
    summary: 'Add a system',
    body: CreateSystem,
    response: System,
    creates: true,
  },
  edit: {
    method: 'patch',
    path: '/api/systems/:id',
    access: 'water.configure',
    summary: 'Change a system and its target bands',
    params: idParams,
    body: EditSystem,
    response: System,
    edits: true,
  },
  createTank: {
    method: 'post',
    path: '/api/tanks',
    access: 'water.configure',
    summary: 'Add a tank to a system',
    body: CreateTank,
    response: Tank,
    creates: true,
  },
} as const satisfies Record<string, Endpoint>;
