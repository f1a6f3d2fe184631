import { expect, it } from 'vitest';
import { readingValue } from '../../../shared/domain/reading-value.ts';
import { PARAMETERS, fromCanonical, unitsOf } from '../../../shared/domain/units.ts';

it.each(PARAMETERS.flatMap(({ code, plausible }) => unitsOf(code).map((unit) => [code, unit, plausible] as const)))(
  'readingValue: %s in %s takes its limits and nothing beyond them',
  (code, unit, { min, max }) => {
    for (const limit of [min, max]) {
      expect(readingValue(code, fromCanonical(code, limit, unit), unit).value).toBeCloseTo(limit, 6);
    }
    const beyond = fromCanonical(code, max, unit) + (fromCanonical(code, max, unit) - fromCanonical(code, min, unit));
    expect(readingValue(code, beyond, unit).problem).toMatch(/Check the value and its unit/);
    expect(readingValue(code, Number.NaN, unit).value).toBeNull();
  },
);

it('readingValue: a unit that the parameter does not have is told with those it has', () => {
  expect(readingValue('alkalinity', 8, 'mg/L').problem).toBe('Choose one of these units: meq/L, dKH, ppm, umol/kg.');
});
