import type { Deliveries } from './deliveries.ts';
import type { PaymentStore } from './store.ts';

/** What every part of the payments stand-in works with. */
export interface Payments {
  store: PaymentStore;
  deliveries: Deliveries;
  now: () => number;
  /** Address of the hosted page, known once the server listens. */
  publicUrl: () => string;
}

export function nowSeconds(payments: Payments): number {
  return Math.floor(payments.now() / 1000);
}
