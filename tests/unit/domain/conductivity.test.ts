import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { conductivityOf, salinityFromConductivity, salinityOfRatio } from '../../../shared/domain/conductivity.ts';
import reference from '../../reference/seawater.json' with { type: 'json' };
import { domainErrorOf } from '../../support/domain-error.ts';

const rows = reference.conductivities.rows.map((row) => ({
  ...row,
  temperatureC: row.scale === 'IPTS-68' ? row.temperature / 1.00024 : row.temperature,
}));
const rowsOf = (...kinds: string[]) => rows.filter(({ kind }) => kinds.includes(kind));
const salinities = fc.double({ min: 0, max: 42, noNaN: true });
const temperatures = fc.double({ min: -2, max: 35, noNaN: true });

describe('practical salinity of 1978', () => {
  // UNESCO 1983, Tech. Pap. Mar. Sci. 44, p. 9: ratios at one atmosphere.
  it.each(rowsOf('sp_from_ratio', 'sp_from_Rt'))('$id: ratio $ratio at $temperature °C is S $expected', (row) => {
    expect(Math.abs(salinityOfRatio(row.ratio ?? 0, row.temperatureC) - row.expected)).toBeLessThanOrEqual(
      row.tolerance,
    );
  });

  // gsw 3.6.16 SP_from_C.
  it.each(rowsOf('sp_from_C_mScm'))('$id: $conductivityMsCm mS/cm at $temperature °C is S $expected', (row) => {
    const salinity = salinityFromConductivity(row.conductivityMsCm ?? 0, row.temperatureC);
    expect(Math.abs(salinity - row.expected)).toBeLessThanOrEqual(row.tolerance);
  });

  // gsw 3.6.16 C_from_SP.
  it.each(rowsOf('C_from_sp'))('$id: S $salinity at $temperature °C conducts $expected mS/cm', (row) => {
    expect(Math.abs(conductivityOf(row.salinity ?? 0, row.temperatureC) - row.expected)).toBeLessThanOrEqual(
      row.tolerance,
    );
  });

  it('is 35 at 42.914 mS/cm and 15 °C of 1968, by definition', () => {
    expect(salinityFromConductivity(42.914, 15 / 1.00024)).toBeCloseTo(35, 6);
  });
});

describe('there and back', () => {
  it('every salinity comes back from its conductivity', () => {
    fc.assert(
      fc.property(salinities, temperatures, (salinity, temperatureC) => {
        const back = salinityFromConductivity(conductivityOf(salinity, temperatureC), temperatureC);
        expect(Math.abs(back - salinity)).toBeLessThan(1e-11);
      }),
    );
  });

  it('more salt conducts more, and so does warmer water', () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 41, noNaN: true }), fc.double({ min: 0, max: 34, noNaN: true }), (s, t) => {
        expect(conductivityOf(s + 0.5, t)).toBeGreaterThan(conductivityOf(s, t));
        expect(conductivityOf(s + 0.5, t + 0.5)).toBeGreaterThan(conductivityOf(s + 0.5, t));
      }),
    );
  });

  it('pure water has no salt, and the extension meets the scale at 2', () => {
    expect(salinityFromConductivity(0, 25)).toBe(0);
    expect(conductivityOf(0, 25)).toBe(0);
    const at2 = conductivityOf(2, 25);
    expect(salinityFromConductivity(at2 - 1e-9, 25)).toBeCloseTo(salinityFromConductivity(at2 + 1e-9, 25), 8);
  });
});

it.each([
  ['Conductivity', -1, 25],
  ['Conductivity', 70, 25],
  ['Conductivity', Number.NaN, 25],
  ['Temperature', 50, 36],
  ['Temperature', 50, Number.NaN],
])('when %s is out of range, names it', (name, conductivity, temperature) => {
  const error = domainErrorOf(() => salinityFromConductivity(conductivity, temperature));
  expect(error.code).toBe('domain.out_of_range');
  expect(error.message).toContain(name);
});

it.each([-0.1, 42.1, Number.NaN])('when salinity is %d, refuses', (salinity) => {
  expect(domainErrorOf(() => conductivityOf(salinity, 25)).code).toBe('domain.out_of_range');
});
