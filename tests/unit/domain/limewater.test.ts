import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  blendStrength,
  limeForStrength,
  limeSolubility,
  limewaterCeiling,
  mixLimewater,
  type LimewaterMix,
} from '../../../shared/domain/limewater.ts';
import { MEQ_PER_DKH } from '../../../shared/domain/units.ts';
import { domainErrorOf } from '../../support/domain-error.ts';

/** A full drum of plenty: 40 L, pure lime to spare, 25 °C, no vinegar. */
function aMix(changes: Partial<LimewaterMix> = {}): LimewaterMix {
  return { limeG: 100, purity: 1, waterL: 40, temperatureC: 25, vinegarMl: 0, ...changes };
}

const temperature = fc.double({ min: 15, max: 30, noNaN: true });
const anyMix = fc.record({
  limeG: fc.double({ min: 1, max: 500, noNaN: true }),
  purity: fc.double({ min: 0.5, max: 1, noNaN: true }),
  waterL: fc.double({ min: 1, max: 400, noNaN: true }),
  temperatureC: temperature,
  vinegarMl: fc.double({ min: 0, max: 40, noNaN: true }),
});

describe('solubility of lime', () => {
  // Bates, Bower & Smith 1956, J. Res. NBS 56(6):305: 0.0203 mol/L at 25 °C, 1.504 g/L; the models spread 3 %.
  it('at 25 °C is that of NBS within 3 %', () => {
    expect(Math.abs(limeSolubility(25) / 1.504 - 1)).toBeLessThan(0.03);
  });

  // PHREEQC 3.8.9 with Thermoddem; and Perry's handbook (from memory) within the 8 % that sources spread.
  it.each([
    [15, 1.58, 0.003],
    [20, 1.538, 0.003],
    [25, 1.493, 0.003],
    [30, 1.447, 0.003],
    [20, 1.65, 0.08],
    [30, 1.53, 0.08],
  ])('at %i °C is %d g/L within a part of %d', (temperatureC, expected, tolerance) => {
    expect(Math.abs(limeSolubility(temperatureC) / expected - 1)).toBeLessThan(tolerance);
  });

  it('is twice what the bare solubility product would say: (Ksp/4)^(1/3) is no use here', () => {
    const naive = Math.cbrt(5.02e-6 / 4) * 74.092;
    expect(limeSolubility(25) / naive).toBeGreaterThan(1.8);
  });

  it('falls as the water warms', () => {
    fc.assert(
      fc.property(temperature, temperature, (a, b) => {
        fc.pre(b - a > 1e-6);
        expect(limeSolubility(a)).toBeGreaterThan(limeSolubility(b));
      }),
    );
  });

  it.each([14.9, 30.1, Number.NaN])('when the water has %d °C, says where it holds', (temperatureC) => {
    const error = domainErrorOf(() => limeSolubility(temperatureC));
    expect(error.code).toBe('domain.out_of_range');
    expect(error.message).toContain('between 15 and 30');
  });
});

