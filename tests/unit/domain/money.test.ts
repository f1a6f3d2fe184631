import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  addMoney,
  MICRO_PER_MAJOR,
  microFromMinor,
  minorDigits,
  minorFromMicro,
  minorFromText,
  moneyOf,
  multiplyMoney,
  percentOf,
  subtractMoney,
  sumMoney,
} from '../../../shared/domain/money.ts';
import iso4217 from '../../reference/iso4217.json' with { type: 'json' };
import { domainErrorOf } from '../../support/domain-error.ts';

const euro = (minor: number) => moneyOf(minor, 'EUR');

describe('digits of a currency', () => {
  // ISO 4217 list one.
  it.each(Object.entries({ ...iso4217.minorUnitExceptions, ...iso4217.common }))('%s has %i', (currency, digits) => {
    expect(minorDigits(currency)).toBe(digits);
  });

  it.each(['', 'eur', 'EURO', 'E1R', '€'])('when the code is "%s", asks for three letters', (currency) => {
    expect(domainErrorOf(() => minorDigits(currency)).code).toBe('input.invalid');
  });

  it('knows nothing of object internals', () => {
    expect(domainErrorOf(() => minorDigits('constructor')).code).toBe('input.invalid');
  });
});

describe('sums', () => {
  it('adds, takes away and multiplies whole minor units', () => {
    expect(addMoney(euro(1250), euro(-250))).toEqual(euro(1000));
    expect(subtractMoney(euro(100), euro(250))).toEqual(euro(-150));
    expect(multiplyMoney(euro(1999), 3)).toEqual(euro(5997));
    expect(sumMoney([euro(1), euro(2), euro(3)], 'EUR')).toEqual(euro(6));
    expect(sumMoney([], 'JPY')).toEqual(moneyOf(0, 'JPY'));
  });

  it('when currencies differ, refuses', () => {
    expect(domainErrorOf(() => addMoney(euro(1), moneyOf(1, 'USD'))).code).toBe('input.invalid');
  });

  it.each([
    ['a fraction', () => moneyOf(1.5, 'EUR')],
    ['nothing at all', () => moneyOf(Number.NaN, 'EUR')],
    ['a sum beyond 2^53', () => addMoney(euro(Number.MAX_SAFE_INTEGER), euro(1))],
    ['a product beyond 2^53', () => multiplyMoney(euro(Number.MAX_SAFE_INTEGER), 2)],
    ['half a piece', () => multiplyMoney(euro(100), 0.5)],
  ])('when it would be %s, refuses rather than lose a cent', (_, act) => {
    expect(domainErrorOf(act).code).toBe('domain.out_of_range');
  });

  it('never gives minus zero', () => {
    expect(Object.is(subtractMoney(euro(0), euro(0)).minor, 0)).toBe(true);
    expect(Object.is(multiplyMoney(euro(-5), 0).minor, 0)).toBe(true);
    expect(Object.is(percentOf(euro(-1), 1).minor, 0)).toBe(true);
  });
});

describe('a percentage', () => {
  // Worked by hand; half a minor unit goes up.
  it.each([
    [1000, 19, 190],
    [1050, 5, 53], // 52.5
    [1049, 5, 52], // 52.45
    [-1050, 5, -53],
    [10_000, 8.875, 888], // 887.5
    [999, 0, 0],
    [333, 100, 333],
    [9_007_199_254_740_991, 50, 4_503_599_627_370_496],
  ])('of %i at %d %% is %i', (minor, percent, result) => {
    expect(percentOf(euro(minor), percent).minor).toBe(result);
  });

  it('of a credit is what the invoice charged, with a minus', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 1e12 }), fc.integer({ min: 0, max: 300_000 }), (minor, rate) => {
        const charged = percentOf(euro(minor), rate / 10_000).minor;
        const credited = percentOf(euro(-minor), rate / 10_000).minor;
        expect(charged + credited).toBe(0);
      }),
    );
  });

  it('is never more than half a minor unit off', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 1e9 }), fc.integer({ min: 0, max: 10_000 }), (minor, hundredths) => {
        const exact = (minor * hundredths) / 10_000;
        expect(Math.abs(percentOf(euro(minor), hundredths / 100).minor - exact)).toBeLessThanOrEqual(0.5);
      }),
    );
  });
});

describe('micro-units', () => {
  it('are a millionth of the major unit whatever its digits', () => {
    expect(microFromMinor(100, 'EUR')).toBe(MICRO_PER_MAJOR);
    expect(microFromMinor(1, 'JPY')).toBe(MICRO_PER_MAJOR);
    expect(microFromMinor(1000, 'KWD')).toBe(MICRO_PER_MAJOR);
    expect(microFromMinor(10_000, 'CLF')).toBe(MICRO_PER_MAJOR);
  });

  it.each([
    [4_999, 0],
    [5_000, 1],
    [14_999, 1],
    [-5_000, -1],
    [-4_999, 0],
  ])('%i of a euro are shown as %i cents', (micro, cents) => {
    expect(minorFromMicro(micro, 'EUR')).toBe(cents);
  });

  it('come back to the same minor units', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: -1e9, max: 1e9 }),
        fc.constantFrom('EUR', 'JPY', 'KWD', 'CLF'),
        (minor, currency) => {
          expect(minorFromMicro(microFromMinor(minor, currency), currency)).toBe(minor);
        },
      ),
    );
  });

  it('when the amount is too large to keep exactly, refuses', () => {
    expect(domainErrorOf(() => microFromMinor(Number.MAX_SAFE_INTEGER, 'EUR')).code).toBe('domain.out_of_range');
  });
});

describe('typed amounts', () => {
  it.each([
    ['12.5', 'EUR', 1250],
    [' 12 ', 'EUR', 1200],
    ['0.07', 'EUR', 7],
    ['-3.10', 'EUR', -310],
    ['1250', 'JPY', 1250],
    ['1.234', 'KWD', 1234],
    ['-0', 'EUR', 0],
    ['90071992547409.91', 'EUR', undefined],
  ])('"%s" %s', (text, currency, minor) => {
    if (minor === undefined) expect(domainErrorOf(() => minorFromText(text, currency)).code).toBe('input.invalid');
    else expect(Object.is(minorFromText(text, currency), minor)).toBe(true);
  });

  it.each(['', '.', '1.', '1.234', '1,50', '1e3', '+5', '٣', '12.5 EUR', 'NaN'])('refuses "%s" as euros', (text) => {
    expect(domainErrorOf(() => minorFromText(text, 'EUR')).code).toBe('input.invalid');
  });

  it('when the currency has no cents, asks for a whole amount', () => {
    expect(domainErrorOf(() => minorFromText('12.5', 'JPY')).message).toContain('whole amount');
  });
});
