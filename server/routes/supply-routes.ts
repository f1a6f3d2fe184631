import { DONE } from '../../shared/contracts/common.ts';
import { supplierEndpoints } from '../../shared/contracts/suppliers.ts';
import { supplyEndpoints } from '../../shared/contracts/supplies.ts';
import type { Api } from '../http/api.ts';
import { listItems, supplyItem } from '../queries/supply-items.ts';
import { countById, listLots, listUses, lotById } from '../queries/supply-lots.ts';
import { listSuppliers, supplierById } from '../queries/suppliers.ts';
import { createItem, createSupplier, editItem, editSupplier } from '../services/supply-items.ts';
import { countItem, receive, undoReceipt } from '../services/supply-lots.ts';
import { supplyCsv } from './supply-csv.ts';

/** Supplies: what the farm uses up, its lots, and who delivers it. */
export function supplyRoutes(api: Api): void {
  const now = () => api.deps.clock.now();

  api.read(supplyEndpoints.items, (db, { query }) => ({ items: listItems(db, query, now()) }));
  api.read(supplyEndpoints.item, (db, { params }) => supplyItem(db, params.id, now()));
  api.write(supplyEndpoints.createItem, (write, { body }) => supplyItem(write.tx, createItem(write, body), write.now));
  api.write(supplyEndpoints.editItem, (write, { params, body, ifMatch }) => {
    editItem(write, params.id, ifMatch, body);
    return supplyItem(write.tx, params.id, write.now);
  });

  api.read(supplierEndpoints.list, (db) => ({ items: listSuppliers(db) }));
  api.write(supplierEndpoints.create, (write, { body }) => supplierById(write.tx, createSupplier(write, body)));
  api.write(supplierEndpoints.edit, (write, { params, body, ifMatch }) => {
    editSupplier(write, params.id, ifMatch, body);
    return supplierById(write.tx, params.id);
  });

  api.write(supplyEndpoints.receive, (write, { body }) => lotById(write.tx, receive(write, body)));
  api.write(supplyEndpoints.undoReceipt, (write, { params }) => {
    undoReceipt(write, params.id);
    return DONE;
  });
  api.write(supplyEndpoints.count, (write, { body }) => countById(write.tx, countItem(write, body)));
  api.read(supplyEndpoints.lots, (db, { query }) => listLots(db, query));
  api.read(supplyEndpoints.uses, (db, { query }) => listUses(db, query));
  api.read(supplyEndpoints.export, (db, { query }) => supplyCsv(db, query.table, now()));
}
