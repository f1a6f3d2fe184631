import fc from 'fast-check';
import { expect, it } from 'vitest';
import {
  feedsAt,
  type FeedSet,
  partOfSystem,
  sharesByEvaporation,
  wholeShares,
} from '../../../shared/domain/reservoir-shares.ts';
import type { UseInterval } from '../../../shared/domain/reservoir-use.ts';

const interval = (from: number, to: number, litres: number): UseInterval => ({
  ...{ from, to, litres, alkalinityMeq: litres * 40 },
});
const sum = (intervals: readonly UseInterval[]) => intervals.reduce((total, { litres }) => total + litres, 0);

it('feedsAt: without any set, and before the first, all goes to its own system', () => {
  const sets: FeedSet[] = [{ since: 100, feeds: [{ systemId: 'b', share: 1 }] }];

  expect(feedsAt([], 'a', 5)).toEqual([{ systemId: 'a', share: 1 }]);
  expect(feedsAt(sets, 'a', 99)).toEqual([{ systemId: 'a', share: 1 }]);
  expect(feedsAt(sets, 'a', 100)).toEqual([{ systemId: 'b', share: 1 }]);
});

it('partOfSystem: a stretch in which the shares changed is cut there', () => {
  const sets: FeedSet[] = [
    {
      since: 6,
      feeds: [
        { systemId: 'a', share: 0.75 },
        { systemId: 'b', share: 0.25 },
      ],
    },
  ];

  const a = partOfSystem([interval(0, 10, 20)], sets, { ownSystemId: 'a', systemId: 'a' });
  const b = partOfSystem([interval(0, 10, 20)], sets, { ownSystemId: 'a', systemId: 'b' });

  // 2 L in each unit of time: 12 L before the change, then 6 and 2 of 8.
  expect(a.map(({ from, to, litres }) => [from, to, litres])).toEqual([
    [0, 6, 12],
    [6, 10, 6],
  ]);
  expect(b.map(({ from, to, litres }) => [from, to, litres])).toEqual([[6, 10, 2]]);
  expect(b[0]?.alkalinityMeq).toBe(80);
});

it('partOfSystem: the parts of all systems make up the whole, whenever the shares changed', () => {
  const share = fc.double({ min: 0.01, max: 0.99, noNaN: true });
  const aSet = fc.record({ since: fc.integer({ min: 0, max: 100 }), share });
  const stretch = fc
    .tuple(
      fc.integer({ min: 0, max: 80 }),
      fc.integer({ min: 1, max: 40 }),
      fc.double({ min: 0, max: 50, noNaN: true }),
    )
    .map(([from, length, litres]) => interval(from, from + length, litres));
  fc.assert(
    fc.property(fc.array(aSet, { maxLength: 4 }), fc.array(stretch), (list, use) => {
      const sets = [...list]
        .sort((x, y) => x.since - y.since)
        .map(({ since, share: part }) => ({
          since,
          feeds: [
            { systemId: 'a', share: part },
            { systemId: 'b', share: 1 - part },
          ],
        }));
      const of = (systemId: string) => partOfSystem(use, sets, { ownSystemId: 'a', systemId });
      expect(sum(of('a')) + sum(of('b'))).toBeCloseTo(sum(use), 9);
    }),
  );
});

it('wholeShares: thirds typed to the per cent make up the whole exactly', () => {
  const shares = wholeShares(['a', 'b', 'c'].map((systemId) => ({ systemId, share: 0.333 })));

  expect(shares.reduce((total, { share }) => total + share, 0)).toBeCloseTo(1, 12);
});

it.each([
  ['too little', [0.5, 0.4]],
  ['too much', [0.7, 0.4]],
  ['nothing for one', [1, 0]],
])('wholeShares: %s is refused', (_, parts) => {
  const feeds = parts.map((share, index) => ({ systemId: String(index), share }));
  expect(() => wholeShares(feeds)).toThrow('100 %');
});

it('wholeShares: one system named twice is refused', () => {
  expect(() => wholeShares(['a', 'a'].map((systemId) => ({ systemId, share: 0.5 })))).toThrow('100 %');
});

it('sharesByEvaporation: by open water where all is known, else by volume', () => {
  const systems = [
    { systemId: 'a', surfaceM2: 3, netVolumeL: 1000 },
    { systemId: 'b', surfaceM2: 1, netVolumeL: 1000 },
  ];

  expect(sharesByEvaporation(systems)).toEqual({
    by: 'surface',
    feeds: [
      { systemId: 'a', share: 0.75 },
      { systemId: 'b', share: 0.25 },
    ],
  });
  expect(sharesByEvaporation(systems.map((system) => ({ ...system, surfaceM2: null })))).toMatchObject({
    by: 'volume',
    feeds: [{ share: 0.5 }, { share: 0.5 }],
  });
});
