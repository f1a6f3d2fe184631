import { dayOf } from '../../shared/domain/days.ts';
import type { ParameterCode } from '../../shared/domain/units.ts';
import type { Write } from '../db/write.ts';
import { listReadings } from '../queries/readings.ts';
import { calibrate } from '../services/calibration-service.ts';
import { editReading } from '../services/reading-service.ts';
import { addReadingPhoto } from '../services/reading-photos.ts';
import { addKitLot, addUsualMethods, editKitLot } from '../services/test-method-service.ts';
import { FARM } from './scenario/farm.ts';
import { slipPicture } from './slip-picture.ts';
import { type DemoKit, type DemoKits, timeOn, type World } from './world.ts';

const DAY = 86_400_000;

/** Of the usual methods, those that this farm works with, and the box or instrument that it began with. */
const USED: Record<ParameterCode, { method: string; lot: string | null; months: number | null }> = {
  alkalinity: { method: 'Photometer', lot: 'P-0412', months: null },
  calcium: { method: 'Titration', lot: 'CA-25-31', months: 18 },
  magnesium: { method: 'Titration', lot: 'MG-25-08', months: 18 },
  salinity: { method: 'Conductivity meter', lot: 'C-77', months: null },
  temperature: { method: 'Thermometer', lot: null, months: null },
  ph: { method: 'pH meter', lot: 'PR-3', months: null },
  nitrate: { method: 'Photometer', lot: null, months: null },
  phosphate: { method: 'Photometer', lot: null, months: null },
};

/** A new box of calcium reagent reads high; it is found out at its check. */
const CALCIUM_BOX_DAYS = 42;
const CALCIUM_CHECK_DAYS = 41;
/** The photometer is right; what it showed of the standard at each check, dKH. */
const PHOTOMETER_CHECKS: readonly { days: number; found: number[] }[] = [
  { days: 200, found: [8.1, 7.9, 8] },
  { days: 104, found: [8.2, 7.9, 7.9] },
  { days: 12, found: [8, 8, 8] },
];
/** Days before the end whose slips were photographed. */
const PHOTO_DAYS = [71, 55, 38, 27, 19, 11, 6, 4, 2, 1];

/** The farm's methods with what it tests by. */
export function furnishTestKits(write: Write): DemoKits {
  const methods = addUsualMethods(write);
  const kits = Object.entries(USED).map(([parameter, { method, lot, months }]) => {
    const found = methods.find((each) => each.parameter === parameter && each.name === method);
    if (!found) throw new Error(`There is no ${method} for ${parameter}.`);
    const { id: methodId, unit, repeatabilitySd } = found;
    const kitLotId = lot === null ? null : addLot(write, methodId, lot, months);
    return [parameter, { methodId, method, unit, repeatabilitySd, kitLotId, check: null }] as const;
  });
  // The table above names every parameter.
  return Object.fromEntries(kits) as DemoKits;
}

/** Puts the checks of kits on the agenda, as far as the history reaches back. */
export function planTestKits(world: World): void {
  const { calcium, alkalinity } = world.kits;
  put(world, CALCIUM_BOX_DAYS, (write) => {
    if (calcium.kitLotId !== null) editKitLot(write, calcium.kitLotId, 1, { usedUp: true });
    Object.assign(calcium, { kitLotId: addLot(write, calcium.methodId, 'CA-26-14', 18), check: null });
  });
  put(world, CALCIUM_CHECK_DAYS, (write) => {
    calcium.check = check(write, calcium, { solution: 'Seawater standard', value: 430, error: 5 }, [450, 455, 445]);
  });
  for (const { days, found } of PHOTOMETER_CHECKS) {
    put(world, days, (write) => {
      const solution = { solution: 'Alkalinity standard', value: 8, error: 0.1 };
      alkalinity.check = check(write, { ...alkalinity, kitLotId: null }, solution, found);
    });
  }
}

/** Some mornings' slips are photographed and put to their readings, since the phones came. */
export function planSlips(world: World): void {
  const chance = world.chance('slips');
  for (const daysBefore of PHOTO_DAYS) {
    const system = chance.pick(world.systems);
    put(world, daysBefore, (write) => {
      const photoId = addReadingPhoto(write, slipPicture(chance)).id;
      const since = write.now - DAY / 2;
      const { items } = listReadings(write.tx, { systemId: system.id, limit: 8 });
      for (const { id, version, takenAt } of items) {
        if (takenAt >= since) editReading(write, id, version, { photoId });
      }
    });
  }
}

function addLot(write: Write, methodId: string, code: string, months: number | null): string {
  const openedOn = dayOf(write.now, FARM.timeZone);
  const expiresOn = months === null ? null : dayOf(write.now + months * 30.4 * DAY, FARM.timeZone);
  return addKitLot(write, methodId, { code, openedOn, expiresOn }).id;
}

function check(
  write: Write,
  { methodId, kitLotId, unit }: Pick<DemoKit, 'methodId' | 'kitLotId' | 'unit'>,
  { solution, value, error }: { solution: string; value: number; error: number },
  found: number[],
): DemoKit['check'] {
  const fields = { kitLotId, unit, solution, referenceValue: value, referenceError: error, found, note: '' };
  const { id, bias, biasSd } = calibrate(write, methodId, fields);
  return { id, bias, biasSd };
}

function put(world: World, daysBefore: number, act: (write: Write) => void): void {
  const day = world.days[world.days.length - daysBefore];
  if (day !== undefined && day > world.truth.firstDay) {
    world.agenda.put(timeOn(day, 15 * 60), world.staff.grower, act);
  }
}
