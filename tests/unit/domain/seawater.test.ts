import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { salinityFromSpecificGravity, seawaterDensity, specificGravity } from '../../../shared/domain/seawater.ts';
import reference from '../../reference/seawater.json' with { type: 'json' };
import { domainErrorOf } from '../../support/domain-error.ts';

describe('density at one atmosphere', () => {
  // UNESCO 1983, Tech. Pap. Mar. Sci. 44, p. 19 and equations 13-14.
  it.each(reference.densities)('$id: S $salinity at $temperature °C ($scale)', (row) => {
    const t90 = row.scale === 'IPTS-68' ? row.temperature / 1.00024 : row.temperature;
    expect(Math.abs(seawaterDensity(row.salinity, t90) - row.expected)).toBeLessThanOrEqual(row.tolerance);
  });

  it('rises with salt and falls with warmth', () => {
    fc.assert(
      fc.property(fc.double({ min: 5, max: 41, noNaN: true }), fc.double({ min: 10, max: 39, noNaN: true }), (s, t) => {
        expect(seawaterDensity(s + 0.5, t)).toBeGreaterThan(seawaterDensity(s, t));
        expect(seawaterDensity(s, t + 0.5)).toBeLessThan(seawaterDensity(s, t));
      }),
    );
  });

  it.each([
    [-0.1, 25],
    [42.1, 25],
    [35, -2.1],
    [35, 40.1],
    [Number.NaN, 25],
    [35, Number.NaN],
  ])('when S is %d at %d °C, says where it holds', (salinity, temperature) => {
    expect(domainErrorOf(() => seawaterDensity(salinity, temperature)).code).toBe('domain.out_of_range');
  });
});

describe('specific gravity 25/25', () => {
  it.each(reference.specificGravities)('$id: S $salinity is $expected', ({ salinity, expected, tolerance }) => {
    expect(Math.abs(specificGravity(salinity) - expected)).toBeLessThanOrEqual(tolerance);
    expect(salinityFromSpecificGravity(expected)).toBeCloseTo(salinity, 4);
  });

  it('comes back from every salinity', () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 42, noNaN: true }), (salinity) => {
        expect(Math.abs(salinityFromSpecificGravity(specificGravity(salinity)) - salinity)).toBeLessThan(1e-11);
      }),
    );
  });

  it('is one for fresh water', () => {
    expect(specificGravity(0)).toBe(1);
    expect(salinityFromSpecificGravity(1)).toBe(0);
  });

  it.each([0.9999, 1.0318, 35, Number.NaN])('when %d is no specific gravity of seawater, refuses', (sg) => {
    expect(domainErrorOf(() => salinityFromSpecificGravity(sg)).code).toBe('domain.out_of_range');
  });
});
