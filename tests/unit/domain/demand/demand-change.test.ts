import { describe, expect, it } from 'vitest';
import { demandChange } from '../../../../shared/domain/demand/demand-change.ts';
import { day } from '../../../support/demand-data.ts';

const facts = { before: { value: 0.4, sd: 0.01 }, now: { value: 0.5, sd: 0.01 }, since: day(0), until: day(14) };

describe('demand two weeks ago and now', () => {
  // 1.96 × √(0.01² + 0.01² + (0.4 × 0.02 × 2)²), the last being growth that is not known.
  it('when it rose by more than tests and growth explain, went up', () => {
    const change = demandChange(facts);

    expect(change).toMatchObject({ direction: 'up', before: 0.4, now: 0.5, expected: 0.4, since: 0 });
    expect(change.half).toBeCloseTo(0.04186, 4);
  });

  it('when it rose by less, stayed', () => {
    expect(demandChange({ ...facts, now: { value: 0.43, sd: 0.01 } }).direction).toBe('none');
  });

  it('when pieces came in proportion, is explained', () => {
    expect(demandChange({ ...facts, stock: { before: 400, now: 500 } })).toMatchObject({
      direction: 'none',
      expected: 0.5,
    });
  });

  it('when half of the pieces were sold and demand fell by half, is explained; when it stayed, is not', () => {
    const sold = { ...facts, now: { value: 0.2, sd: 0.01 }, stock: { before: 400, now: 200 } };

    expect(demandChange(sold).direction).toBe('none');
    expect(demandChange({ ...sold, stock: { before: 400, now: 400 } }).direction).toBe('down');
  });

  it('when no pieces stood there before, is not compared with them', () => {
    expect(demandChange({ ...facts, stock: { before: 0, now: 500 } }).expected).toBe(0.4);
  });
});
