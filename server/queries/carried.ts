import type { Carried } from '../../shared/contracts/demand.ts';
import { MS_PER_DAY } from '../../shared/domain/days.ts';
import { evaporationFromUse } from '../../shared/domain/evaporation.ts';
import { limewaterCeiling } from '../../shared/domain/limewater.ts';
import { supplyPerDay } from '../../shared/domain/reservoir-use.ts';
import { perMeqOfLimewater, type SystemSupply } from './demand-inputs.ts';
import type { SystemRow } from './systems.ts';

/** Evaporation is told from the limewater that topped it up over as many days. */
const EVAPORATION_DAYS = 7;
/** What comes now and then is shared out over as many days. */
const SHARED_OVER_DAYS = 14;

/** What a system is given as things stand now, whatever it got while its demand was told. */
export function carriedNow(system: SystemRow, supply: SystemSupply, now: number): Carried {
  return {
    limewater: limewaterNow(system, supply, now),
    others: supplyPerDay(supply.doses, now - SHARED_OVER_DAYS * MS_PER_DAY, now),
    waterChanges: broughtByChanges(supply, now),
  };
}

/** Litres a day that evaporate, as far as limewater topped them up; null where no use was logged lately. */
export function evaporationOf({ use }: SystemSupply, now: number): number | null {
  return evaporationFromUse(use, now, { days: EVAPORATION_DAYS })?.litresPerDay ?? null;
}

function limewaterNow({ netVolumeL }: SystemRow, supply: SystemSupply, now: number): number | null {
  if (supply.strengthMeqL === null) return 0;
  const evaporation = evaporationOf(supply, now);
  if (evaporation === null) return null;
  return limewaterCeiling(evaporation, supply.strengthMeqL, netVolumeL) * perMeqOfLimewater(supply.solute);
}

/** A change of fraction f moves the level by f times the difference to the new water; the last test stands for the level. */
function broughtByChanges({ demandInputs }: SystemSupply, now: number): number {
  const level = demandInputs.readings.at(-1)?.value;
  if (level === undefined) return 0;
  const from = now - SHARED_OVER_DAYS * MS_PER_DAY;
  const brought = demandInputs.waterChanges
    .filter(({ at }) => at > from)
    .reduce((sum, { fraction, value }) => sum + fraction * (value - level), 0);
  return brought / SHARED_OVER_DAYS;
}
