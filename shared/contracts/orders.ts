export * from './orders/packing.ts';
export * from './orders/staff.ts';
export * from './orders/values.ts';
