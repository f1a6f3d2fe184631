import { DONE } from '../../shared/contracts/common.ts';
import { dosingEndpoints } from '../../shared/contracts/dosing.ts';
import type { Api } from '../http/api.ts';
import { listPumps } from '../queries/dosing-pumps.ts';
import { runningRates, systemRates } from '../queries/dosing-rates.ts';
import { changeDosing, resumeDosing, startDosing, stopDosing, undoDosing } from '../services/dosing-service.ts';
import { calibratePump, createPump, editPump, undoCalibration } from '../services/pump-service.ts';

export function dosingRoutes(api: Api): void {
  const { clock } = api.deps;
  api.read(dosingEndpoints.pumps, (db) => ({ items: listPumps(db, clock.now()) }));
  api.write(dosingEndpoints.createPump, (write, { body }) => createPump(write, body));
  api.write(dosingEndpoints.editPump, (write, { params, body, ifMatch }) => editPump(write, params.id, ifMatch, body));
  api.write(dosingEndpoints.calibrate, (write, { params, body }) => calibratePump(write, params.id, body));
  api.write(dosingEndpoints.undoCalibration, (write, { params }) => {
    undoCalibration(write, params.id);
    return DONE;
  });
  api.read(dosingEndpoints.running, (db) => ({ items: runningRates(db, clock.now()) }));
  api.read(dosingEndpoints.ofSystem, (db, { params }) => ({ items: systemRates(db, params.id, clock.now()) }));
  api.write(dosingEndpoints.start, (write, { body }) => startDosing(write, body));
  api.write(dosingEndpoints.change, (write, { params, body }) => changeDosing(write, params.id, body));
  api.write(dosingEndpoints.stop, (write, { params, body }) => stopDosing(write, params.id, body.at));
  api.write(dosingEndpoints.resume, (write, { params }) => resumeDosing(write, params.id));
  api.write(dosingEndpoints.undo, (write, { params }) => {
    undoDosing(write, params.id);
    return DONE;
  });
}
