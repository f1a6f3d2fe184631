import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { allocate, type FreeBatch } from '../../../shared/domain/allocation.ts';
import { domainErrorOf } from '../../support/domain-error.ts';

const batch = (batchId: string, free: number, readyDay = '2026-10-01'): FreeBatch => ({ batchId, free, readyDay });

describe('filling an order line', () => {
  it('takes the oldest batch first and only what is wanted', () => {
    const batches = [batch('new', 30, '2026-11-01'), batch('old', 12, '2026-09-01'), batch('mid', 9, '2026-10-01')];
    expect(allocate(18, batches)).toEqual({
      picks: [
        { batchId: 'old', pieces: 12 },
        { batchId: 'mid', pieces: 6 },
      ],
      short: 0,
    });
  });

  it('when there are too few, gives all and tells what is short', () => {
    expect(allocate(30, [batch('a', 27)])).toEqual({ picks: [{ batchId: 'a', pieces: 27 }], short: 3 });
    expect(allocate(30, [])).toEqual({ picks: [], short: 30 });
  });

  it('when nothing is wanted, picks nothing', () => {
    expect(allocate(0, [batch('a', 27)])).toEqual({ picks: [], short: 0 });
  });

  it('passes over batches with nothing free, or with more held than there is', () => {
    expect(allocate(5, [batch('none', 0), batch('over', -3), batch('some', 9)]).picks).toEqual([
      { batchId: 'some', pieces: 5 },
    ]);
  });

  it('takes batches of one day in the order of their ids', () => {
    expect(allocate(3, [batch('b', 2), batch('a', 2)]).picks.map(({ batchId }) => batchId)).toEqual(['a', 'b']);
  });

  it('leaves the list it was given as it was', () => {
    const batches = [batch('b', 2, '2026-11-01'), batch('a', 2)];
    allocate(3, batches);
    expect(batches.map(({ batchId }) => batchId)).toEqual(['b', 'a']);
  });

  it.each([-1, 0.5, Number.NaN, Number.POSITIVE_INFINITY])('when %d are wanted, refuses', (wanted) => {
    expect(domainErrorOf(() => allocate(wanted, [])).code).toBe('input.invalid');
  });

  const batches = fc.uniqueArray(
    fc.record({
      batchId: fc.string({ minLength: 1, maxLength: 3 }),
      free: fc.integer({ min: -2, max: 40 }),
      readyDay: fc.constantFrom('2026-09-01', '2026-10-01', '2026-11-01'),
    }),
    { selector: ({ batchId }) => batchId, maxLength: 12 },
  );

  it('never gives more than is free or wanted, and what it gives and what is short are what was wanted', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 200 }), batches, (wanted, list) => {
        const { picks, short } = allocate(wanted, list);
        const given = picks.reduce((sum, { pieces }) => sum + pieces, 0);
        expect(given + short).toBe(wanted);
        expect(short).toBe(Math.max(0, wanted - list.reduce((sum, { free }) => sum + Math.max(0, free), 0)));
        for (const { batchId, pieces } of picks) {
          expect(pieces).toBeGreaterThan(0);
          expect(pieces).toBeLessThanOrEqual(list.find((each) => each.batchId === batchId)?.free ?? 0);
        }
        expect(new Set(picks.map(({ batchId }) => batchId)).size).toBe(picks.length);
      }),
    );
  });

  it('touches a younger batch only when every older one is used up', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 200 }), batches, (wanted, list) => {
        const { picks } = allocate(wanted, list);
        const given = (id: string) => picks.find(({ batchId }) => batchId === id)?.pieces ?? 0;
        for (const older of list) {
          const younger = list.filter(({ readyDay, batchId }) => readyDay > older.readyDay && given(batchId) > 0);
          if (younger.length > 0) expect(given(older.batchId)).toBe(Math.max(0, older.free));
        }
      }),
    );
  });

  it('gives the same whatever the order of the list', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 200 }), batches, (wanted, list) => {
        expect(allocate(wanted, [...list].reverse())).toEqual(allocate(wanted, list));
      }),
    );
  });
});
