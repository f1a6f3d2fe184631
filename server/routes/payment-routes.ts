import { DONE } from '../../shared/contracts/common.ts';
import { paymentEndpoints } from '../../shared/contracts/payments.ts';
import type { Api } from '../http/api.ts';
import { receivePaymentEvent } from '../services/payment-events.ts';

/** What the payment service tells. */
export function paymentRoutes(api: Api): void {
  api.act(paymentEndpoints.webhook, ({ request }) => {
    receivePaymentEvent(api.deps, request.body, request.get('Stripe-Signature') ?? '');
    return DONE;
  });
}
