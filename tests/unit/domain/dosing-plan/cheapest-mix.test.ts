import fc from 'fast-check';
import { describe, expect, it, vi } from 'vitest';
import { solveLinear } from '../../../../server/outside/linear-solver.ts';
import { cheapestMix, type Means, type MixTarget } from '../../../../shared/domain/dosing-plan/cheapest-mix.ts';
import { limeSolubility } from '../../../../shared/domain/limewater.ts';

/** Many programmes are solved, on a busy machine slowly. */
vi.setConfig({ testTimeout: 60_000 });

const MEQ_PER_G = 2000 / 74.092;

function someMeans(changes: Partial<Means> = {}, lime: Partial<NonNullable<Means['limewater']>> = {}): Means {
  return {
    ...{ netVolumeL: 1000, roomMeqL: 5, supplements: [] },
    limewater: {
      ...{ litresPerDay: 10, temperatureC: 25, purity: 1, acidPercent: 5, mostVinegarMlPerL: 5 },
      ...{ mostStrengthMeqL: 100, limeCost: 0.01, vinegarCost: 0.002 },
      ...lime,
    },
    ...changes,
  };
}

function toBring(alkalinityMeqL: number, changes: Partial<MixTarget> = {}): MixTarget {
  return { alkalinityMeqL, calciumMgL: alkalinityMeqL * 20.039, calciumToleranceMgL: 1, ...changes };
}

const alkalinity = { itemId: 'alk', alkalinityMeq: 1, calciumMg: 0, cost: 0.002 };
const calcium = { itemId: 'cal', alkalinityMeq: 0, calciumMg: 20.039, cost: 0.003 };

describe('the cheapest mix', () => {
  it('when limewater carries all, is lime for the demand and no vinegar', () => {
    const mix = cheapestMix(someMeans({ supplements: [alkalinity, calcium] }), toBring(0.3), solveLinear);
    expect(mix).toMatchObject({ vinegarMlPerDay: 0, amounts: [], shortMeqL: 0, calciumOffMgL: 0 });
    expect(mix.limeGPerDay).toBeCloseTo((0.3 * 1000) / MEQ_PER_G, 4);
    expect(mix.cost).toBeCloseTo(mix.limeGPerDay * 0.01, 6);
  });

  it('when the water alone can’t dissolve so much, takes just the vinegar that makes room for it', () => {
    // 10 L hold 0.403 meq/L of 1,000 L; 1 mL of 5 % vinegar lets 0.87 / 2 of its acid's moles more dissolve.
    const { limeGPerDay, vinegarMlPerDay, shortMeqL } = cheapestMix(someMeans(), toBring(0.41), solveLinear);
    const roomMol = (0.87 / 2) * (0.05 / 60.052);
    expect(shortMeqL).toBe(0);
    expect(limeGPerDay).toBeCloseTo((0.41 * 1000) / MEQ_PER_G, 4);
    expect(vinegarMlPerDay).toBeCloseTo((limeGPerDay / 74.092 - (10 * 1.493) / 74.092) / roomMol, 2);
  });

  it('when limewater is at its end, adds supplements in the ratio of the skeleton', () => {
    const means = someMeans({ supplements: [alkalinity, calcium] }, { acidPercent: null });
    const { amounts, limeGPerDay } = cheapestMix(means, toBring(0.6, { calciumToleranceMgL: 0 }), solveLinear);
    const rest = 0.6 * 1000 - limeGPerDay * MEQ_PER_G;
    expect(limeGPerDay).toBeCloseTo(limeSolubility(25) * 10, 4);
    expect(amounts).toEqual([
      { itemId: 'alk', perDay: expect.closeTo(rest, 3) },
      { itemId: 'cal', perDay: expect.closeTo(rest, 3) },
    ]);
  });

  it('when a supplement is cheaper than lime, takes it as far as calcium allows', () => {
    const cheap = { ...alkalinity, cost: 1e-6 };
    const { amounts } = cheapestMix(someMeans({ supplements: [cheap] }), toBring(0.3), solveLinear);
    // Calcium may be 1 mg/L short, which is 1 / 20.039 meq/L of lime.
    expect(amounts).toEqual([{ itemId: 'alk', perDay: expect.closeTo(1000 / 20.039, 2) }]);
  });

  it('when nothing can bring it all, brings what it can and says what is missing', () => {
    const mix = cheapestMix(someMeans({}, { acidPercent: null }), toBring(1), solveLinear);
    expect(mix.shortMeqL).toBeCloseTo(1 - 0.40301, 4);
    expect(mix.calciumOffMgL).toBeGreaterThan(10);
    expect(cheapestMix(someMeans({ limewater: null }), toBring(0.4), solveLinear).shortMeqL).toBeCloseTo(0.4, 6);
  });

  it('when nothing is needed, is nothing', () => {
    expect(cheapestMix(someMeans({ supplements: [alkalinity, calcium] }), toBring(0), solveLinear)).toEqual({
      ...{ limeGPerDay: 0, vinegarMlPerDay: 0, amounts: [], shortMeqL: 0, calciumOffMgL: 0, cost: 0 },
    });
  });
});

