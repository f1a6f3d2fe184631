import { randomUUID } from 'node:crypto';
import type {
  CreateColony,
  CreateLine,
  CreateRack,
  LogCut,
  LoggedCut,
  PlacePlugs,
} from '../../shared/contracts/stock.ts';
import { dayOf } from '../../shared/domain/days.ts';
import { createColony } from '../../server/services/colony-service.ts';
import { createLine } from '../../server/services/line-service.ts';
import { logCut } from '../../server/services/log-cut.ts';
import { placePlugs } from '../../server/services/place-plugs.ts';
import { createRack } from '../../server/services/rack-service.ts';
import { recordLoss } from '../../server/services/remove-plugs.ts';
import { withholdStock } from '../../server/services/withhold-stock.ts';
import { givenSystem, givenTank } from './given-water.ts';
import type { TestClient, TestFarm } from './start-farm.ts';

let made = 0;

/** A branching line with a code of its own: 25 mm at the cut, healed after 8 days, so soon a small frag. @returns its id */
export function givenLine(farm: TestFarm, fields: Partial<CreateLine> = {}): string {
  made += 1;
  const letters = [676, 26, 1].map((power) => String.fromCharCode(65 + (Math.floor(made / power) % 26)));
  return farm.write(
    (write) =>
      createLine(write, {
        code: letters.join(''),
        tradeName: `Line ${made}`,
        taxon: 'Seriatopora hystrix',
        growthForm: 'branching',
        publicText: '',
        careText: '',
        origin: '',
        citesSource: '',
        startMm: null,
        mmPerWeek: null,
        healDays: null,
        ...fields,
      }).id,
  );
}

/** A rack of 8 by 12 positions, in a new grow-out system unless a tank is given. @returns its id */
export function givenRack(farm: TestFarm, fields: Partial<CreateRack> = {}): string {
  made += 1;
  const tankId = fields.tankId ?? givenTank(farm, givenSystem(farm));
  return farm.write((write) => createRack(write, { code: `R${made}`, rows: 8, columns: 12, ...fields, tankId }).id);
}

/** A rack in a new system of this kind. */
export function givenRackIn(farm: TestFarm, kind: 'growout' | 'broodstock' | 'quarantine'): string {
  return givenRack(farm, { tankId: givenTank(farm, givenSystem(farm, { kind })) });
}

/** A rested mother of a new line, on a new rack, unless given. @returns its id */
export function givenColony(farm: TestFarm, fields: Partial<CreateColony> = {}): string {
  made += 1;
  const lineId = fields.lineId ?? givenLine(farm);
  const rackId = fields.rackId ?? givenRack(farm);
  return farm.write(
    (write) =>
      createColony(write, {
        code: `M-${made}`,
        sizeMm: 140,
        health: 'good',
        lastCutOn: null,
        acquiredOn: '2024-01-10',
        acquiredFrom: '',
        ...fields,
        lineId,
        rackId,
      }).id,
  );
}

/** A cut of ten pieces today, placed on a new rack from A-1 on, unless said otherwise. */
export function givenCut(farm: TestFarm, fields: Partial<LogCut> = {}): LoggedCut {
  const colonyId = fields.colonyId ?? givenColony(farm);
  const target = fields.target ?? { kind: 'rack' as const, rackId: givenRack(farm) };
  return farm.write((write) =>
    logCut(write, {
      cutOn: dayOf(write.now, 'Europe/Lisbon'),
      pieces: 10,
      failedPieces: 0,
      minutes: null,
      tool: '',
      plugItemId: null,
      glueItemId: null,
      gluePerPiece: 0,
      note: '',
      ...fields,
      colonyId,
      target,
    }),
  );
}

/** Ten pieces of a line cut long enough ago to be healed and of a grade that is sold. */
export function givenSaleableBatch(farm: TestFarm, fields: Partial<LogCut> = {}): LoggedCut {
  return givenCut(farm, { cutOn: '2025-11-03', ...fields });
}

export function givenPlaced(farm: TestFarm, codes: string[], rackId: string, fields: Partial<PlacePlugs> = {}): string {
  return farm.write((write) => placePlugs(write, { codes, rackId, loose: false, note: '', ...fields }).groupId);
}

export function givenLoss(farm: TestFarm, codes: string[], at?: number): string {
  return farm.write(
    (write) =>
      recordLoss(write, { codes, seen: 'stn', cause: 'unknown', note: '', ...(at === undefined ? {} : { at }) })
        .groupId,
  );
}

/** @returns the withhold's id */
export function givenWithheld(
  farm: TestFarm,
  of: { plugCode: string } | { batchId: string } | { rackId: string } | { systemId: string },
): string {
  return farm.write((write) => withholdStock(write, { ...of, reason: 'Flatworm seen' }).id);
}

/** Posts with a new Idempotency-Key. */
export function postOnce(client: TestClient, path: string, body: object, key: string = randomUUID()) {
  return client.post(path).set('Idempotency-Key', key).send(body);
}
