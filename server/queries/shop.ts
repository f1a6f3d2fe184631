import { eq } from 'drizzle-orm';
import type { ListQuery, Page } from '../../shared/contracts/common.ts';
import type { OrderListItem } from '../../shared/contracts/orders.ts';
import type { Availability, Offer, ShopOrder } from '../../shared/contracts/shop.ts';
import { dayOf } from '../../shared/domain/days.ts';
import type { Db } from '../db/client.ts';
import { stores } from '../db/schema/index.ts';
import { farmOf } from './farm.ts';
import { activeListings, gradeCode, stockByGrade, type GradeStock } from './listings.ts';
import { holdMinutes } from './order-settings.ts';
import {
  invoiceOf,
  listOrders,
  orderLinesOf,
  ownOrderRow,
  paymentsOf,
  pickedPlugs,
  refundsOf,
  toOrderFacts,
  type OrderRow,
} from './orders.ts';

const NO_STORE = 'no store';

/** What the caller's store can order now. */
export function availability(db: Db, storeId: string | null, now: number): Availability {
  const farm = farmOf(db);
  const stockOf = stockByGrade(db, dayOf(now, farm.timeZone));
  const store = db
    .select()
    .from(stores)
    .where(eq(stores.id, storeId ?? NO_STORE))
    .get();
  return {
    offers: activeListings(db).map(({ listing, line }): Offer => {
      const stock = stockOf(line.id, listing.grade);
      return {
        listingId: listing.id,
        lineCode: line.code,
        tradeName: line.tradeName,
        taxon: line.taxon,
        grade: gradeCode(listing.grade),
        priceMinor: listing.priceMinor,
        free: stock.free,
        sizeMm: sizesOf(stock),
      };
    }),
    currency: farm.currency,
    taxPercent: farm.taxPercent / 100,
    holdMinutes: holdMinutes(farm),
    closed: store?.retiredAt !== null,
  };
}

/** Orders of the caller's store. */
export function listShopOrders(db: Db, storeId: string | null, query: ListQuery): Page<OrderListItem> {
  return listOrders(db, { ...query, storeId: storeId ?? NO_STORE });
}

export function findShopOrder(db: Db, storeId: string | null, id: string): ShopOrder {
  return showShopOrder(db, ownOrderRow(db, storeId, id));
}

/** An order as its store sees it: nothing of racks, batches or people of the farm. */
export function showShopOrder(db: Db, row: OrderRow): ShopOrder {
  const given = refundsOf(db, row.id);
  const sum = (state: string) =>
    given.filter((each) => each.state === state).reduce((total, { amountMinor }) => total + amountMinor, 0);
  const invoice = invoiceOf(db, row.id);
  return {
    ...toOrderFacts(row),
    lines: orderLinesOf(db, row.id),
    refusal: row.state === 'placed' ? (paymentsOf(db, row.id)[0]?.refusal ?? '') : '',
    refundedMinor: sum('succeeded'),
    refundPendingMinor: sum('pending'),
    invoice: invoice && { number: invoice.number, issuedOn: invoice.issuedOn },
    plugs:
      row.state === 'shipped'
        ? pickedPlugs(db, row.id).map(({ pick, lineCode }) => ({ code: pick.plugCode, lineCode }))
        : [],
  };
}

function sizesOf({ batches }: GradeStock): Offer['sizeMm'] {
  const sizes = batches.filter(({ available }) => available > 0).map(({ sizeMm }) => sizeMm);
  return sizes.length === 0 ? null : { min: Math.min(...sizes), max: Math.max(...sizes) };
}
