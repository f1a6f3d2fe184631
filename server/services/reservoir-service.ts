import type {
  CheckStrength,
  CleanReservoir,
  LogLevel,
  MarkSpent,
  RemoveSludge,
  TopUp,
} from '../../shared/contracts/reservoir-acts.ts';
import type { ReservoirChange, ReservoirEvent } from '../../shared/contracts/reservoirs.ts';
import { strengthAfterRefill } from '../../shared/domain/reservoir-state.ts';
import { strengthByConductivity, vinegarMlPerL, VINEGAR_THAT_SPOILS } from '../../shared/domain/reservoir-strength.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Write } from '../db/write.ts';
import { farmOf } from '../queries/farm.ts';
import { limewaterHabits } from '../queries/limewater-habits.ts';
import { recentEvents } from '../queries/reservoir-use.ts';
import { reservoirRow, showReservoir } from '../queries/reservoirs.ts';
import { actTime } from './act-time.ts';
import { changeLimewaterHabits } from './limewater-habits-service.ts';
import { addEvent, assertFits } from './reservoir-events.ts';

export function logLevel(write: Write, reservoirId: string, { at, levelL, note }: LogLevel): ReservoirEvent {
  const reservoir = reservoirRow(write.tx, reservoirId);
  assertFits(reservoir, levelL, 'levelL');
  const { alkalinityMeqL } = reservoir;
  return addEvent(write, reservoir, { kind: 'level', at: actTime(write, at), levelL, alkalinityMeqL, note });
}

/** Plain water joins what stands in it: it dilutes. */
export function topUp(write: Write, reservoirId: string, input: TopUp): ReservoirChange {
  const reservoir = reservoirRow(write.tx, reservoirId);
  const { waterL, note } = input;
  const levelBeforeL = input.levelBeforeL ?? reservoir.levelL;
  assertFits(reservoir, levelBeforeL, 'levelBeforeL');
  assertFits(reservoir, levelBeforeL + waterL, 'waterL');
  const before = { levelL: levelBeforeL, alkalinityMeqL: reservoir.alkalinityMeqL };
  const event = addEvent(write, reservoir, {
    ...{ kind: 'topped_up', at: actTime(write, input.at), note, levelBeforeL, levelL: levelBeforeL + waterL, waterL },
    alkalinityMeqL: strengthAfterRefill(before, { waterL, alkalinityMeqL: 0 }),
  });
  return { reservoir: showReservoir(write.tx, reservoirId, write.now), event };
}

/**
 * Takes the strength that a conductivity reading finds as what stands in it from now on. Where vinegar is in the mix the
 * reading says too little: it is kept, but the strength stays.
 */
export function checkStrength(write: Write, reservoirId: string, input: CheckStrength): ReservoirChange {
  const reservoir = reservoirRow(write.tx, reservoirId);
  const { conductivityMsCm, note } = input;
  const levelL = input.levelL ?? reservoir.levelL;
  assertFits(reservoir, levelL, 'levelL');
  if (levelL === 0) throw new DomainError('rule.refused', `${reservoir.code} is empty. There is nothing to check.`);
  const freshMsCm = freshReading(write, input.freshMsCm);
  const found = holdsVinegar(write, reservoirId) ? null : strengthFound(conductivityMsCm, freshMsCm);
  const expected = reservoir.alkalinityMeqL;
  const event = addEvent(write, reservoir, {
    ...{ kind: 'strength', at: actTime(write, input.at), note, levelBeforeL: levelL, levelL },
    ...{ conductivityMsCm, freshMsCm, alkalinityMeqL: found ?? expected },
    strengthLeft: found === null || expected === 0 ? null : found / expected,
  });
  return { reservoir: showReservoir(write.tx, reservoirId, write.now), event };
}

/** Takes out the sediment, and with it the litres that went along. */
export function removeSludge(write: Write, reservoirId: string, input: RemoveSludge): ReservoirChange {
  const reservoir = reservoirRow(write.tx, reservoirId);
  const { levelL, note } = input;
  const levelBeforeL = input.levelBeforeL ?? reservoir.levelL;
  assertFits(reservoir, levelBeforeL, 'levelBeforeL');
  if (levelL > levelBeforeL) {
    const message = 'Taking sludge out can not raise the level. Enter what is left in it.';
    throw new DomainError('input.invalid', message, { fields: [{ path: 'levelL', message }] });
  }
  const { alkalinityMeqL } = reservoir;
  const at = actTime(write, input.at);
  const event = addEvent(write, reservoir, { kind: 'sludge_removed', at, note, levelBeforeL, levelL, alkalinityMeqL });
  return { reservoir: showReservoir(write.tx, reservoirId, write.now), event };
}

/** Takes a reservoir off with nothing in its place. */
export function markSpent(write: Write, reservoirId: string, input: MarkSpent): ReservoirChange {
  const reservoir = reservoirRow(write.tx, reservoirId);
  if (reservoir.state === 'spent') throw new DomainError('rule.refused', `${reservoir.code} is spent already.`);
  const levelL = input.levelL ?? reservoir.levelL;
  assertFits(reservoir, levelL, 'levelL');
  const { alkalinityMeqL } = reservoir;
  const at = actTime(write, input.at);
  const event = addEvent(write, reservoir, { kind: 'spent', at, note: input.note, levelL, alkalinityMeqL });
  return { reservoir: showReservoir(write.tx, reservoirId, write.now), event };
}

/** Empties it, scrapes it out: it stands by, empty, and its sludge is gone. */
export function cleanReservoir(write: Write, reservoirId: string, input: CleanReservoir): ReservoirChange {
  const reservoir = reservoirRow(write.tx, reservoirId);
  if (reservoir.state === 'online') {
    throw new DomainError('rule.refused', `${reservoir.code} is online. Put another online, or mark it spent first.`);
  }
  const levelBeforeL = input.levelBeforeL ?? reservoir.levelL;
  assertFits(reservoir, levelBeforeL, 'levelBeforeL');
  const event = addEvent(write, reservoir, {
    ...{ kind: 'cleaned', at: actTime(write, input.at), note: input.note, levelBeforeL, levelL: 0, alkalinityMeqL: 0 },
  });
  return { reservoir: showReservoir(write.tx, reservoirId, write.now), event };
}

/** The farm's own reading of fresh limewater: the one that is given, which is kept, or the one that was kept. */
function freshReading(write: Write, given: number | undefined): number {
  const { freshMsCm } = limewaterHabits(farmOf(write.tx));
  if (given !== undefined && given !== freshMsCm) changeLimewaterHabits(write, { freshMsCm: given });
  const fresh = given ?? freshMsCm;
  if (fresh !== null) return fresh;
  const message = 'Enter your own reading of fresh saturated limewater: strength is told from the ratio of the two.';
  throw new DomainError('input.invalid', message, { fields: [{ path: 'freshMsCm', message }] });
}

function strengthFound(conductivityMsCm: number, freshMsCm: number): number {
  try {
    return strengthByConductivity(conductivityMsCm, freshMsCm);
  } catch (error) {
    if (!(error instanceof DomainError)) throw error;
    const message = 'This is far above your fresh reading. Check the probe, or take the fresh reading again.';
    throw new DomainError('input.invalid', message, { fields: [{ path: 'conductivityMsCm', message }] });
  }
}

/** Whether enough vinegar is in what stands in it to spoil the reading. */
function holdsVinegar(write: Write, reservoirId: string): boolean {
  return vinegarMlPerL(recentEvents(write.tx, reservoirId, write.now)) > VINEGAR_THAT_SPOILS;
}
