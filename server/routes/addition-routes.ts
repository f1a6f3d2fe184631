import { additionEndpoints } from '../../shared/contracts/additions.ts';
import { DONE } from '../../shared/contracts/common.ts';
import type { Api } from '../http/api.ts';
import { listAdditions } from '../queries/additions.ts';
import { logDose, undoDose } from '../services/dose-service.ts';
import { logWaterChange, undoWaterChange } from '../services/water-change-service.ts';

export function additionRoutes(api: Api): void {
  api.read(additionEndpoints.list, (db, { params }) => ({ items: listAdditions(db, params.id) }));
  api.write(additionEndpoints.logWaterChange, (write, { body }) => logWaterChange(write, body));
  api.write(additionEndpoints.undoWaterChange, (write, { params }) => {
    undoWaterChange(write, params.id);
    return DONE;
  });
  api.write(additionEndpoints.logDose, (write, { body }) => logDose(write, body));
  api.write(additionEndpoints.undoDose, (write, { params }) => {
    undoDose(write, params.id);
    return DONE;
  });
}
