import type { Endpoint } from '../../../shared/contracts/endpoint.ts';
import { calibrate } from '../../../server/services/calibration-service.ts';
import { addReadingPhoto } from '../../../server/services/reading-photos.ts';
import { logReadings } from '../../../server/services/reading-service.ts';
import { addKitLot, addUsualMethods } from '../../../server/services/test-method-service.ts';
import { startImport } from '../../../server/services/reading-import/import-service.ts';
import { createSupplier } from '../../../server/services/supply-items.ts';
import { fakePayments } from '../given-orders.ts';
import { givenColony } from '../given-stock.ts';
import { givenItem, givenLot } from '../given-supplies.ts';
import { startFarm, TEST_PASSWORD, type TestFarm } from '../start-farm.ts';
import type { KnownValues } from './sample-request.ts';
import { givenDosingWork } from './worked-dosing.ts';
import { givenPeople, givenSales, givenStock, givenWater } from './worked-records.ts';
import { givenLabelWork } from './worked-labels.ts';
import { givenPlans } from './worked-plans.ts';
import { givenTasksAndAlerts } from './worked-tasks.ts';

export const READINGS_FILE = 'Day,Alkalinity\n2026-02-10,8.1\n2026-02-11,8.3\n';
const NEW_PASSWORD = 'seven slow boats at dusk';

export interface WorkedFarm {
  farm: TestFarm;
  /** Real values for path parts and fields by name, wherever they stand. */
  known: KnownValues;
  /** The same for one endpoint: these come first, and go into optional fields too. */
  knownAt(endpoint: Endpoint): KnownValues;
}

/** A farm in which every kind of record stands once at least, so that each endpoint has something to work on. */
export async function workedFarm(): Promise<WorkedFarm> {
  const farm = await startFarm({ payments: fakePayments() });
  const sales = await givenSales(farm);
  const water = givenWater(farm);
  const stock = givenStock(farm);
  const people = await givenPeople(farm);
  const supplies = givenSupplies(farm);
  const work = givenTasksAndAlerts(farm);
  const imports = givenImport(farm, water.systemId);
  const tested = givenTested(farm, water.systemId);
  const { systemId } = water;
  const [code] = stock.codes;
  const { lineId, colonyId, listingId } = sales;

  const known: KnownValues = {
    ...{ lineId, colonyId, listingId, systemId, tankId: water.tankId, itemId: supplies.limeId, code: 'NEW-1' },
    ...{ batchId: stock.batchId, rackId: stock.rackId, codes: [code], groupId: stock.groupId },
    eventId: water.mixEventId,
  };
  /** By the start of the path; where several fit, the longest counts for its names. */
  const byPath: Record<string, KnownValues> = {
    '/api/labels/takings': { itemId: supplies.labelId },
    '/api/labels': { codes: code },
    ...givenLabelWork(farm, stock.batchId),
    '/api/public/plugs': { code },
    '/api/plugs': { code },
    '/api/session': { email: 'grower@example.com', password: TEST_PASSWORD },
    '/api/password-resets/use': { token: people.resetToken, password: NEW_PASSWORD },
    '/api/invitations/:id': { id: people.invitationId },
    '/api/invitations/:token': { token: people.invitationToken },
    '/api/invitations/accept': { token: people.invitationToken, password: NEW_PASSWORD },
    '/api/account/password': { current: TEST_PASSWORD, password: NEW_PASSWORD },
    '/api/lines': { code: 'QQQ', id: lineId },
    '/api/colonies': { id: givenColony(farm) },
    '/api/racks': { id: stock.rackId },
    '/api/cuts': { colonyId: givenColony(farm), target: { kind: 'bench' }, id: stock.untouchedCutId },
    '/api/batches': { id: stock.batchId },
    '/api/stock/withholds': { rackId: stock.rackId, id: stock.withheldId },
    '/api/stock/measurements': { batchId: stock.batchId, id: stock.measurementId },
    '/api/supplies/items': { kind: 'salt', id: supplies.saltId },
    '/api/supplies/suppliers': { id: supplies.supplierId },
    '/api/supplies/receipts': { id: supplies.lotId },
    '/api/costs/batches': { id: stock.batchId },
    '/api/stores': { id: farm.storeIds[0] },
    '/api/listings': { grade: 'colony', id: listingId },
    '/api/orders/:id': { id: sales.shipped.id },
    '/api/orders/:id/cancel': { id: sales.paid.id },
    '/api/orders/:id/pick': { id: sales.picking.id, pickId: sales.pickId, code: sales.codes[0] },
    '/api/orders/:id/pack': { id: sales.picked.id },
    '/api/orders/:id/packing-list': { id: sales.packed.id },
    '/api/orders/:id/ship': { id: sales.packed.id },
    '/api/shop/orders': { priceMinor: 1800 },
    '/api/shop/orders/:id': { id: sales.placed.id },
    '/api/shop/orders/:id/invoice': { id: sales.shipped.id },
    '/api/people': { id: people.viewerId },
    '/api/setup': { timeZone: 'Europe/Lisbon', currency: 'EUR' },
    '/api/farm': { timeZone: 'Europe/Lisbon', currency: 'EUR' },
    '/api/water-changes': { id: water.changeId, alkalinityMeqL: 3 },
    '/api/doses': { itemId: water.supplementId, id: water.doseId },
    '/api/systems': { id: systemId },
    '/api/reservoirs': { id: water.emptyId, limeG: 0 },
    '/api/reservoirs/:id/changeovers': { id: water.standbyId },
    '/api/reservoirs/:id/undo': { id: water.standbyId },
    '/api/reservoirs/:id/strength-checks': { id: water.standbyId, conductivityMsCm: 9, freshMsCm: 10 },
    '/api/reservoirs/:id/sludge-removals': { id: water.standbyId, levelBeforeL: 50, levelL: 49 },
    '/api/tasks': { id: work.taskId, dueOn: work.dueOn, startsOn: '2026-03-02' },
    '/api/task-outcomes': { id: work.outcomeId },
    '/api/alerts': { id: work.alertId },
    '/api/calendar': { token: work.calendarToken },
    '/api/readings': { value: 8, unit: 'dKH', id: water.readingId, takenAt: farm.deps.clock.now() - 60_000 },
    '/api/test-methods': { id: tested.methodId, parameter: 'alkalinity', unit: 'dKH', found: [8], referenceValue: 8 },
    '/api/kit-lots': { id: tested.kitLotId },
    '/api/calibrations': { id: tested.calibrationId },
    '/api/reading-photos': { id: tested.photoId },
    ...givenDosingWork(farm, systemId),
    // Last: supplies that come later would make another advice of it.
    ...givenPlans(farm),
    '/api/reading-imports': { mapping: imports.mapping, id: imports.importId },
  };
  return {
    farm,
    known,
    knownAt: ({ path }) => {
      const fitting = Object.keys(byPath).filter((start) => path.startsWith(start));
      fitting.sort((a, b) => a.length - b.length);
      return Object.fromEntries(fitting.flatMap((start) => Object.entries(byPath[start] ?? {})));
    },
  };
}

