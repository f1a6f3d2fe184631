import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { ewmaChart, individualsChart, type RunRule, runSignals } from '../../../shared/domain/control-charts.ts';
import reference from '../../reference/control-charts.json' with { type: 'json' };

describe('individuals and moving range (NIST/SEMATECH e-Handbook 6.3.2.2)', () => {
  const { x, published, computed } = reference.individuals;
  const chart = individualsChart(x);

  it('has the limits that the handbook prints for its flow rates', () => {
    expect(chart.mean).toBeCloseTo(published.mean, 10);
    expect(chart.meanMovingRange).toBeCloseTo(published.mr_bar, 4);
    expect(chart.high).toBeCloseTo(published.ucl, 4);
    expect(chart.low).toBeCloseTo(published.lcl, 4);
  });

  it('has the moving ranges and their limit', () => {
    computed.mr.forEach((range, index) => expect(chart.movingRanges[index]).toBeCloseTo(range, 9));
    expect(chart.sigma).toBeCloseTo(computed.with_table_constants.sigma, 9);
    expect(chart.movingRangeHigh).toBeCloseTo(computed.with_table_constants.ucl_mr, 9);
  });
});

describe('EWMA (NIST/SEMATECH e-Handbook 6.3.2.4)', () => {
  const { x, published, computed } = reference.ewma;
  const points = ewmaChart(x, { target: computed.target, sigma: computed.sigma, weight: computed.lambda_ });

  it('has the averages that the handbook prints, to its two decimals', () => {
    const printed = published.ewma_2dp_incl_start.slice(1);

    expect(points).toHaveLength(printed.length);
    // The handbook carries rounded values on, so the last printed figure may be one off.
    points.forEach(({ value }, index) => expect(Math.abs(value - (printed[index] ?? 0))).toBeLessThan(0.0101));
  });

  it('has the averages and the widening limits worked out exactly', () => {
    points.forEach(({ value, low, high }, index) => {
      expect(value).toBeCloseTo(computed.ewma[index] ?? Number.NaN, 9);
      expect(low).toBeCloseTo(computed.exact_limits[index]?.[0] ?? Number.NaN, 9);
      expect(high).toBeCloseTo(computed.exact_limits[index]?.[1] ?? Number.NaN, 9);
    });
    expect(points.at(-1)?.high).toBeCloseTo(published.ucl, 3);
  });

  it('finds all in control, as the handbook does, and a lasting shift soon', () => {
    expect(points.filter(({ isOut }) => isOut)).toEqual([]);
    const shifted = ewmaChart([...x, 54, 54, 54, 54], { target: 50, sigma: computed.sigma });
    expect(shifted.at(-1)?.isOut).toBe(true);
  });
});

describe('zone rules (Western Electric 1956)', () => {
  const NAMES: Record<RunRule, string> = {
    'beyond 3 sigma': 'WE1_beyond_3s',
    '2 of 3 beyond 2 sigma': 'WE2_2of3_beyond_2s_current',
    '4 of 5 beyond 1 sigma': 'WE3_4of5_beyond_1s_current',
    '8 on one side': 'WE4_8_same_side',
  };

  it.each(reference.runRules.cases.map((each) => [each.id, each] as const))(
    'are met where they should be: %s',
    (_, each) => {
      const found = runSignals(each.z, { mean: 0, sigma: 1 });
      const expected: Record<string, readonly number[]> = each.signals_at_1_based_index;

      for (const [rule, name] of Object.entries(NAMES)) {
        const at = found.filter((signal) => signal.rule === rule).map(({ index }) => index + 1);
        expect(at).toEqual(expected[name]);
      }
    },
  );

  it('are the same for any mean and sigma', () => {
    fc.assert(
      fc.property(
        fc.array(fc.integer({ min: -35, max: 35 }), { maxLength: 30 }),
        fc.integer({ min: -50, max: 50 }),
        (tenths, mean) => {
          const plain = runSignals(tenths, { mean: 0, sigma: 10 });
          const moved = runSignals(
            tenths.map((value) => value * 4 + mean),
            { mean, sigma: 40 },
          );
          expect(moved).toEqual(plain);
        },
      ),
    );
  });
});

describe('what cannot be charted', () => {
  it('is refused: a single value, no spread, no weight', () => {
    expect(() => individualsChart([3])).toThrow('two values or more');
    expect(() => individualsChart([3, Number.NaN])).toThrow('two values or more');
    expect(() => ewmaChart([1, 2], { target: 1, sigma: 0 })).toThrow('sigma above 0');
    expect(() => ewmaChart([1, 2], { target: 1, sigma: 1, weight: 0 })).toThrow('above 0');
  });
});
