/** Starting defaults of a growth form, until the farm has its own records by line and system. */
export interface GrowthForm {
  code: string;
  label: string;
  /** Size of a fresh piece, mm. */
  startMm: number;
  /** Days until the cut has skinned over. */
  healDays: number;
  mmPerWeek: number;
  /** Rest of a mother between cuts, days. */
  restDays: number;
  /** Part of the pieces that live to be sold, 0 to 1. */
  survival: number;
  soldBy: 'size' | 'heads' | 'eyes' | 'polyps' | 'piece';
}

/** All values from memory, common practice: middles of the ranges growers quote. Every farm overwrites them. */
export const GROWTH_FORMS = [
  form('branching', 'Branching small-polyp', { startMm: 25, healDays: 8, mmPerWeek: 1.8, restDays: 70 }, 0.93),
  form('staghorn', 'Staghorn and other acroporas', { startMm: 30, healDays: 11, mmPerWeek: 1.5, restDays: 112 }, 0.86),
  form('plating', 'Plating and encrusting', { startMm: 20, healDays: 11, mmPerWeek: 1.6, restDays: 112 }, 0.91),
  form('massive', 'Massive', { startMm: 15, healDays: 21, mmPerWeek: 0.6, restDays: 175 }, 0.89),
  form(
    'branching_lps',
    'Branching large-polyp',
    { startMm: 30, healDays: 5, mmPerWeek: 0.8, restDays: 147 },
    0.9,
    'heads',
  ),
  form('fleshy_lps', 'Fleshy large-polyp', { startMm: 20, healDays: 21, mmPerWeek: 0.6, restDays: 175 }, 0.86, 'eyes'),
  form(
    'wall_lps',
    'Wall and single-polyp',
    { startMm: 40, healDays: 30, mmPerWeek: 0.5, restDays: 210 },
    0.72,
    'piece',
  ),
  form('flowerpot', 'Flowerpot', { startMm: 25, healDays: 21, mmPerWeek: 0.7, restDays: 182 }, 0.83),
  form('zoanthid', 'Zoanthid', { startMm: 15, healDays: 5, mmPerWeek: 1.6, restDays: 56 }, 0.94, 'polyps'),
  form('mushroom', 'Mushroom', { startMm: 20, healDays: 10, mmPerWeek: 1.4, restDays: 91 }, 0.9, 'piece'),
  form('leather', 'Leather', { startMm: 30, healDays: 8, mmPerWeek: 2, restDays: 91 }, 0.93),
  form('mat', 'Mat', { startMm: 25, healDays: 4, mmPerWeek: 3, restDays: 49 }, 0.94),
] as const satisfies readonly GrowthForm[];

export type GrowthFormCode = (typeof GROWTH_FORMS)[number]['code'];

type Pace = Pick<GrowthForm, 'startMm' | 'healDays' | 'mmPerWeek' | 'restDays'>;

function form<Code extends string>(
  code: Code,
  label: string,
  pace: Pace,
  survival: number,
  soldBy: GrowthForm['soldBy'] = 'size',
): GrowthForm & { code: Code } {
  return { code, label, ...pace, survival, soldBy };
}
