import type { BandState, LatestValue, SystemGlance } from '../../shared/contracts/water.ts';
import type { TargetBand } from '../../shared/contracts/systems.ts';
import type { Db } from '../db/client.ts';
import { currentDemand } from './demand.ts';
import { latestReadings } from './readings.ts';
import { listReservoirs } from './reservoirs.ts';
import { piecesIn } from './standing-pieces.ts';
import { bandsOf, systemFacts, systemRow, type SystemRow } from './systems.ts';

export function systemGlance(db: Db, systemId: string, now: number): SystemGlance {
  return glanceOf(db, systemRow(db, systemId), now);
}

export function glanceOf(db: Db, row: SystemRow, now: number): SystemGlance {
  const held = listReservoirs(db, now, row.id);
  return {
    system: systemFacts(row),
    latest: latestValues(db, row.id),
    ...currentDemand(db, row, now),
    online: held.find(({ state }) => state === 'online') ?? null,
    standby: held.filter(({ state }) => state === 'standby').length,
    plugs: piecesIn(db, row.id),
  };
}

function latestValues(db: Db, systemId: string): LatestValue[] {
  const bands = bandsOf(db, systemId);
  return latestReadings(db, systemId).map(({ parameter, value, takenAt, method }) => {
    const band = bands.find((each) => each.parameter === parameter) ?? null;
    return { parameter, value, takenAt, method, band, state: bandStateOf(value, band) };
  });
}

function bandStateOf(value: number, band: TargetBand | null): BandState {
  if (!band) return 'none';
  if (value < band.low) return 'below';
  return value > band.high ? 'above' : 'in';
}
