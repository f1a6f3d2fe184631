import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  salinityFromSpecificGravity,
  seawaterDensity,
  SG_SCALES,
  specificGravity,
  type SgScale,
} from '../../../shared/domain/seawater.ts';
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

const scales = Object.keys(SG_SCALES) as SgScale[]; // the keys of the table are the scales

describe('specific gravity', () => {
  // EOS-80: density of the sample over that of pure water, each at the scale's temperature.
  it.each(reference.specificGravities)('$id: S $salinity is $expected on $scale', (row) => {
    const scale = scales.find((each) => each === row.scale);
    expect(Math.abs(specificGravity(row.salinity, scale) - row.expected)).toBeLessThanOrEqual(row.tolerance);
    expect(salinityFromSpecificGravity(row.expected, scale)).toBeCloseTo(row.salinity, 4);
  });

  it.each(scales)('comes back from every salinity on %s', (scale) => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 42, noNaN: true }), (salinity) => {
        const back = salinityFromSpecificGravity(specificGravity(salinity, scale), scale);
        expect(Math.abs(back - salinity)).toBeLessThan(1e-11);
      }),
    );
  });

  it('is one for fresh water, where both are as warm', () => {
    expect(specificGravity(0)).toBe(1);
    expect(specificGravity(0, '60F/60F')).toBe(1);
    expect(salinityFromSpecificGravity(1)).toBeCloseTo(0, 12);
    expect(specificGravity(0, '20/4')).toBeLessThan(1);
  });

  it.each([0.9999, 1.0318, 35, Number.NaN])('when %d is no specific gravity of seawater, refuses', (sg) => {
    expect(domainErrorOf(() => salinityFromSpecificGravity(sg)).code).toBe('domain.out_of_range');
  });
});
