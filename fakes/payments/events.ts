import { nowSeconds, type Payments } from './context.ts';
import { newId } from './ids.ts';
import type { Cause, Event, EventType } from './objects.ts';

/** Version of the API whose shapes the objects have: the one the SDK in use is pinned to. */
const API_VERSION = '2026-10-28.endive';

/** Notes an event with the object as it is now, and sends it on its way to the webhook address. */
export function recordEvent(payments: Payments, type: EventType, object: Event['data']['object'], cause: Cause): void {
  const event: Event = {
    id: newId('evt'),
    object: 'event',
    api_version: API_VERSION,
    created: nowSeconds(payments),
    data: { object: structuredClone(object) },
    livemode: false,
    pending_webhooks: 1,
    request: cause,
    type,
  };
  const stored = { event, attempts: [], tries: 0, state: 'waiting' as const };
  payments.store.events.set(event.id, stored);
  payments.deliveries.schedule(stored, 0);
}
