import { actEndpoints } from './stock/acts.ts';
import { batchEndpoints } from './stock/batches.ts';
import { colonyEndpoints } from './stock/colonies.ts';
import { cutEndpoints } from './stock/cuts.ts';
import { lineEndpoints } from './stock/lines.ts';
import { lossEndpoints } from './stock/losses.ts';
import { plugEndpoints } from './stock/plugs.ts';
import { rackEndpoints } from './stock/racks.ts';

export * from './stock/acts.ts';
export * from './stock/batches.ts';
export * from './stock/colonies.ts';
export * from './stock/cuts.ts';
export * from './stock/lines.ts';
export * from './stock/losses.ts';
export * from './stock/plugs.ts';
export * from './stock/racks.ts';
export * from './stock/values.ts';

/** Lines, mothers, cuts, batches, plugs, racks and every act on them. */
export const stockEndpoints = {
  ...lineEndpoints,
  ...colonyEndpoints,
  ...rackEndpoints,
  ...cutEndpoints,
  ...batchEndpoints,
  ...plugEndpoints,
  ...lossEndpoints,
  ...actEndpoints,
};
