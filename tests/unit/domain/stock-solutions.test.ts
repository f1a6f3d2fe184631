import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  POWDER_CODES,
  POWDERS,
  powderBrings,
  powderFor,
  powderMolarMass,
  recipeConflict,
  solutionStrength,
  undissolvedParts,
  type PowderCode,
} from '../../../shared/domain/stock-solutions.ts';
import { MEQ_PER_DKH } from '../../../shared/domain/units.ts';
import { domainErrorOf } from '../../support/domain-error.ts';

const US_GALLON_L = 3.785411784;
const part = (powder: PowderCode, grams: number, purity = 1) => ({ powder, grams, purity });
const anyPowder = fc.constantFrom(...POWDER_CODES);

describe('molar masses', () => {
  // Sums of CIAAW abridged standard atomic weights, as handbooks print them.
  it.each([
    ['sodium_bicarbonate', 84.007],
    ['sodium_carbonate', 105.988],
    ['calcium_chloride_dihydrate', 147.01],
    ['calcium_chloride_anhydrous', 110.98],
    ['magnesium_chloride_hexahydrate', 203.3],
    ['magnesium_sulfate_heptahydrate', 246.47],
  ] as const)('%s weighs %d g/mol', (powder, expected) => {
    expect(Math.abs(powderMolarMass(powder) - expected)).toBeLessThan(0.01);
  });
});

describe('published recipes', () => {
  // Holmes-Farley 2006, two-part recipe: 594 g of sodium bicarbonate in a US gallon make 1,870 meq/L (5,230 dKH).
  it('594 g of sodium bicarbonate a gallon make 1,870 meq/L, baked or not', () => {
    for (const powder of ['sodium_bicarbonate', 'baked_bicarbonate'] as const) {
      const { alkalinityMeq } = solutionStrength([part(powder, 594)], US_GALLON_L);
      expect(Math.abs(alkalinityMeq / 1870 - 1)).toBeLessThan(0.002);
    }
  });

  // The same: its calcium part has 141 g of calcium in a gallon, 37,250 mg/L.
  it('141 g of calcium a gallon, as dihydrate, make 37,250 mg/L', () => {
    const grams = powderFor('calcium_chloride_dihydrate', 'calciumMg', 141_000) ?? 0;
    const { calciumMg } = solutionStrength([part('calcium_chloride_dihydrate', grams)], US_GALLON_L);
    expect(Math.abs(calciumMg / 37_250 - 1)).toBeLessThan(0.002);
  });

  // Computed from the molar masses: what 1 dKH in 1,000 L takes, and the calcium chloride of the same CaCO3.
  it('1 dKH in 1,000 L is 30.0 g of bicarbonate, or 18.9 g of carbonate with 26.2 g of calcium chloride', () => {
    const meq = 1000 * MEQ_PER_DKH;
    expect(powderFor('sodium_bicarbonate', 'alkalinityMeq', meq)).toBeCloseTo(30.0, 1);
    expect(powderFor('sodium_carbonate', 'alkalinityMeq', meq)).toBeCloseTo(18.9, 1);
    const calciumMg = (meq / 2) * 40.078;
    expect(powderFor('calcium_chloride_dihydrate', 'calciumMg', calciumMg)).toBeCloseTo(26.2, 1);
  });

  it('at those strengths calcium and alkalinity keep the 20.04 mg a meq of calcium carbonate', () => {
    const alkalinity = solutionStrength([part('baked_bicarbonate', 594)], US_GALLON_L).alkalinityMeq;
    expect(Math.abs(37_250 / alkalinity / 20.039 - 1)).toBeLessThan(0.01);
  });
});

describe('strength', () => {
  it('is proportional to grams and purity and falls with the volume, for every powder', () => {
    fc.assert(
      fc.property(
        ...([anyPowder, fc.double({ min: 0.1, max: 1e4, noNaN: true })] as const),
        ...([fc.double({ min: 0.05, max: 1, noNaN: true }), fc.double({ min: 0.1, max: 100, noNaN: true })] as const),
        (powder, grams, purity, litres) => {
          const one = solutionStrength([part(powder, grams, purity)], litres);
          const perG = powderBrings(powder);
          for (const key of ['alkalinityMeq', 'calciumMg', 'magnesiumMg'] as const) {
            const expected = (perG[key] * grams * purity) / litres;
            expect(Math.abs(one[key] - expected)).toBeLessThanOrEqual(1e-9 * Math.max(1, expected));
          }
        },
      ),
    );
  });

  it('when powders share a solution, what they bring adds up', () => {
    const parts = [part('magnesium_chloride_hexahydrate', 200), part('magnesium_sulfate_heptahydrate', 50)];
    const alone = parts.map((each) => solutionStrength([each], 2).magnesiumMg);
    expect(solutionStrength(parts, 2).magnesiumMg).toBeCloseTo((alone[0] ?? 0) + (alone[1] ?? 0), 9);
  });

  it('weighing for an amount and asking what that brings comes back to the amount', () => {
    fc.assert(
      fc.property(anyPowder, fc.double({ min: 1, max: 1e6, noNaN: true }), (powder, amount) => {
        for (const key of ['alkalinityMeq', 'calciumMg', 'magnesiumMg'] as const) {
          const grams = powderFor(powder, key, amount, 0.97);
          if (grams === null) expect(powderBrings(powder)[key]).toBe(0);
          else expect(solutionStrength([part(powder, grams, 0.97)], 1)[key]).toBeCloseTo(amount, 4);
        }
      }),
    );
  });

  it.each([
    ['no water', 0, 10, 1],
    ['no powder', 1, 0, 1],
    ['more than pure', 1, 10, 1.01],
    ['a number that is none', Number.NaN, 10, 1],
  ])('when it has %s, is refused', (_name, litres, grams, purity) => {
    expect(domainErrorOf(() => solutionStrength([part('sodium_carbonate', grams, purity)], litres)).code).toBe(
      'domain.out_of_range',
    );
  });
});

describe('what does not go together', () => {
  it.each([
    [['sodium_bicarbonate', 'calcium_chloride_dihydrate'], 'chalk'],
    [['sodium_carbonate', 'magnesium_chloride_hexahydrate'], 'chalk'],
    [['calcium_chloride_anhydrous', 'magnesium_sulfate_heptahydrate'], 'gypsum'],
  ] as [PowderCode[], string][])('%j makes %s', (powders, word) => {
    expect(recipeConflict(powders)).toContain(word);
  });

  it.each([
    [['magnesium_chloride_hexahydrate', 'magnesium_sulfate_heptahydrate']],
    [['sodium_bicarbonate', 'sodium_carbonate']],
    [['calcium_chloride_dihydrate', 'magnesium_chloride_hexahydrate']],
  ] as [PowderCode[]][])('%j may share a bottle', (powders) => {
    expect(recipeConflict(powders)).toBeNull();
  });
});

describe('solubility', () => {
  // 594 g a gallon is 157 g/L: beyond the 96 g/L of bicarbonate at 20 °C (handbook, from memory), within that of carbonate.
  it('when the published recipe is not baked, some of it stays undissolved; baked it dissolves', () => {
    expect(undissolvedParts([part('sodium_bicarbonate', 594)], US_GALLON_L)).toMatchObject([
      { powder: 'sodium_bicarbonate', solubilityGPerL: 96 },
    ]);
    expect(undissolvedParts([part('baked_bicarbonate', 594)], US_GALLON_L)).toEqual([]);
  });

  it('every powder has one', () => {
    for (const powder of POWDER_CODES) expect(POWDERS[powder].solubilityGPerL).toBeGreaterThan(0);
  });
});
