import { storeEndpoints } from '../../shared/contracts/stores.ts';
import type { Api } from '../http/api.ts';
import { listStores, showStore } from '../queries/stores.ts';
import { createStore, editStore } from '../services/store-service.ts';

/** Shops that buy from the farm. */
export function storeRoutes(api: Api): void {
  api.read(storeEndpoints.list, (db, { query }) => listStores(db, query));
  api.read(storeEndpoints.show, (db, { params }) => showStore(db, params.id));
  api.write(storeEndpoints.create, (write, { body }) => createStore(write, body));
  api.write(storeEndpoints.edit, (write, { params, body, ifMatch }) => editStore(write, params.id, ifMatch, body));
}
