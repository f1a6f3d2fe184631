import { DONE } from '../../shared/contracts/common.ts';
import { testMethodEndpoints } from '../../shared/contracts/test-methods.ts';
import type { Api } from '../http/api.ts';
import { listTestMethods } from '../queries/test-methods.ts';
import { calibrate, removeCalibration } from '../services/calibration-service.ts';
import {
  addKitLot,
  addUsualMethods,
  createTestMethod,
  editKitLot,
  editTestMethod,
} from '../services/test-method-service.ts';

export function testMethodRoutes(api: Api): void {
  api.read(testMethodEndpoints.list, (db) => ({ items: listTestMethods(db) }));
  api.write(testMethodEndpoints.create, (write, { body }) => createTestMethod(write, body));
  api.write(testMethodEndpoints.addUsual, (write) => ({ items: addUsualMethods(write) }));
  api.write(testMethodEndpoints.edit, (write, { params, body, ifMatch }) =>
    editTestMethod(write, params.id, ifMatch, body),
  );
  api.write(testMethodEndpoints.addLot, (write, { params, body }) => addKitLot(write, params.id, body));
  api.write(testMethodEndpoints.editLot, (write, { params, body, ifMatch }) =>
    editKitLot(write, params.id, ifMatch, body),
  );
  api.write(testMethodEndpoints.calibrate, (write, { params, body }) => calibrate(write, params.id, body));
  api.write(testMethodEndpoints.removeCalibration, (write, { params }) => {
    removeCalibration(write, params.id);
    return DONE;
  });
}
