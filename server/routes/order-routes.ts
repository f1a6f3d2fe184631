import { orderEndpoints, packingEndpoints } from '../../shared/contracts/orders.ts';
import type { Api } from '../http/api.ts';
import { showOrder } from '../queries/order-page.ts';
import { listOrders, orderStates } from '../queries/orders.ts';
import { packingSupplies } from '../queries/packing-supplies.ts';
import { pickPlan } from '../queries/pick-plan.ts';
import { cancelOrder } from '../services/cancel-order.ts';
import { packOrder } from '../services/pack-order.ts';
import { invoiceFile } from '../services/papers/invoice.ts';
import { packingListFile } from '../services/papers/packing-list.ts';
import { pickPlug, undoPick } from '../services/pick-service.ts';
import { refundOrder } from '../services/refund-service.ts';
import { shipOrder } from '../services/ship-order.ts';

/** Orders of all stores, from payment to the carrier. */
export function orderRoutes(api: Api): void {
  api.read(orderEndpoints.list, (db, { query }) => ({ ...listOrders(db, query), states: orderStates(db) }));
  api.read(orderEndpoints.show, (db, { params }) => showOrder(db, params.id));
  api.write(orderEndpoints.cancel, (write, { params, body }) => cancelOrder(write, params.id, body.reason));
  api.write(orderEndpoints.refund, (write, { params, body }) => refundOrder(write, params.id, body));
  api.act(orderEndpoints.invoice, ({ params }) => invoiceFile(api.deps.db, params.id));

  api.read(packingEndpoints.plan, (db, { params }) => pickPlan(db, params.id));
  api.write(packingEndpoints.pick, (write, { params, body }) => pickPlug(write, params.id, body.code));
  api.write(packingEndpoints.undoPick, (write, { params }) => undoPick(write, params.id, params.pickId));
  api.read(packingEndpoints.supplies, (db) => ({ items: packingSupplies(db) }));
  api.write(packingEndpoints.pack, (write, { params, body }) => packOrder(write, params.id, body));
  api.write(packingEndpoints.ship, (write, { params, body }) => shipOrder(write, params.id, body));
  api.act(packingEndpoints.packingList, ({ params }) => packingListFile(api.deps.db, params.id));
}
