import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { orderAmounts } from '../../../shared/domain/order-amounts.ts';

describe('what an order costs', () => {
  it('adds lines and takes tax once from the sum, half up', () => {
    const amounts = orderAmounts(
      [
        { quantity: 3, priceMinor: 1850 },
        { quantity: 1, priceMinor: 1 },
      ],
      'EUR',
      22.5,
    );

    // 55.51 at 22.5 %: 12.48975.
    expect(amounts).toEqual({ subtotalMinor: 5551, taxMinor: 1249, totalMinor: 6800 });
  });

  it('when there is no tax, the total is the sum', () => {
    expect(orderAmounts([{ quantity: 2, priceMinor: 900 }], 'JPY', 0)).toEqual({
      ...{ subtotalMinor: 1800, taxMinor: 0, totalMinor: 1800 },
    });
  });

  it('for any order, total is sum and tax, and the tax is within half a minor unit of the exact one', () => {
    const line = fc.record({
      quantity: fc.integer({ min: 1, max: 5000 }),
      priceMinor: fc.integer({ min: 1, max: 1e6 }),
    });

    fc.assert(
      fc.property(
        fc.array(line, { minLength: 1, maxLength: 20 }),
        fc.integer({ min: 0, max: 10_000 }),
        (lines, rate) => {
          const { subtotalMinor, taxMinor, totalMinor } = orderAmounts(lines, 'EUR', rate / 100);

          expect(totalMinor).toBe(subtotalMinor + taxMinor);
          expect(Math.abs(taxMinor - (subtotalMinor * rate) / 10_000)).toBeLessThanOrEqual(0.5 + 1e-6);
        },
      ),
    );
  });
});
