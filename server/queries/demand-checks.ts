import type { DemandCheck } from '../../shared/contracts/demand.ts';
import { MS_PER_DAY } from '../../shared/domain/days.ts';
import { demandChecks, type CheckFacts, type SalinityMove } from '../../shared/domain/demand-checks.ts';
import type { Estimate } from '../../shared/domain/demand/track-demand.ts';
import { doseEffect } from '../../shared/domain/dose-effect.ts';
import { steadiness } from '../../shared/domain/steady-test.ts';
import type { ParameterCode } from '../../shared/domain/units.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { CHANGE_DAYS, changeIn } from './demand-change.ts';
import { knownDemand } from './demand-state.ts';
import { demandNow, type SystemTrack } from './demand-track.ts';
import { readingsWithError } from './reading-errors.ts';
import type { SystemRow } from './systems.ts';

/** Nitrate is tested weekly and moves slowly. */
const NITRATE_DAYS = 56;
const STEPS_DAYS = 28;
const Z_975 = 1.96;

/** What the chemistry says beside the alkalinity demand of a system. */
export function checksOf(db: Db, system: SystemRow, found: SystemTrack): DemandCheck[] {
  const { now } = found;
  const ph = meanLately(db, system.id, 'ph', now);
  const facts: CheckFacts = {
    alkalinity: demandNow(found),
    calcium: knownDemand(db, system, now, 'calcium').estimate,
    nitrateRise: nitrateRise(db, system.id, now),
    change: changeIn(db, system, found),
    ...{ ph, saturation: saturationOf(db, system.id, found, ph) },
    salinity: salinityMove(found),
    steps: stepsLately(found),
  };
  return demandChecks(facts);
}

function meanLately(db: Db, systemId: string, parameter: ParameterCode, now: number): number | null {
  const values = readingsWithError(db, systemId, parameter, now - CHANGE_DAYS * MS_PER_DAY, now);
  return values.length === 0 ? null : values.reduce((sum, { value }) => sum + value, 0) / values.length;
}

/** Saturation of aragonite by the latest tests; null where one is missing, or where they cannot be of one seawater. */
function saturationOf(db: Db, systemId: string, { supply, now }: SystemTrack, ph: number | null): number | null {
  const alkalinity = supply.tests.at(-1)?.value;
  const [calcium, salinity, temperature] = (['calcium', 'salinity', 'temperature'] as const).map((parameter) =>
    meanLately(db, systemId, parameter, now),
  );
  if (ph === null || alkalinity === undefined || calcium == null || salinity == null || temperature == null)
    return null;
  const water = { salinity, temperatureC: temperature, alkalinityMeqL: alkalinity, calciumMgL: calcium, phNbs: ph };
  try {
    return doseEffect(water, { alkalinityMeqL: 0, calciumMgL: 0 }).before.omegaAragonite;
  } catch (error) {
    if (error instanceof DomainError) return null;
    throw error;
  }
}

function nitrateRise(db: Db, systemId: string, now: number): Estimate | null {
  const tests = readingsWithError(db, systemId, 'nitrate', now - NITRATE_DAYS * MS_PER_DAY, now);
  const trend = steadiness(tests, now, { windowDays: NITRATE_DAYS, tolerance: 1 });
  return trend.enough ? { value: trend.slopePerDay, sd: (trend.high - trend.low) / 2 / Z_975 } : null;
}

function salinityMove({ supply, now }: SystemTrack): SalinityMove | null {
  const [before, latest] = [supply.salinityAt(now - CHANGE_DAYS * MS_PER_DAY), supply.salinityAt(now)];
  const level = supply.tests.at(-1)?.value;
  return before && latest && level !== undefined ? { before, now: latest, level } : null;
}

function stepsLately({ track, now }: SystemTrack): CheckFacts['steps'] {
  return track.points.flatMap(({ at, stepped, reading, expected }) =>
    stepped && reading && expected && at >= now - STEPS_DAYS * MS_PER_DAY
      ? [{ at, by: reading.value - expected.value }]
      : [],
  );
}