describe('a mix', () => {
  it('with lime to spare is saturated and leaves the rest', () => {
    const mix = mixLimewater(aMix());
    expect(mix.dissolvedG).toBeCloseTo(59.72, 2);
    expect(mix.undissolvedG).toBeCloseTo(40.28, 2);
    expect(mix).toMatchObject({ saturation: 1, shortOf: 'solubility', vinegarHelps: false });
  });

  // 1.493 g/L: 40.3 meq/L. Trade figures for a full 1.5 g/L: 40.5 meq/L, about 114 dKH, 810 mg/L calcium.
  it('that is saturated has the strength growers quote', () => {
    const mix = mixLimewater(aMix());
    expect(mix.alkalinityMeqL).toBeCloseTo(40.3, 1);
    expect(Math.abs(mix.alkalinityMeqL / MEQ_PER_DKH / 114 - 1)).toBeLessThan(0.01);
    expect(Math.abs(mix.calciumMgL / 810 - 1)).toBeLessThan(0.01);
  });

  it('brings alkalinity and calcium in the ratio of the skeleton, 20.04 mg for each meq', () => {
    fc.assert(
      fc.property(anyMix, (mix) => {
        const { calciumMgL, alkalinityMeqL } = mixLimewater({ ...mix, vinegarMl: 0 });
        expect(calciumMgL / alkalinityMeqL).toBeCloseTo(20.039, 3);
      }),
    );
  });

  // 40 g of 95 % lime is 38 g of hydroxide: 0.51288 mol, 25.644 meq/L in 40 L; worked by hand.
  it('with little lime dissolves all of it', () => {
    const mix = mixLimewater(aMix({ limeG: 40, purity: 0.95 }));
    expect(mix.alkalinityMeqL).toBeCloseTo(25.644, 3);
    expect(mix).toMatchObject({ shortOf: 'lime', undissolvedG: 0, vinegarHelps: false });
    expect(mix.saturation).toBeCloseTo(38 / 59.72, 6);
    expect(mix.limeToSaturateG).toBeCloseTo(62.863, 3);
  });

  it('without lime is plain water', () => {
    expect(mixLimewater(aMix({ limeG: 0 }))).toMatchObject({ alkalinityMeqL: 0, calciumMgL: 0, saturation: 0 });
  });

  it('never dissolves more than was weighed in, nor more than there is room for', () => {
    fc.assert(
      fc.property(anyMix, (mix) => {
        fc.pre((2 * mix.limeG * mix.purity) / 74.092 > (mix.vinegarMl * 0.05) / 60.052);
        const result = mixLimewater(mix);
        expect(result.dissolvedG + result.undissolvedG).toBeCloseTo(mix.limeG * mix.purity, 9);
        expect(result.undissolvedG).toBeGreaterThanOrEqual(0);
        expect(result.saturation).toBeGreaterThan(0);
        expect(result.saturation).toBeLessThanOrEqual(1);
        expect(result.alkalinityNowMeqL).toBeLessThanOrEqual(result.alkalinityMeqL);
        expect(result.alkalinityNowMeqL).toBeGreaterThan(0);
      }),
    );
  });

  it('with just the lime to saturate is saturated with nothing left', () => {
    fc.assert(
      fc.property(anyMix, (mix) => {
        const full = mixLimewater({ ...mix, limeG: mixLimewater({ ...mix, limeG: 500 }).limeToSaturateG });
        expect(full.saturation).toBeCloseTo(1, 9);
        expect(full.undissolvedG).toBeCloseTo(0, 6);
      }),
    );
  });
});

describe('vinegar in a mix', () => {
  // PHREEQC 3.8.9, minteq.v4 with CaCH3COO+: extra lime in mg for each mL of 5 % vinegar, 20–30 °C and 5–20 mL/L,
  // two databases together 26.2–27.5.
  it.each([
    [20, 5],
    [25, 10],
    [30, 20],
  ])('at %i °C and %i mL/L lets 26.2 to 27.5 mg more dissolve for each mL', (temperatureC, mlPerL) => {
    const plain = mixLimewater(aMix({ temperatureC }));
    const sour = mixLimewater(aMix({ temperatureC, vinegarMl: mlPerL * 40 }));
    const extra = ((sour.dissolvedG - plain.dissolvedG) * 1000) / (mlPerL * 40);
    expect(extra).toBeGreaterThanOrEqual(26.2);
    expect(extra).toBeLessThanOrEqual(27.5);
    expect(sour.vinegarHelps).toBe(true);
  });

  it('when the water alone would hold all the lime, dissolves nothing more and says so', () => {
    const plain = mixLimewater(aMix({ limeG: 40 }));
    const sour = mixLimewater(aMix({ limeG: 40, vinegarMl: 160 }));
    expect(sour.alkalinityMeqL).toBe(plain.alkalinityMeqL);
    expect(sour.vinegarHelps).toBe(false);
  });

  // Water alone holds 59.72 g; 400 mL add room for 10.7 g. 65 g is between the two: all dissolves, thanks to the vinegar.
  it.each([
    [59, false],
    [60, true],
    [65, true],
  ])('with %i g of lime in 40 L, helps: %s', (limeG, helps) => {
    const mix = mixLimewater(aMix({ limeG, vinegarMl: 400 }));
    expect(mix).toMatchObject({ vinegarHelps: helps, shortOf: 'lime', undissolvedG: 0 });
  });

  // 160 mL of 5 % in 40 L: 8 g, 0.13322 mol, 3.3305 meq/L of acetate that comes only when bacteria have oxidised it.
  it('holds back the part that comes as acetate', () => {
    const mix = mixLimewater(aMix({ vinegarMl: 160 }));
    expect(mix.alkalinityMeqL - mix.alkalinityNowMeqL).toBeCloseTo(3.3305, 3);
  });

  it('of double acidity counts double', () => {
    const usual = mixLimewater(aMix({ vinegarMl: 200 }));
    expect(mixLimewater(aMix({ vinegarMl: 100, acidPercent: 10 }))).toEqual(usual);
    expect(mixLimewater(aMix({ vinegarMl: 200, acidPercent: 5 }))).toEqual(usual);
  });

  it('when it would use up the lime, is refused: the clear solution must stay alkaline', () => {
    const error = domainErrorOf(() => mixLimewater(aMix({ limeG: 5, vinegarMl: 400 })));
    expect(error.code).toBe('domain.out_of_range');
    expect(error.message).toContain('less vinegar');
  });
});

