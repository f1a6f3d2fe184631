import type { KnownValues } from './sample-request.ts';
import { installCartridge, logMakeUpReading } from '../../../server/services/make-up-service.ts';
import { stopDosing } from '../../../server/services/dosing-service.ts';
import { mixSaltBatch } from '../../../server/services/salt-batch-service.ts';
import { makeSolution } from '../../../server/services/stock-solution-service.ts';
import { setWaterChangePlan } from '../../../server/services/water-change-plan-service.ts';
import {
  givenCalibration,
  givenDosing,
  givenPowder,
  givenPump,
  givenSolution,
  givenSupplement,
} from '../given-dosing.ts';
import type { TestFarm } from '../start-farm.ts';

/** A recipe with a batch, a pump, doses that run and that were stopped, new water and the unit that makes it pure. */
export function givenDosingWork(farm: TestFarm, systemId: string): Record<string, KnownValues> {
  const powderId = givenPowder(farm);
  const solution = givenSolution(farm, powderId);
  const pumpId = givenPump(farm);
  const [running, ended] = [givenSupplement(farm), givenSupplement(farm)];
  const rateId = givenDosing(farm, systemId, running, { pumpId });
  const endedId = givenDosing(farm, systemId, ended);
  const calibrationId = givenCalibration(farm, pumpId, [9.8]).calibrations[0]?.id;
  const records = farm.write((write) => {
    stopDosing(write, endedId, undefined);
    setWaterChangePlan(write, systemId, { everyDays: 14, fraction: 0.06 });
    return {
      batchId: makeSolution(write, solution.id, { litres: 1 }).batches[0]?.id,
      saltBatchId: mixSaltBatch(write, { litres: 100, saltG: 0, readyHours: 12, note: '' }).id,
      readingId: logMakeUpReading(write, { tdsOut: 0, note: '' }).id,
      cartridgeId: installCartridge(write, { stage: 'resin', name: 'Resin', note: '' }).id,
    };
  });
  return {
    '/api/stock-solutions': { id: solution.id, itemId: powderId, code: 'REC-9', powder: 'sodium_carbonate' },
    '/api/solution-batches': { id: records.batchId },
    '/api/dosing-pumps': { id: pumpId, measuredMl: [9.5] },
    '/api/pump-calibrations': { id: calibrationId },
    '/api/dosing-rates': { id: rateId, itemId: ended, pumpId },
    '/api/dosing-rates/:id/resume': { id: endedId },
    '/api/salt-batches': { id: records.saltBatchId, saltG: 0 },
    '/api/make-up-water/readings': { id: records.readingId, tdsOut: 0 },
    '/api/make-up-water/cartridges': { id: records.cartridgeId, installedOn: '2026-03-01', stage: 'carbon' },
  };
}
