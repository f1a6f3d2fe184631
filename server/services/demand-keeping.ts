import { lt } from 'drizzle-orm';
import { MS_PER_DAY } from '../../shared/domain/days.ts';
import { demandStates } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { demandStateOf } from '../queries/demand-state.ts';
import { trackSystem } from '../queries/demand-track.ts';
import type { Solute } from '../queries/supplement-supply.ts';
import type { SystemRow } from '../queries/systems.ts';

/** What lists and checks ask for. */
export const KEPT_SOLUTES: readonly Solute[] = ['alkalinity', 'calcium'];

/** Works out a system's demand and keeps it, until a trigger takes it away because something it stands on changed. */
export function keepDemand({ tx, now }: Write, system: SystemRow, solute: Solute): void {
  const state = demandStateOf(trackSystem(tx, system, { now, solute }), system.id);
  if (!state) return;
  const { systemId, parameter, ...found } = state;
  tx.insert(demandStates)
    .values(state)
    .onConflictDoUpdate({ target: [demandStates.systemId, demandStates.parameter], set: found })
    .run();
}

/** After a day all are worked out anew, so that the noises are learnt from the latest year. */
export function forgetOldDemands({ tx, now }: Write): void {
  tx.delete(demandStates)
    .where(lt(demandStates.at, now - MS_PER_DAY))
    .run();
}