describe('what makes no mix', () => {
  it.each([
    ['no water', { waterL: 0 }],
    ['negative water', { waterL: -1 }],
    ['endless water', { waterL: Number.POSITIVE_INFINITY }],
    ['negative lime', { limeG: -1 }],
    ['lime that is no number', { limeG: Number.NaN }],
    ['negative vinegar', { vinegarMl: -1 }],
    ['purity zero', { purity: 0 }],
    ['purity in percent', { purity: 95 }],
    ['acidity above all', { acidPercent: 101 }],
    ['water from the heater', { temperatureC: 60 }],
  ] satisfies [string, Partial<LimewaterMix>][])('refuses %s', (_, changes) => {
    expect(domainErrorOf(() => mixLimewater(aMix(changes))).code).toBe('domain.out_of_range');
  });
});

describe('lime for a strength', () => {
  it('gives a mix of just that strength', () => {
    fc.assert(
      fc.property(anyMix, fc.double({ min: 0.2, max: 1, noNaN: true }), (wanted, part) => {
        const strongest = mixLimewater({ ...wanted, limeG: 1000 }).alkalinityMeqL;
        const alkalinityMeqL = strongest * part;
        fc.pre(alkalinityMeqL * wanted.waterL > (wanted.vinegarMl * 50) / 60.052 + 1e-6);
        const limeG = limeForStrength({ ...wanted, alkalinityMeqL });
        expect(mixLimewater({ ...wanted, limeG }).alkalinityMeqL).toBeCloseTo(alkalinityMeqL, 8);
      }),
    );
  });

  it('when the water cannot hold so much, says what it can hold', () => {
    const error = domainErrorOf(() => limeForStrength({ ...aMix(), alkalinityMeqL: 45 }));
    expect(error.code).toBe('domain.out_of_range');
    expect(error.message).toContain('40.3 meq/L');
  });

  it('with vinegar holds what plain water could not', () => {
    expect(limeForStrength({ ...aMix({ vinegarMl: 400 }), alkalinityMeqL: 45 })).toBeGreaterThan(60);
  });

  it('when the vinegar would eat so little lime, refuses', () => {
    expect(domainErrorOf(() => limeForStrength({ ...aMix({ vinegarMl: 400 }), alkalinityMeqL: 2 })).code).toBe(
      'domain.out_of_range',
    );
  });
});

describe('what stands in a reservoir', () => {
  it('after topping up is the mean by litres', () => {
    const strength = blendStrength([
      { litres: 10, alkalinityMeqL: 30 },
      { litres: 30, alkalinityMeqL: 40 },
    ]);
    expect(strength).toBe(37.5);
  });

  it('when it is empty has no strength', () => {
    expect(blendStrength([])).toBe(0);
    expect(blendStrength([{ litres: 0, alkalinityMeqL: 40 }])).toBe(0);
  });

  it('lies between the weakest and the strongest part', () => {
    const part = fc.record({
      litres: fc.double({ min: 0.1, max: 500, noNaN: true }),
      alkalinityMeqL: fc.double({ min: 0, max: 60, noNaN: true }),
    });
    fc.assert(
      fc.property(fc.array(part, { minLength: 1, maxLength: 6 }), (parts) => {
        const strengths = parts.map(({ alkalinityMeqL }) => alkalinityMeqL);
        expect(blendStrength(parts)).toBeGreaterThanOrEqual(Math.min(...strengths) - 1e-9);
        expect(blendStrength(parts)).toBeLessThanOrEqual(Math.max(...strengths) + 1e-9);
      }),
    );
  });
});

describe('the ceiling by evaporation', () => {
  // Arithmetic of the trade: 1 % of the volume a day at full strength is 1.14 dKH a day, 2 % is 2.28.
  it.each([
    [20, 2000, 1.14],
    [40, 2000, 2.28],
    [44, 3400, 1.48],
  ])('%i L a day into %i L is %d dKH a day', (evaporation, volume, dkh) => {
    expect(limewaterCeiling(evaporation, 114 * MEQ_PER_DKH, volume) / MEQ_PER_DKH).toBeCloseTo(dkh, 2);
  });

  it.each([
    [-1, 40, 1000],
    [10, -1, 1000],
    [10, 40, 0],
    [10, 40, Number.NaN],
  ])('refuses %d L a day of %d meq/L into %d L', (evaporation, strength, volume) => {
    expect(domainErrorOf(() => limewaterCeiling(evaporation, strength, volume)).code).toBe('domain.out_of_range');
  });
});