describe('laws of the cheapest mix', () => {
  const amount = (max: number) => fc.double({ min: 0, max, noNaN: true });
  const given = fc.record({
    demand: amount(2),
    litres: fc.double({ min: 0.5, max: 60, noNaN: true }),
    room: amount(3),
    strongest: amount(60),
    acid: fc.constantFrom(null, 5, 10),
    vinegar: amount(12),
    alkCost: amount(0.1),
    calCost: amount(0.1),
    limeCost: amount(0.1),
  });
  const meansFor = (each: typeof given extends fc.Arbitrary<infer T> ? T : never) =>
    someMeans(
      {
        roomMeqL: each.room,
        supplements: [
          { ...alkalinity, cost: each.alkCost },
          { ...calcium, cost: each.calCost },
        ],
      },
      {
        ...{ litresPerDay: each.litres, acidPercent: each.acid, mostVinegarMlPerL: each.vinegar },
        ...{ mostStrengthMeqL: each.strongest, limeCost: each.limeCost },
      },
    );
  const alkalinityOf = (means: Means, mix: ReturnType<typeof cheapestMix>) =>
    (mix.limeGPerDay * (means.limewater?.purity ?? 0) * MEQ_PER_G +
      (mix.amounts.find(({ itemId }) => itemId === 'alk')?.perDay ?? 0)) /
    means.netVolumeL;

  it('never passes a limit: solubility, strength, vinegar, room in the water', () => {
    fc.assert(
      fc.property(given, (each) => {
        const means = meansFor(each);
        const mix = cheapestMix(means, toBring(each.demand), solveLinear);
        const acidRoom = each.acid === null ? 0 : (0.87 / 2) * (each.acid / 100 / 60.052) * mix.vinegarMlPerDay;
        expect(mix.limeGPerDay / 74.092).toBeLessThanOrEqual((1.493 * each.litres) / 74.092 + acidRoom + 1e-6);
        expect(mix.limeGPerDay * MEQ_PER_G).toBeLessThanOrEqual(each.strongest * each.litres + 1e-3);
        expect(mix.vinegarMlPerDay).toBeLessThanOrEqual(each.vinegar * each.litres + 1e-5);
        expect(alkalinityOf(means, mix)).toBeLessThanOrEqual(each.room + 1e-5);
      }),
      { numRuns: 80 },
    );
  });

  it('brings just what is wanted, or all that fits: what is missing and what is brought make the target', () => {
    fc.assert(
      fc.property(given, (each) => {
        const means = meansFor(each);
        const mix = cheapestMix(means, toBring(each.demand), solveLinear);
        expect(alkalinityOf(means, mix) + mix.shortMeqL).toBeCloseTo(each.demand, 4);
        // The supplement has no limit of its own, so only room in the water can be wanting.
        expect(mix.shortMeqL).toBeCloseTo(Math.max(0, each.demand - each.room), 4);
      }),
      { numRuns: 80 },
    );
  });

  it('is no dearer than any other mix that brings the same within the limits', () => {
    fc.assert(
      fc.property(given, fc.double({ min: 0, max: 1, noNaN: true }), (each, part) => {
        const means = meansFor({ ...each, room: 3, acid: null });
        const mix = cheapestMix(means, toBring(each.demand), solveLinear);
        // Another mix: some part of what limewater can carry, the rest by the two supplements in balance.
        const limeMost = Math.min(each.demand * 1000, each.strongest * each.litres, 40.3 * each.litres);
        const lime = part * limeMost;
        const rest = each.demand * 1000 - lime;
        const cost = (lime / MEQ_PER_G) * each.limeCost + rest * (each.alkCost + each.calCost);
        expect(mix.cost).toBeLessThanOrEqual(cost + 1e-4);
      }),
      { numRuns: 80 },
    );
  });
});
