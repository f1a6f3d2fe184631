import fc from 'fast-check';
import { expect, it } from 'vitest';
import { thinSeries } from '../../../shared/domain/thin-series.ts';

const series = fc
  .array(fc.record({ at: fc.integer({ min: 0, max: 1e9 }), value: fc.double({ min: 0, max: 20, noNaN: true }) }), {
    maxLength: 400,
  })
  .map((points) => points.sort((a, b) => a.at - b.at));

it('thinSeries: few enough points come back as they are, and never more than asked for', () => {
  fc.assert(
    fc.property(series, fc.integer({ min: 2, max: 300 }), (points, most) => {
      const thinned = thinSeries(points, most);
      expect(thinned.length).toBeLessThanOrEqual(Math.max(most, 2));
      if (points.length <= most) expect(thinned).toEqual(points);
    }),
  );
});

it('thinSeries: lowest and highest value stay, points stay in order and are never made up', () => {
  fc.assert(
    fc.property(series, fc.integer({ min: 2, max: 300 }), (points, most) => {
      const thinned = thinSeries(points, most);
      const values = (of: typeof points) => of.map(({ value }) => value);
      expect(Math.max(...values(thinned))).toBe(Math.max(...values(points)));
      expect(Math.min(...values(thinned))).toBe(Math.min(...values(points)));
      expect(thinned.every((point) => points.includes(point))).toBe(true);
      expect(thinned.every((point, index) => index === 0 || (thinned[index - 1]?.at ?? 0) <= point.at)).toBe(true);
    }),
  );
});
