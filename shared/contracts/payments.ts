import { done } from './common.ts';
import type { Endpoint } from './endpoint.ts';

export const paymentEndpoints = {
  /** The body is signed by the payment service and read as raw bytes, so it has no schema here. */
  webhook: {
    method: 'post',
    path: '/api/webhooks/payments',
    access: 'public',
    summary: 'Events of the payment service',
    response: done,
  },
} as const satisfies Record<string, Endpoint>;
