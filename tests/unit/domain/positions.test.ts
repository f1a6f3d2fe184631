import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  assertPosition,
  freePositions,
  hasPosition,
  parsePosition,
  positionAt,
  positionsOf,
} from '../../../shared/domain/positions.ts';

const size = fc.record({ rows: fc.integer({ min: 1, max: 26 }), columns: fc.integer({ min: 1, max: 99 }) });

describe('positions of a rack', () => {
  it('when a rack has two rows of three, they are read row by row', () => {
    expect(positionsOf({ rows: 2, columns: 3 })).toEqual(['A-1', 'A-2', 'A-3', 'B-1', 'B-2', 'B-3']);
  });

  it('when any rack is listed, each position is its own, reads back, and belongs to the rack', () => {
    fc.assert(
      fc.property(size, (rack) => {
        const all = positionsOf(rack);
        expect(new Set(all).size).toBe(rack.rows * rack.columns);
        for (const position of all) {
          const place = parsePosition(position);
          expect(place && positionAt(place.row, place.column)).toBe(position);
          expect(hasPosition(rack, position)).toBe(true);
        }
      }),
      { numRuns: 20 },
    );
  });

  it.each(['A-0', 'A-100', 'AA-1', 'a-1', 'A1', '', '1-A', 'A-01'])(
    'when the text is %j, it is no position',
    (text) => {
      expect(parsePosition(text)).toBeNull();
    },
  );

  it.each([
    ['C-1', false],
    ['B-4', false],
    ['B-3', true],
  ])('when a rack of 2 by 3 is asked for %s, says %s', (position, has) => {
    expect(hasPosition({ rows: 2, columns: 3 }, position)).toBe(has);
    const ask = () => {
      assertPosition({ rows: 2, columns: 3 }, position, 'position');
    };
    if (has) expect(ask).not.toThrow();
    else expect(ask).toThrow('This rack goes from A-1 to B-3.');
  });

  it('when some are taken, the free ones come in order from the start', () => {
    expect(freePositions({ rows: 2, columns: 3 }, ['A-3', 'B-2'], 3, 'A-2')).toEqual(['A-2', 'B-1', 'B-3']);
    expect(freePositions({ rows: 2, columns: 3 }, [], 0)).toEqual([]);
  });

  it('when too few are free, says how many', () => {
    expect(() => freePositions({ rows: 1, columns: 3 }, ['A-1'], 3)).toThrow(
      'Only 2 positions are free from A-1 on, for 3',
    );
  });

  it('when any number is asked for, none is taken, none comes twice and none is before the start', () => {
    fc.assert(
      fc.property(size, fc.nat(2000), fc.nat(60), fc.array(fc.nat(2000)), (rack, from, count, taken) => {
        const all = positionsOf(rack);
        const start = all[from % all.length] ?? 'A-1';
        const occupied = taken.map((index) => all[index % all.length] ?? 'A-1');
        const free = all.filter((each, index) => index >= all.indexOf(start) && !occupied.includes(each));
        if (free.length < count) expect(() => freePositions(rack, occupied, count, start)).toThrow();
        else expect(freePositions(rack, occupied, count, start)).toEqual(free.slice(0, count));
      }),
      { numRuns: 60 },
    );
  });
});
