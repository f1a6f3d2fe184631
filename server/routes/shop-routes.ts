import { shopEndpoints } from '../../shared/contracts/shop.ts';
import type { Api } from '../http/api.ts';
import { ownOrderRow } from '../queries/orders.ts';
import { availability, findShopOrder, listShopOrders } from '../queries/shop.ts';
import { cancelOwnOrder } from '../services/cancel-order.ts';
import { invoiceFile } from '../services/papers/invoice.ts';
import { placeOrder } from '../services/place-order.ts';
import { startPayment } from '../services/start-payment.ts';

/** The shop of a buyer: always the caller's own store, never one that a request names. */
export function shopRoutes(api: Api): void {
  const { deps } = api;
  api.read(shopEndpoints.availability, (db, { caller }) => availability(db, caller.storeId, deps.clock.now()));
  api.write(shopEndpoints.place, (write, { body, caller }) => placeOrder(write, caller.storeId, body));
  api.read(shopEndpoints.list, (db, { query, caller }) => listShopOrders(db, caller.storeId, query));
  api.read(shopEndpoints.show, (db, { params, caller }) => findShopOrder(db, caller.storeId, params.id));
  api.act(shopEndpoints.pay, ({ params, caller }) => startPayment(deps, caller, params.id));
  api.write(shopEndpoints.cancel, (write, { params }) => cancelOwnOrder(write, params.id));
  api.act(shopEndpoints.invoice, ({ params, caller }) =>
    invoiceFile(deps.db, ownOrderRow(deps.db, caller.storeId, params.id).id),
  );
}
