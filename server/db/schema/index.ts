export * from './farm.ts';
export * from './people.ts';
export * from './water.ts';
export * from './stock.ts';
export * from './supplies.ts';
export * from './costs.ts';
export * from './orders.ts';
