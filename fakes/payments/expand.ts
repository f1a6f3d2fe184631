import { invalidRequest } from './api-error.ts';
import type { PaymentStore } from './store.ts';

/** The fields that hold an id, with the place where the object behind it is kept. */
const LINKS: Readonly<Record<string, (store: PaymentStore, id: string) => object | undefined>> = {
  payment_intent: (store, id) => store.intents.get(id),
  latest_charge: (store, id) => store.charges.get(id),
  charge: (store, id) => store.charges.get(id),
};

/** A copy of an answer in which the asked-for ids (`payment_intent.latest_charge`) are replaced by their objects. */
export function expanded(store: PaymentStore, answer: object, paths: readonly string[]): object {
  const copy = structuredClone(answer);
  for (const path of paths) expandPath(store, copy, path.split('.'));
  return copy;
}

function expandPath(store: PaymentStore, target: object, [field = '', ...rest]: string[]): void {
  if (Array.isArray(target)) {
    for (const each of target) expandPath(store, each, [field, ...rest]);
    return;
  }
  const fields = new Map<string, unknown>(Object.entries(target));
  const value = fields.get(field);
  const found = expandedValue(store, fields, field, value);
  if (found === null) return; // nothing behind it yet, as before a session is paid
  Object.assign(target, { [field]: found });
  if (rest.length > 0) expandPath(store, found, rest);
}

function expandedValue(
  store: PaymentStore,
  fields: ReadonlyMap<string, unknown>,
  field: string,
  value: unknown,
): object | null {
  if (field === 'line_items' && fields.get('object') === 'checkout.session') {
    return lineItems(store, String(fields.get('id')));
  }
  if (typeof value === 'object') return value;
  const link = LINKS[field];
  if (link === undefined || typeof value !== 'string') {
    throw invalidRequest(`This property cannot be expanded (${field}).`);
  }
  return structuredClone(link(store, value) ?? null);
}

export function lineItems(store: PaymentStore, sessionId: string): object {
  const data = structuredClone(store.sessions.get(sessionId)?.lines ?? []);
  return { object: 'list', data, has_more: false, url: `/v1/checkout/sessions/${sessionId}/line_items` };
}
