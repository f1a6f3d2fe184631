import type { Carried } from '../../shared/contracts/water.ts';
import { MS_PER_DAY } from '../../shared/domain/days.ts';
import { DEFAULT_WINDOW_DAYS } from '../../shared/domain/demand.ts';
import { limewaterCeiling } from '../../shared/domain/limewater.ts';
import { litresPerDay, supplyPerDay } from '../../shared/domain/reservoir-use.ts';
import type { SystemSupply } from './demand-inputs.ts';
import type { SystemRow } from './systems.ts';

/** Evaporation is told from the limewater that topped it up over as many days. */
const EVAPORATION_DAYS = 7;

/** What a system is given as things stand now, whatever it got while its demand was told. */
export function carriedNow(system: SystemRow, supply: SystemSupply, now: number): Carried {
  return {
    limewater: limewaterNow(system, supply, now),
    others: supplyPerDay(supply.doses, now - DEFAULT_WINDOW_DAYS * MS_PER_DAY, now),
    waterChanges: broughtByChanges(supply, now),
  };
}

/** Litres a day that evaporate, as far as limewater topped them up; null where no use was logged lately. */
export function evaporationOf({ use }: SystemSupply, now: number): number | null {
  return litresPerDay(use, now, EVAPORATION_DAYS);
}

function limewaterNow({ netVolumeL }: SystemRow, supply: SystemSupply, now: number): number | null {
  if (supply.strengthMeqL === null) return 0;
  const evaporation = evaporationOf(supply, now);
  return evaporation === null ? null : limewaterCeiling(evaporation, supply.strengthMeqL, netVolumeL);
}

/** A change of fraction f moves the level by f times the difference to the new water; the last test stands for the level. */
function broughtByChanges({ demandInputs, tests }: SystemSupply, now: number): number {
  const level = tests.at(-1)?.value;
  if (level === undefined) return 0;
  const from = now - DEFAULT_WINDOW_DAYS * MS_PER_DAY;
  const brought = demandInputs.waterChanges
    .filter(({ at }) => at > from)
    .reduce((sum, { fraction, alkalinityMeqL }) => sum + fraction * (alkalinityMeqL - level), 0);
  return brought / DEFAULT_WINDOW_DAYS;
}
