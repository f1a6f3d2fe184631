import type { ItemKind, ItemUnit } from '../../../shared/domain/supply-items.ts';

export type ItemKey = 'lime' | 'vinegar' | 'salt' | 'supplement' | 'plug' | 'glue' | 'label' | 'box' | 'heatPack';

export interface ItemSpec {
  key: ItemKey;
  code: string;
  name: string;
  kind: ItemKind;
  unit: ItemUnit;
  packSize: number;
  leadTimeDays: number;
  safetyDays: number;
  strength: number | null;
  supplier: string;
  /** Price of a pack at the beginning, in cents. */
  packPrice: number;
  /** Expected use in a day, until there is a record of it. */
  usePerDay: number;
  /** Days that it keeps; null: for ever. */
  keepsDays: number | null;
}

export const SUPPLIERS = [
  { name: 'Weald Minerals', email: 'weald@example.org' },
  { name: 'Harbour Salt Depot', email: 'depot@example.org' },
  { name: 'Bench & Frame', email: 'bench@example.org' },
  { name: 'Crate Yard', email: 'crate@example.org' },
] as const;

const item = (
  key: ItemKey,
  code: string,
  name: string,
  kind: ItemKind,
  unit: ItemUnit,
  more: Omit<ItemSpec, 'key' | 'code' | 'name' | 'kind' | 'unit'>,
): ItemSpec => ({ key, code, name, kind, unit, ...more });

export const ITEMS: readonly ItemSpec[] = [
  item('lime', 'LIME', 'Lime, calcium hydroxide 95 %', 'lime', 'g', {
    ...{ packSize: 1000, leadTimeDays: 7, safetyDays: 10, strength: 0.95, supplier: 'Weald Minerals' },
    ...{ packPrice: 890, usePerDay: 90, keepsDays: 540 },
  }),
  item('vinegar', 'VIN-5', 'White vinegar 5 %', 'vinegar', 'mL', {
    ...{ packSize: 5000, leadTimeDays: 3, safetyDays: 14, strength: 5, supplier: 'Weald Minerals' },
    ...{ packPrice: 420, usePerDay: 60, keepsDays: 720 },
  }),
  item('salt', 'SALT', 'Salt mix', 'salt', 'g', {
    ...{ packSize: 25_000, leadTimeDays: 5, safetyDays: 10, strength: null, supplier: 'Harbour Salt Depot' },
    ...{ packPrice: 5900, usePerDay: 4500, keepsDays: null },
  }),
  item('supplement', 'ALK-S', 'Alkalinity supplement', 'supplement', 'mL', {
    ...{ packSize: 5000, leadTimeDays: 6, safetyDays: 14, strength: 1.9, supplier: 'Weald Minerals' },
    ...{ packPrice: 2350, usePerDay: 40, keepsDays: 400 },
  }),
  item('plug', 'PLUG-20', 'Plugs, 20 mm', 'plug', 'piece', {
    ...{ packSize: 500, leadTimeDays: 12, safetyDays: 14, strength: null, supplier: 'Bench & Frame' },
    ...{ packPrice: 6200, usePerDay: 12, keepsDays: null },
  }),
  item('glue', 'GLUE', 'Gel glue', 'glue', 'g', {
    ...{ packSize: 300, leadTimeDays: 6, safetyDays: 14, strength: null, supplier: 'Bench & Frame' },
    ...{ packPrice: 1180, usePerDay: 6, keepsDays: 360 },
  }),
  item('label', 'LBL-20', 'Labels for plugs', 'label', 'piece', {
    ...{ packSize: 1000, leadTimeDays: 8, safetyDays: 14, strength: null, supplier: 'Bench & Frame' },
    ...{ packPrice: 2400, usePerDay: 12, keepsDays: null },
  }),
  item('box', 'BOX-24', 'Shipping boxes for 24', 'packing', 'piece', {
    ...{ packSize: 25, leadTimeDays: 5, safetyDays: 10, strength: null, supplier: 'Crate Yard' },
    ...{ packPrice: 6800, usePerDay: 0.3, keepsDays: null },
  }),
  item('heatPack', 'HEAT-40', 'Heat packs, 40 hours', 'packing', 'piece', {
    ...{ packSize: 40, leadTimeDays: 5, safetyDays: 10, strength: null, supplier: 'Crate Yard' },
    ...{ packPrice: 3600, usePerDay: 0.4, keepsDays: 700 },
  }),
];
