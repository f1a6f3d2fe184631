/** The roles a person can have on a farm. `buyer` belongs to one store. */
export const ROLES = ['owner', 'grower', 'sales', 'viewer', 'buyer'] as const;
export type Role = (typeof ROLES)[number];

export const ROLE_LABELS: Record<Role, string> = {
  owner: 'Owner',
  grower: 'Grower',
  sales: 'Sales',
  viewer: 'Viewer',
  buyer: 'Store buyer',
};

const STAFF = ['owner', 'grower', 'sales', 'viewer'] as const satisfies readonly Role[];

/**
 * The one permission table: who may do what. The server checks it on every request; router guard and menus read it
 * only to avoid showing what would be refused. A buyer's permissions reach their own store's rows only.
 */
export const PERMISSIONS = {
  'account.own': ROLES,
  'today.read': STAFF,
  'water.read': ['owner', 'grower', 'viewer'],
  'water.log': ['owner', 'grower'],
  'water.configure': ['owner', 'grower'],
  'stock.read': STAFF,
  'stock.work': ['owner', 'grower'],
  'stock.label': ['owner', 'grower', 'sales'],
  'supplies.read': ['owner', 'grower', 'viewer'],
  'supplies.work': ['owner', 'grower'],
  'costs.read': ['owner', 'grower', 'viewer'],
  'orders.read': ['owner', 'sales', 'viewer'],
  'orders.work': ['owner', 'sales'],
  'stores.read': ['owner', 'sales', 'viewer'],
  'stores.work': ['owner', 'sales'],
  'listings.read': ['owner', 'sales', 'viewer'],
  'listings.price': ['owner'],
  'shop.read': ['buyer'],
  'shop.order': ['buyer'],
  'people.manage': ['owner'],
  'farm.configure': ['owner'],
  'audit.read': ['owner', 'viewer'],
} as const satisfies Record<string, readonly Role[]>;

export type Permission = keyof typeof PERMISSIONS;

/** What a route asks of its caller: a permission, or `public` where anyone may call it. */
export type Access = Permission | 'public';

/** Whether someone with this role (null: not signed in) may use what asks for this access. */
export function mayUse(role: Role | null, access: Access): boolean {
  if (access === 'public') return true;
  return role !== null && (PERMISSIONS[access] as readonly Role[]).includes(role);
}
