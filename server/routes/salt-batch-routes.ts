import { DONE } from '../../shared/contracts/common.ts';
import { saltBatchEndpoints } from '../../shared/contracts/salt-batches.ts';
import type { Api } from '../http/api.ts';
import { listSaltBatches } from '../queries/salt-batches.ts';
import { editSaltBatch, mixSaltBatch, undoSaltBatch } from '../services/salt-batch-service.ts';

export function saltBatchRoutes(api: Api): void {
  const { clock } = api.deps;
  api.read(saltBatchEndpoints.list, (db) => ({ items: listSaltBatches(db, clock.now()) }));
  api.write(saltBatchEndpoints.mix, (write, { body }) => mixSaltBatch(write, body));
  api.write(saltBatchEndpoints.edit, (write, { params, body, ifMatch }) =>
    editSaltBatch(write, params.id, ifMatch, body),
  );
  api.write(saltBatchEndpoints.undo, (write, { params }) => {
    undoSaltBatch(write, params.id);
    return DONE;
  });
}
