import type { Access } from '@shared/permissions.ts';

/**
 * The main places, in the order of the menu. `name` is also the name of the place's first route: a place whose
 * route doesn't exist or isn't open to the person is not shown.
 */
export const PLACES = [
  { name: 'today', label: 'Today', access: 'today.read' },
  { name: 'water', label: 'Water', access: 'water.read' },
  { name: 'stock', label: 'Stock', access: 'stock.read' },
  { name: 'cutting', label: 'Cutting', access: 'stock.work' },
  { name: 'supplies', label: 'Supplies', access: 'supplies.read' },
  { name: 'orders', label: 'Orders', access: 'orders.read' },
  { name: 'costs', label: 'Costs', access: 'costs.read' },
  { name: 'plan', label: 'Plan', access: 'stock.work' },
  { name: 'settings', label: 'Settings', access: 'audit.read' },
  { name: 'shop', label: 'Availability', access: 'shop.read' },
  { name: 'shop-orders', label: 'Orders', access: 'shop.read' },
  { name: 'shop-claims', label: 'Claims', access: 'shop.read' },
] as const satisfies readonly { name: string; label: string; access: Access }[];

export type Place = (typeof PLACES)[number];
export type PlaceName = Place['name'] | 'scan' | 'account';

/** The places at hand on a phone's bottom bar, around Scan; the others are under More. */
export const PHONE_PLACES: readonly PlaceName[] = ['today', 'stock', 'water', 'shop', 'shop-orders'];
