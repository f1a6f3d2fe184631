import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  everydayUnitsOf,
  fromCanonical,
  MEQ_PER_DKH,
  PARAMETER_CODES,
  PARAMETERS,
  toCanonical,
  unitOf,
  unitsOf,
  UNITS,
  type Quantity,
} from '../../../shared/domain/units.ts';
import { seawaterDensity } from '../../../shared/domain/seawater.ts';
import { domainErrorOf } from '../../support/domain-error.ts';

const waters = fc.record({
  salinity: fc.double({ min: 5, max: 41, noNaN: true }),
  temperatureC: fc.double({ min: 5, max: 35, noNaN: true }),
});
const everyUnit = (Object.keys(UNITS) as Quantity[]).flatMap((quantity) =>
  unitsOf(quantity).map((unit) => ({ quantity, unit })),
);

describe('conversions', () => {
  // Alkalinity: 10 mg CaO in a litre is one German degree; factors from CIAAW weights. The rest are exact definitions.
  it.each<[Quantity, number, string, number]>([
    ['alkalinity', 1, 'dKH', 0.3566524600102],
    ['alkalinity', 8, 'dKH', 2.8532196801],
    ['alkalinity', 50.043, 'ppm', 1],
    ['alkalinity', 17.84796, 'ppm', 0.35665248],
    ['temperature', 77, 'F', 25],
    ['temperature', -40, 'F', -40],
    ['volume', 1, 'gal', 3.785411784],
    ['liquid', 128, 'fl oz', 3785.411784],
    ['mass', 1.5, 'kg', 1500],
    ['mass', 16, 'oz', 453.59237],
    ['length', 2, 'in', 50.8],
    ['salinity', 35, 'ppt', 35],
    ['ph', 8.2, 'pH', 8.2],
    ['calcium', 420, 'mg/L', 420],
    ['calcium', 10, 'mmol/L', 400.78],
    ['magnesium', 53, 'mmol/L', 1288.165],
    ['potassium', 10, 'mmol/L', 390.98],
    ['strontium', 0.1, 'mmol/L', 8.762],
    ['nitrate', 0.1, 'mmol/L', 6.2004],
    ['nitrate', 1, 'mg/L N', 62.004 / 14.007],
    ['phosphate', 0.001, 'mmol/L', 0.09497],
    ['phosphate', 10, 'ug/L P', (0.01 * 94.97) / 30.974],
    ['volume', 10, 'imp gal', 45.4609],
    ['liquid', 6, 'tsp', 29.5735295625],
    ['mass', 2, 'lb', 907.18474],
    ['length', 2.5, 'cm', 25],
  ])('%s: %d %s is stored as %d', (quantity, value, unit, canonical) => {
    expect(toCanonical(quantity, value, unit)).toBeCloseTo(canonical, 8);
  });

  it('holds one factor for dKH: 2.80385 to a meq/L, not 2.8', () => {
    expect(1 / MEQ_PER_DKH).toBeCloseTo(2.80385, 5);
    expect(fromCanonical('alkalinity', 1, 'dKH')).toBeCloseTo(2.80385, 5);
  });

  // UNESCO 1983: density of S 35 over that of pure water, both at 25 °C.
  it('shows salinity as specific gravity 25/25', () => {
    expect(fromCanonical('salinity', 35, 'sg')).toBeCloseTo(1.02637271, 7);
    expect(toCanonical('salinity', 1.02637271, 'sg')).toBeCloseTo(35, 4);
  });

  // Millero et al. 2008, Deep-Sea Res. I 55:50: the Reference Composition at S 35, per kg and per litre at 25 °C (EOS-80).
  it.each<[Quantity, number, number]>([
    ['alkalinity', 2304.374, 2.35816],
    ['calcium', 10_282.059, 421.7029],
    ['magnesium', 52_817.061, 1313.6822],
    ['potassium', 10_207.706, 408.4195],
    ['strontium', 90.701, 8.1327],
  ])('%s of reference seawater: %d µmol/kg is %d a litre', (quantity, umolKg, perLitre) => {
    expect(toCanonical(quantity, umolKg, 'umol/kg') / perLitre).toBeCloseTo(1, 4);
  });

  it('takes the water of the value where it is known', () => {
    const warm = { salinity: 33, temperatureC: 28 };
    expect(toCanonical('alkalinity', 2500, 'umol/kg', warm)).toBeCloseTo((2500 * seawaterDensity(33, 28)) / 1e6, 12);
    // gsw 3.6.16: S 35 conducts 53.07103205 mS/cm at 25 °C and 47.91804403 at 20 °C.
    expect(fromCanonical('salinity', 35, 'mS/cm')).toBeCloseTo(53.07103205, 5);
    expect(fromCanonical('salinity', 35, 'mS/cm', { salinity: 35, temperatureC: 20 })).toBeCloseTo(47.91804403, 5);
  });

  // UNESCO 1983 (EOS-80): the same water on three scales.
  it.each([
    ['sg', 1.02637271],
    ['sg 60F', 1.02685948],
    ['sg 20/4', 1.0247874],
  ])('S 35 is %s %d', (unit, expected) => {
    expect(fromCanonical('salinity', 35, unit)).toBeCloseTo(expected, 7);
  });

  it.each(everyUnit)('$quantity in $unit comes back the same', ({ quantity, unit }) => {
    const range = quantity === 'salinity' ? { min: 5, max: 41 } : { min: 0.001, max: 100_000 };
    fc.assert(
      fc.property(fc.double({ ...range, noNaN: true }), waters, (value, water) => {
        const there = fromCanonical(quantity, value, unit, water);
        // Fahrenheit has its zero elsewhere, so the size of its own number sets the rounding.
        const size = Math.max(value, quantity === 'temperature' ? 32 : 0);
        expect(Math.abs(toCanonical(quantity, there, unit, water) - value)).toBeLessThanOrEqual(1e-12 * size);
      }),
    );
  });

  it.each(everyUnit)('$quantity in $unit grows with the stored value', ({ quantity, unit }) => {
    fc.assert(
      fc.property(fc.double({ min: 1, max: 40, noNaN: true }), (value) => {
        expect(fromCanonical(quantity, value + 0.5, unit)).toBeGreaterThan(fromCanonical(quantity, value, unit));
      }),
    );
  });

  it.each(Object.keys(UNITS) as Quantity[])('%s names its canonical unit first', (quantity) => {
    expect(toCanonical(quantity, 12.5, unitsOf(quantity)[0] ?? '')).toBe(12.5);
  });

  it('tells the units that testers read in from those of laboratories', () => {
    expect(everydayUnitsOf('alkalinity')).toEqual(['meq/L', 'dKH', 'ppm']);
    expect(everydayUnitsOf('phosphate')).toEqual(['mg/L', 'ug/L P']);
  });

  it.each(['', 'dkh', 'toString', '__proto__'])('when the unit is "%s", lists the ones to choose', (unit) => {
    const error = domainErrorOf(() => unitOf('alkalinity', unit));
    expect(error.code).toBe('input.invalid');
    expect(error.message).toContain('meq/L, dKH, ppm');
  });
});

describe('parameters', () => {
  it('are the eight readings, each once', () => {
    expect(PARAMETERS.map(({ code }) => code)).toEqual(PARAMETER_CODES);
  });

  it.each(PARAMETERS)('$code: the band lies within what is plausible, and a test can tell it', (parameter) => {
    const { plausible, band, testSd, quantity, unit } = parameter;
    expect(plausible.min).toBeLessThan(band.min);
    expect(band.min).toBeLessThan(band.max);
    expect(band.max).toBeLessThan(plausible.max);
    expect(testSd).toBeGreaterThan(0);
    expect(testSd).toBeLessThan(band.max - band.min);
    expect(unitsOf(quantity)[0]).toBe(unit);
  });

  it.each(PARAMETERS)('$code: every unit can show all that is plausible', ({ quantity, plausible }) => {
    for (const unit of unitsOf(quantity)) {
      for (const value of [plausible.min, plausible.max]) {
        expect(Number.isFinite(fromCanonical(quantity, value, unit))).toBe(true);
      }
    }
  });
});
