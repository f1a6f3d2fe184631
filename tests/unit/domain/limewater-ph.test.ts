import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { mixLimewater } from '../../../shared/domain/limewater.ts';
import { limewaterPh, mixPh } from '../../../shared/domain/limewater-ph.ts';
import { domainErrorOf } from '../../support/domain-error.ts';

const temperature = fc.double({ min: 15, max: 30, noNaN: true });
const ACETIC_ACID_MOL_PER_ML = 0.05 / 60.052;

describe('pH of clear limewater', () => {
  // Bates, Bower & Smith 1956, J. Res. NBS 56:305: 12.45 at 25 °C for 0.0203 mol/L. The other temperatures are those of
  // the NBS table (Bates 1962; from memory, two PHREEQC runs agree within 0.024).
  it.each([
    [15, 12.81],
    [20, 12.627],
    [25, 12.454],
    [30, 12.289],
  ])('when saturated, at %i °C is the %d of the NBS standard within 0.03', (temperatureC, ph) => {
    expect(Math.abs(limewaterPh({ calciumMolL: 0.0203, acetateMolL: 0 }, temperatureC) - ph)).toBeLessThan(0.03);
    const full = mixLimewater({ limeG: 20, purity: 1, waterL: 1, vinegarMl: 0, temperatureC });
    expect(Math.abs(mixPh(full, temperatureC) - ph)).toBeLessThan(0.03);
  });

  // PHREEQC 3.8.9 with minteq.v4, saturated at 25 °C with 5 % vinegar; dissolved calcium in mmol/L.
  it.each([
    [0, 21.12, 12.48],
    [5, 22.93, 12.46],
    [10, 24.77, 12.45],
    [20, 28.53, 12.44],
  ])('with %i mL/L of vinegar is that of PHREEQC within 0.02', (vinegarMlPerL, calciumMmolL, ph) => {
    const acetateMolL = vinegarMlPerL * ACETIC_ACID_MOL_PER_ML;
    const found = limewaterPh({ calciumMolL: calciumMmolL / 1000, acetateMolL }, 25);
    expect(Math.abs(found - ph)).toBeLessThan(0.02);
  });

  it('of water without lime is neutral: half of pKw, which is 13.995 at 25 °C', () => {
    expect(limewaterPh({ calciumMolL: 0, acetateMolL: 0 }, 25)).toBeCloseTo(6.997, 2);
  });

  it('falls by 0.28 when saturated limewater is diluted to half (Bates, Bower & Smith 1956, dilution value)', () => {
    const full = limewaterPh({ calciumMolL: 0.0203, acetateMolL: 0 }, 25);
    const half = limewaterPh({ calciumMolL: 0.01015, acetateMolL: 0 }, 25);
    expect(full - half).toBeCloseTo(0.28, 1);
  });

  it('rises with lime and falls with warmth and with vinegar', () => {
    const strength = fc.double({ min: 0.0005, max: 0.03, noNaN: true });
    fc.assert(
      fc.property(strength, temperature, fc.double({ min: 0.05, max: 0.9, noNaN: true }), (calcium, warm, part) => {
        const ph = (calciumMolL: number, acetateMolL = 0, at = warm) => limewaterPh({ calciumMolL, acetateMolL }, at);
        expect(ph(calcium * 1.1)).toBeGreaterThan(ph(calcium));
        expect(ph(calcium, 2 * calcium * part)).toBeLessThan(ph(calcium));
        expect(ph(calcium, 0, Math.max(15, warm - 1))).toBeGreaterThanOrEqual(ph(calcium, 0, warm));
      }),
      { numRuns: 50 },
    );
  });

  it.each([
    ['more calcium than any limewater holds', { calciumMolL: 0.3, acetateMolL: 0 }, 25],
    ['calcium that is no number', { calciumMolL: Number.NaN, acetateMolL: 0 }, 25],
    ['negative acetate', { calciumMolL: 0.02, acetateMolL: -1 }, 25],
    ['water from the heater', { calciumMolL: 0.02, acetateMolL: 0 }, 60],
  ])('refuses %s', (_, water, temperatureC) => {
    expect(domainErrorOf(() => limewaterPh(water, temperatureC)).code).toBe('domain.out_of_range');
  });
});
