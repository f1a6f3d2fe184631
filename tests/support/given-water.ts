import type { LogReadings } from '../../shared/contracts/readings.ts';
import type { RefillReservoir } from '../../shared/contracts/reservoir-acts.ts';
import type { CreateReservoir } from '../../shared/contracts/reservoir-set-up.ts';
import type { CreateSystem } from '../../shared/contracts/systems.ts';
import type { ParameterCode } from '../../shared/domain/units.ts';
import { logReadings } from '../../server/services/reading-service.ts';
import { refillReservoir } from '../../server/services/refill-service.ts';
import { changeOver } from '../../server/services/reservoir-changeover.ts';
import { logLevel } from '../../server/services/reservoir-service.ts';
import { createReservoir } from '../../server/services/reservoir-set-up.ts';
import { createSystem, createTank } from '../../server/services/system-service.ts';
import type { TestFarm } from './start-farm.ts';

let made = 0;

/** A grow-out system of 1,000 L unless said otherwise. @returns its id */
export function givenSystem(farm: TestFarm, fields: Partial<CreateSystem> = {}): string {
  made += 1;
  return farm.write(
    (write) =>
      createSystem(write, {
        ...{ code: `S-${made}`, name: `System ${made}`, kind: 'growout', netVolumeL: 1000, note: '', bands: [] },
        ...fields,
      }).id,
  );
}

/** @returns the id of a tank of the system */
export function givenTank(farm: TestFarm, systemId: string): string {
  made += 1;
  return farm.write((write) => createTank(write, { systemId, code: `T-${made}`, name: `Tank ${made}` }).id);
}

/** One alkalinity reading in dKH unless said otherwise. @returns its id */
export function givenReading(
  farm: TestFarm,
  systemId: string,
  value: number,
  fields: { parameter?: ParameterCode; unit?: string } & Partial<Omit<LogReadings, 'systemId' | 'values'>> = {},
): string {
  const { parameter = 'alkalinity', unit = 'dKH', ...rest } = fields;
  const values = [{ parameter, value, unit, confirmed: true }];
  const logged = farm.write((write) => logReadings(write, { systemId, values, method: '', note: '', ...rest }));
  return logged[0]?.id ?? '';
}

/** An empty reservoir of 60 L unless said otherwise. @returns its id */
export function givenReservoir(farm: TestFarm, systemId: string, fields: Partial<CreateReservoir> = {}): string {
  made += 1;
  return farm.write((write) => createReservoir(write, { code: `LW-${made}`, systemId, volumeL: 60, ...fields }).id);
}

/** A mix of 50 L without lime or vinegar unless said otherwise, so that no supplies are needed. */
export function givenRefill(farm: TestFarm, reservoirId: string, fields: Partial<RefillReservoir> = {}) {
  return farm.write((write) =>
    refillReservoir(write, reservoirId, { waterL: 50, limeG: 0, vinegarMl: 0, temperatureC: 25, note: '', ...fields }),
  );
}

export function givenChangeOver(farm: TestFarm, reservoirId: string, at?: number, formerLevelL?: number): void {
  farm.write((write) =>
    changeOver(write, reservoirId, {
      note: '',
      ...(at === undefined ? {} : { at }),
      ...(formerLevelL === undefined ? {} : { formerLevelL }),
    }),
  );
}

export function givenLevel(farm: TestFarm, reservoirId: string, levelL: number, at?: number): void {
  farm.write((write) => logLevel(write, reservoirId, { levelL, note: '', ...(at === undefined ? {} : { at }) }));
}
