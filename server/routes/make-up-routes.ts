import { DONE } from '../../shared/contracts/common.ts';
import { makeUpWaterEndpoints } from '../../shared/contracts/make-up-water.ts';
import type { Api } from '../http/api.ts';
import { makeUpWater } from '../queries/make-up-water.ts';
import { installCartridge, logMakeUpReading, undoInstall, undoMakeUpReading } from '../services/make-up-service.ts';

export function makeUpRoutes(api: Api): void {
  const { clock } = api.deps;
  api.read(makeUpWaterEndpoints.show, (db) => makeUpWater(db, clock.now()));
  api.write(makeUpWaterEndpoints.log, (write, { body }) => logMakeUpReading(write, body));
  api.write(makeUpWaterEndpoints.undoReading, (write, { params }) => {
    undoMakeUpReading(write, params.id);
    return DONE;
  });
  api.write(makeUpWaterEndpoints.install, (write, { body }) => installCartridge(write, body));
  api.write(makeUpWaterEndpoints.undoInstall, (write, { params }) => {
    undoInstall(write, params.id);
    return DONE;
  });
}
