import { createHmac } from 'node:crypto';

/**
 * Value of the `Stripe-Signature` header: HMAC-SHA256 over `<seconds>.<payload>` with the whole secret as the key.
 *
 * @param payload the body exactly as it is sent
 * @param atSeconds time of sending, Unix seconds
 */
export function signatureHeader(payload: string, secret: string, atSeconds: number): string {
  const digest = createHmac('sha256', secret).update(`${atSeconds}.${payload}`, 'utf8').digest('hex');
  return `t=${atSeconds},v1=${digest}`;
}