function givenSupplies(farm: TestFarm) {
  const limeId = givenItem(farm);
  const saltId = givenItem(farm, { kind: 'salt', strength: null });
  const labelId = givenItem(farm, { kind: 'label', unit: 'piece', strength: null });
  givenLot(farm, labelId);
  const supplier = { name: 'Harbour Supplies', email: '' };
  return {
    ...{ limeId, saltId, labelId, lotId: givenLot(farm, limeId) },
    supplierId: farm.write((write) => createSupplier(write, supplier)),
  };
}

/** A method with a kit lot and a check, and a photo of a slip that readings stand on. */
function givenTested(farm: TestFarm, systemId: string) {
  return farm.write((write) => {
    const [method] = addUsualMethods(write);
    const methodId = method?.id ?? '';
    const kitLotId = addKitLot(write, methodId, { code: 'L-1', openedOn: null, expiresOn: null }).id;
    const solution = { kitLotId, unit: 'dKH', solution: '', referenceValue: 8, referenceError: 0.1, note: '' };
    const photoId = addReadingPhoto(write, Buffer.from('89504e470d0a1a0a', 'hex')).id;
    const values = [{ parameter: 'alkalinity' as const, value: 8.1, unit: 'dKH', methodId, kitLotId }];
    logReadings(write, { systemId, values, method: '', note: '', takenAt: write.now - 3_600_000, photoId });
    return { methodId, kitLotId, photoId, calibrationId: calibrate(write, methodId, { ...solution, found: [8.1] }).id };
  });
}

function givenImport(farm: TestFarm, systemId: string) {
  const columns = [
    { role: 'day' as const, unit: '' },
    { role: 'alkalinity' as const, unit: 'dKH' },
  ];
  const mapping = { columns, dateOrder: 'ymd' as const, timeZone: '', decimalMark: 'point' as const, systemId };
  const file = { fileName: 'log.csv', content: Buffer.from('Day,Alkalinity\n2026-01-10,8.1\n') };
  return {
    mapping: JSON.stringify(mapping),
    importId: farm.write((write) => startImport(write, file, mapping)).id,
  };
}
