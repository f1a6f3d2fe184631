import { expect, it } from 'vitest';
import { testErrorOf } from '../../../shared/domain/test-error.ts';
import { PARAMETER_CODES, toCanonical, unitsOf } from '../../../shared/domain/units.ts';
import { USUAL_METHODS } from '../../../shared/domain/usual-methods.ts';

it('every parameter has a usual method, named once, read in one of its own units', () => {
  for (const code of PARAMETER_CODES) expect(USUAL_METHODS.some(({ parameter }) => parameter === code)).toBe(true);
  for (const { parameter, unit } of USUAL_METHODS) expect(unitsOf(parameter)).toContain(unit);
  expect(new Set(USUAL_METHODS.map(({ parameter, name }) => `${parameter} ${name}`)).size).toBe(USUAL_METHODS.length);
});

it('a usual method of alkalinity errs as readings in its words do: a photometer by ± 0.3 dKH', () => {
  for (const { parameter, name, repeatabilitySd } of USUAL_METHODS.filter((each) => each.parameter === 'alkalinity')) {
    expect(repeatabilitySd).toBe(testErrorOf(parameter, name).sd);
  }
  const photometer = USUAL_METHODS.find(({ name }) => name === 'Photometer');
  expect((photometer?.repeatabilitySd ?? 0) * 1.96).toBeCloseTo(toCanonical('alkalinity', 0.3, 'dKH'), 9);
});
