import type { OrderFacts, OrderState } from '@shared/contracts/orders.ts';
import type { Tone } from '@/components/tone.ts';

export const STATE_WORDS: Readonly<Record<OrderState, { label: string; tone: Tone }>> = {
  placed: { label: 'to be paid', tone: 'ochre' },
  paid: { label: 'paid', tone: 'kelp' },
  picking: { label: 'picking', tone: 'slate' },
  packed: { label: 'packed', tone: 'slate' },
  shipped: { label: 'shipped', tone: 'plain' },
  cancelled: { label: 'cancelled', tone: 'brick' },
};

export interface OrderStep {
  label: string;
  at: number | null;
  done: boolean;
}

/** The way of an order, each step with when it was reached. A cancelled one ends where it was. */
export function stepsOf(order: OrderFacts): OrderStep[] {
  const steps: OrderStep[] = [
    { label: 'Placed', at: order.placedAt, done: true },
    { label: 'Paid', at: order.paidAt, done: order.paidAt !== null },
    { label: 'Packed', at: order.packedAt, done: order.packedAt !== null },
    { label: 'Shipped', at: order.shippedAt, done: order.shippedAt !== null },
  ];
  if (order.state !== 'cancelled') return steps;
  return [...steps.filter(({ done }) => done), { label: 'Cancelled', at: order.cancelledAt, done: true }];
}
