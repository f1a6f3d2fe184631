import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { blendStrength, limeSolubility, mixLimewater } from '../../../shared/domain/limewater.ts';
import { afterAir } from '../../../shared/domain/limewater-ageing.ts';
import { USUAL_SPOON_G } from '../../../shared/domain/mixing-steps.ts';
import { strengthLeft } from '../../../shared/domain/limewater-strength.ts';
import { domainErrorOf } from '../../support/domain-error.ts';

const US_GALLON_L = 3.785411784;
const plain = { purity: 0.95, vinegarMl: 0, temperatureC: 25 };

/** A level US teaspoon of lime, g: the middle of what makers' bulk densities say. */
const TEASPOON_G = (USUAL_SPOON_G.least + USUAL_SPOON_G.most) / 2;

describe('what growers mix (common practice, no source)', () => {
  const gallon = (spoons: number, changes = {}) =>
    mixLimewater({ ...plain, waterL: US_GALLON_L, limeG: spoons * TEASPOON_G, ...changes });

  it('half a level teaspoon in a US gallon, to start with, is about a quarter of full strength and dissolves whole', () => {
    const start = gallon(0.5);
    expect(start.undissolvedG).toBe(0);
    expect(start.saturation).toBeGreaterThan(0.15);
    expect(start.saturation).toBeLessThan(0.35);
  });

  it('one teaspoon in a gallon, the usual full charge, is about half of what the water holds, and two fill it within the spoon’s error', () => {
    expect(gallon(1).saturation).toBeLessThan(0.6);
    expect(gallon(2).saturation).toBeGreaterThan(0.75);
  });

  it('six teaspoons in five gallons dissolve whole even without vinegar, so 80 mL of it dissolve nothing more', () => {
    for (const spoonG of [USUAL_SPOON_G.least, TEASPOON_G, USUAL_SPOON_G.most]) {
      const five = { ...plain, waterL: 5 * US_GALLON_L, limeG: 6 * spoonG };
      const bare = mixLimewater(five);
      const withVinegar = mixLimewater({ ...five, vinegarMl: 80 });
      expect(bare.undissolvedG).toBe(0);
      expect(withVinegar.vinegarHelps).toBe(false);
      expect(withVinegar.alkalinityMeqL).toBe(bare.alkalinityMeqL);
    }
  });

  it('80 mL of 5 % vinegar in five gallons that are full let about a tenth more dissolve', () => {
    const full = { ...plain, waterL: 5 * US_GALLON_L, limeG: 60 };
    const more = mixLimewater({ ...full, vinegarMl: 80 }).dissolvedG / mixLimewater(full).dissolvedG;
    expect(more).toBeGreaterThan(1.05);
    expect(more).toBeLessThan(1.12);
  });
});

describe('laws of mixing', () => {
  const mix = fc.record({
    limeG: fc.double({ min: 1, max: 500, noNaN: true }),
    purity: fc.double({ min: 0.5, max: 1, noNaN: true }),
    waterL: fc.double({ min: 1, max: 400, noNaN: true }),
    temperatureC: fc.double({ min: 15, max: 29, noNaN: true }),
  });
  const standing = fc.record({
    litres: fc.double({ min: 0.1, max: 500, noNaN: true }),
    alkalinityMeqL: fc.double({ min: 0, max: 60, noNaN: true }),
  });

  it('strength never falls with more lime, and never rises with warmer water', () => {
    fc.assert(
      fc.property(mix, fc.double({ min: 0, max: 1, noNaN: true }), (given, more) => {
        const strength = (changes = {}) => mixLimewater({ ...given, vinegarMl: 0, ...changes }).alkalinityMeqL;
        expect(strength({ limeG: given.limeG * (1 + more) })).toBeGreaterThanOrEqual(strength());
        expect(strength({ temperatureC: given.temperatureC + more })).toBeLessThanOrEqual(strength() + 1e-12);
        expect(limeSolubility(given.temperatureC + more)).toBeLessThanOrEqual(limeSolubility(given.temperatureC));
      }),
    );
  });

  it('what was weighed in is what dissolved and what settled', () => {
    fc.assert(
      fc.property(mix, (given) => {
        const { dissolvedG, undissolvedG } = mixLimewater({ ...given, vinegarMl: 0 });
        expect(dissolvedG + undissolvedG).toBeCloseTo(given.limeG * given.purity, 8);
      }),
    );
  });

  it('two waters make the same whichever is poured into which', () => {
    fc.assert(
      fc.property(standing, standing, (one, other) => {
        expect(blendStrength([one, other])).toBeCloseTo(blendStrength([other, one]), 10);
      }),
    );
  });
});

describe('strength left, by conductivity', () => {
  // PHREEQC 3.8.9, phreeqc.dat, 25 °C: mmol/L of calcium hydroxide and mS/cm; 20 mmol/L taken as fresh.
  it.each([
    [2, 0.95],
    [5, 2.24],
    [10, 4.21],
    [15, 6.04],
    [18, 7.09],
  ])('%d mmol/L reads %d mS/cm, against 7.77 of 20 mmol/L', (mmolL, msCm) => {
    expect(strengthLeft(msCm, 7.77)).toBeCloseTo(mmolL / 20, 2);
  });

  it('is all at the fresh reading, none at zero, and half reads 54 %', () => {
    expect(strengthLeft(9, 9)).toBeCloseTo(1, 9);
    expect(strengthLeft(9.4, 9)).toBeCloseTo(1, 9);
    expect(strengthLeft(0, 9)).toBe(0);
    expect(strengthLeft(5.4 * 0.9, 9)).toBeCloseTo(0.5, 2);
  });

  it('rises with the reading and is never above its share', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.01, max: 0.98, noNaN: true }), (ratio) => {
        expect(strengthLeft(ratio * 8 + 0.1, 8)).toBeGreaterThan(strengthLeft(ratio * 8, 8));
        expect(strengthLeft(ratio * 8, 8)).toBeLessThanOrEqual(ratio);
      }),
    );
  });

  it('when it reads far above the fresh one, is refused: the probe or the fresh reading is wrong', () => {
    expect(domainErrorOf(() => strengthLeft(12, 9)).code).toBe('domain.out_of_range');
    expect(domainErrorOf(() => strengthLeft(5, 0)).code).toBe('domain.out_of_range');
  });
});

describe('limewater that stands open', () => {
  it('loses two equivalents with each mole of carbon dioxide, as 100 g of chalk', () => {
    const aged = afterAir(50, 40, 100);
    expect(aged.alkalinityMeqL).toBeCloseTo(36, 9);
    expect(aged.lost).toBeCloseTo(0.1, 9);
    expect(aged.chalkG).toBeCloseTo(10.0086, 6);
  });

  // PHREEQC 3.8.9, phreeqc.dat, 25 °C: from 20.6 mmol/L of calcium to 0.556, alkalinity 1.11 meq/L.
  it('left until air and chalk are in balance, has lost 97.3 % and no more', () => {
    const aged = afterAir(50, 41.2, 1e6);
    expect(aged.lost).toBeCloseTo(0.973, 3);
    expect(aged.alkalinityMeqL).toBeCloseTo(1.11, 2);
  });

  it('when it is weaker than the balance already, loses nothing', () => {
    expect(afterAir(50, 0.8, 100)).toEqual({ alkalinityMeqL: 0.8, lost: 0, chalkG: 0 });
  });
});
