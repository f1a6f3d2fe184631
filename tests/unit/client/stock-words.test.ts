import { describe, expect, it } from 'vitest';
import { agoWords, countWords, rackWords, saleableWords } from '../../../src/views/stock/stock-words.ts';

describe('what can be sold and what is promised', () => {
  it.each([
    [40, 0, '40 are saleable.'],
    [1, 0, '1 is saleable.'],
    [40, 3, '40 are saleable, 3 of them promised.'],
    [7, 7, '7 are saleable, 7 of them promised.'],
    [4, 7, '4 are saleable and 7 are promised: 3 are missing.'],
    [1, 2, '1 is saleable and 2 are promised: 1 is missing.'],
    [0, 1, 'None is saleable and 1 is promised: 1 is missing.'],
    [0, 0, 'None is saleable.'],
    [2396, 1200, '2,396 are saleable, 1,200 of them promised.'],
  ])('of %i saleable and %i promised is said: %s', (saleable, held, words) => {
    expect(saleableWords(saleable, held)).toBe(words);
  });

  it('leaves out of a row what is nothing', () => {
    expect(countWords({ alive: 1204, held: 0, withheld: 0 })).toBe('1,204 alive');
    expect(countWords({ alive: 94, held: 3, withheld: 14 })).toBe('94 alive · 3 promised · 14 withheld');
  });
});

describe('when something was done', () => {
  it.each([
    [0, 'today'],
    [1, '1 day ago'],
    [20, '20 days ago'],
    [21, '3 weeks ago'],
  ])('%i days back is said: %s', (days, words) => {
    expect(agoWords(days)).toBe(words);
  });
});

describe('what of a rack is for sale', () => {
  const rack = { plugs: 81, saleable: 40, saleableIn14Days: 12, systemKind: 'growout' };

  it.each([
    [rack, 0, ', 40 saleable now and 12 more within 14 days.'],
    [{ ...rack, saleableIn14Days: 0 }, 1, ', 40 saleable now. 1 is withheld.'],
    [{ ...rack, saleable: 0, saleableIn14Days: 0 }, 20, ', none saleable now. 20 are withheld.'],
    [{ ...rack, saleable: 0, saleableIn14Days: 0 }, 81, ', all of them withheld from sale.'],
    [{ ...rack, plugs: 0 }, 0, '.'],
    [{ ...rack, systemKind: 'quarantine' }, 0, '. It stands in quarantine, so nothing here is for sale.'],
  ])('%o with %i withheld says: %s', (page, withheld, words) => {
    expect(rackWords(page, withheld)).toBe(words);
  });
});
