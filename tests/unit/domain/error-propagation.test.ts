import { describe, expect, it } from 'vitest';
import { propagatedSd } from '../../../shared/domain/error-propagation.ts';
import { solveCarbonate } from '../../../shared/domain/carbonate/solve.ts';

describe('propagatedSd', () => {
  it('a sum takes the root of the squares, whatever the signs', () => {
    const sd = propagatedSd(({ a, b }) => ({ sum: a + b, difference: a - b }), {
      ...{ a: { value: 10, sd: 0.3 }, b: { value: 4, sd: 0.4 } },
    });
    expect(sd.sum).toBeCloseTo(0.5, 12);
    expect(sd.difference).toBeCloseTo(0.5, 12);
  });

  it('a product takes relative errors: 2 % and 1.5 % make 2.5 %', () => {
    const { area } = propagatedSd(({ a, b }) => ({ area: a * b }), {
      ...{ a: { value: 100, sd: 2 }, b: { value: 200, sd: 3 } },
    });
    expect(area / 20_000).toBeCloseTo(0.025, 12);
  });

  it('an input without error adds none', () => {
    expect(propagatedSd(({ a }) => ({ a: a ** 2 }), { a: { value: 3, sd: 0 } })).toEqual({ a: 0 });
  });

  it('carbon dioxide from alkalinity and pH hangs on the pH: a small error comes through by its slope', () => {
    const pco2 = ({ ph }: { ph: number }) => {
      const { pco2Uatm } = solveCarbonate({ salinity: 35, temperatureC: 25, alkalinityUmolKg: 2300, ph });
      return { pco2Uatm };
    };
    const slope = (pco2({ ph: 8.1 + 1e-6 }).pco2Uatm - pco2({ ph: 8.1 - 1e-6 }).pco2Uatm) / 2e-6;
    const { pco2Uatm } = propagatedSd(pco2, { ph: { value: 8.1, sd: 0.01 } });
    expect(pco2Uatm / Math.abs(slope * 0.01)).toBeCloseTo(1, 3);
  });
});
