import { describe, expect, it } from 'vitest';
import { testErrorOf } from '../../../shared/domain/test-error.ts';
import { MEQ_PER_DKH, PARAMETERS } from '../../../shared/domain/units.ts';

describe('testErrorOf', () => {
  // A photometer states ±0.3 dKH; titration and drops are common practice, no source.
  it.each([
    ['Photometer', 'photometer', 0.3],
    ['colorimeter, lot 12', 'photometer', 0.3],
    ['Syringe titration', 'titration', 0.2],
    ['drop titration kit', 'drop-count test', 0.4],
  ])('alkalinity by %s has the error of a %s, ± %f dKH', (written, method, half) => {
    const error = testErrorOf('alkalinity', written);
    expect(error.method).toBe(method);
    expect(error.half / MEQ_PER_DKH).toBeCloseTo(half, 9);
  });

  it('when the method is not known, the usual error of the parameter is taken', () => {
    for (const { code, testSd } of PARAMETERS) {
      expect(testErrorOf(code, '')).toMatchObject({ sd: testSd, method: 'usual test' });
    }
    expect(testErrorOf('calcium', 'Photometer').method).toBe('usual test');
  });

  it('half of the interval is 1.96 standard deviations, whatever the method', () => {
    for (const written of ['', 'Photometer', 'drops', 'titrator']) {
      const { sd, half } = testErrorOf('alkalinity', written);
      expect(half / sd).toBeCloseTo(1.96, 9);
    }
  });
});
