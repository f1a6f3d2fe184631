import type { AskOverfill, SystemOverfill } from '../../shared/contracts/overfills.ts';
import type { Reservoir } from '../../shared/contracts/reservoirs.ts';
import { MS_PER_DAY } from '../../shared/domain/days.ts';
import { USUAL_ROOM_PCO2_UATM } from '../../shared/domain/dose-effect.ts';
import { strengthOfVinegar, USUAL_ACID_PERCENT } from '../../shared/domain/limewater.ts';
import { largestOverfill, litresRunIn, overfill, type OverfillLimits } from '../../shared/domain/overfill.ts';
import { vinegarMlPerL } from '../../shared/domain/reservoir-strength.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { farmOf } from './farm.ts';
import { overfillsSince } from './overfills.ts';
import { recentEvents } from './reservoir-use.ts';
import { listReservoirs } from './reservoirs.ts';
import { systemWater } from './system-water.ts';
import { systemRow } from './systems.ts';
import { waterRules } from './water-rules.ts';

const RECENT_DAYS = 30;

/**
 * What happens if the top-off control of a system sticks: all that may be drawn from what is online (or stands ready)
 * runs in at once, or what a pump moves until somebody sees it.
 */
export function overfillOf(db: Db, systemId: string, now: number, ask: AskOverfill = {}): SystemOverfill {
  const { code, netVolumeL } = systemRow(db, systemId);
  const { parts } = systemWater(db, systemId, now);
  const { phLimit, omegaLimit, mostChangePerDayMeqL } = waterRules(farmOf(db));
  const limits = { ph: phLimit, omegaAragonite: omegaLimit, changeMeqL: mostChangePerDayMeqL };
  const reservoir = reservoirFor(db, systemId, now, ask.reservoirId);
  return {
    ...{ systemId, systemCode: code, netVolumeL, limits, roomPco2Uatm: USUAL_ROOM_PCO2_UATM },
    water: parts.map(({ parameter, value, takenAt }) => ({ parameter, value, takenAt })),
    recent: overfillsSince(db, systemId, now - RECENT_DAYS * MS_PER_DAY),
    ...(reservoir ? whatRunsIn(db, systemId, now, { reservoir, ask, limits }) : NOTHING),
  };
}

const NOTHING = { reservoir: null, litres: 0, effect: null, broken: [], largest: null };

function reservoirFor(db: Db, systemId: string, now: number, chosenId: string | undefined): Reservoir | undefined {
  const held = listReservoirs(db, now, systemId);
  if (chosenId !== undefined) {
    const chosen = held.find(({ id }) => id === chosenId);
    if (!chosen) throw new DomainError('record.not_found', 'This reservoir does not feed the system. Choose another.');
    return chosen;
  }
  const standing = held.filter(({ levelL }) => levelL > 0).sort((a, b) => b.levelL - a.levelL);
  return held.find(({ state }) => state === 'online') ?? standing[0];
}

function whatRunsIn(
  db: Db,
  systemId: string,
  now: number,
  { reservoir, ask, limits }: { reservoir: Reservoir; ask: AskOverfill; limits: OverfillLimits },
): Pick<SystemOverfill, 'reservoir' | 'litres' | 'effect' | 'broken' | 'largest'> {
  const { id, code, levelL, usableL, volumeL, alkalinityMeqL, pumpLPerH } = reservoir;
  const acetateMeqL = acetateIn(db, id, now);
  const litresPerHour = ask.litresPerHour ?? pumpLPerH;
  const run = ask.hours !== undefined && litresPerHour !== null ? { litresPerHour, hours: ask.hours } : undefined;
  const litres = litresRunIn(usableL, run);
  const risk = {
    ...{ water: systemWater(db, systemId, now).water, systemVolumeL: systemRow(db, systemId).netVolumeL },
    ...{ strengthMeqL: alkalinityMeqL, acetateMeqL: Math.min(acetateMeqL, alkalinityMeqL) },
  };
  const facts = { id, code, isOnline: reservoir.state === 'online', levelL, usableL, volumeL };
  const shown = { ...facts, alkalinityMeqL, acetateMeqL: risk.acetateMeqL, pumpLPerH };
  try {
    const { effect, broken } = overfill(risk, litres, limits);
    return { reservoir: shown, litres, effect, broken, largest: largestOverfill(risk, volumeL, limits) };
  } catch (error) {
    // The tests can't all be true of one water; the page says so and asks to test again.
    if (!(error instanceof DomainError) || error.code !== 'domain.out_of_range') throw error;
    return { reservoir: shown, litres, effect: null, broken: [], largest: null };
  }
}

/** Acetate in what stands in a reservoir, meq/L: each acid makes one. */
function acetateIn(db: Db, reservoirId: string, now: number): number {
  return vinegarMlPerL(recentEvents(db, reservoirId, now)) * strengthOfVinegar(USUAL_ACID_PERCENT).acidMolPerMl * 1000;
}
