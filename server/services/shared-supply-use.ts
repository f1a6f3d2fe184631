import type { Feed } from '../../shared/domain/reservoir-shares.ts';
import { splitByWeights } from '../../shared/domain/split.ts';
import type { Write } from '../db/write.ts';
import { assertOnHand, type SupplyUse, useSupply } from './supply-use.ts';

/** Amounts are booked to a thousandth of the item's unit when they are shared out. */
const STEPS_IN_A_UNIT = 1000;

/**
 * Takes an amount once and books it to several systems by their shares; the parts add up to the whole exactly.
 *
 * @throws {DomainError} `supply.not_enough` for the whole, before anything is booked to anyone
 */
export function useSharedSupply(write: Write, use: Omit<SupplyUse, 'systemId'>, feeds: readonly Feed[]): void {
  const [only] = feeds;
  if (feeds.length === 1 && only) {
    useSupply(write, { ...use, systemId: only.systemId });
    return;
  }
  assertOnHand(write, use);
  const steps = splitByWeights(
    Math.round(use.quantity * STEPS_IN_A_UNIT),
    feeds.map(({ share }) => share),
  );
  let left = use.quantity;
  feeds.forEach(({ systemId }, index) => {
    const isLast = index === feeds.length - 1;
    const part = isLast ? left : (steps[index] ?? 0) / STEPS_IN_A_UNIT;
    useSupply(write, { ...use, quantity: part, systemId });
    left -= part;
  });
}
