import { expect, it } from 'vitest';
import { readTime } from '../../../server/services/reading-import/read-time.ts';
import { ZoneClock } from '../../../server/services/reading-import/zone-clock.ts';

const lisbon = new ZoneClock('Europe/Lisbon');

it.each([
  ['2026-03-12T08:30Z', 'ymd', '2026-03-12T08:30:00Z'],
  ['2026-03-12T08:30:15+02:00', 'ymd', '2026-03-12T06:30:15Z'],
  ['2026-03-12 08:30', 'ymd', '2026-03-12T08:30:00Z'],
  ['2026-07-12 08:30', 'ymd', '2026-07-12T07:30:00Z'],
  ['2026/3/2', 'ymd', '2026-03-02T12:00:00Z'],
  ['12.03.2026 08:30', 'dmy', '2026-03-12T08:30:00Z'],
  ['3/12/26 8:30 PM', 'mdy', '2026-03-12T20:30:00Z'],
  ['12/03/2026, 12:05 am', 'dmy', '2026-03-12T00:05:00Z'],
] as const)('when a file says %s (%s), reads %s in Lisbon', (text, order, expected) => {
  expect(readTime(text, order, lisbon)).toEqual({ at: Date.parse(expected), jump: null });
});

it.each(['', 'yesterday', '2026-02-30', '31/02/2026', '2026-03-12 25:00', '2026-03-12 8', '13:00', '1e9'])(
  'when a file says “%s”, there is no time in it',
  (text) => {
    expect(readTime(text, 'dmy', lisbon)).toBeNull();
  },
);

// Summer time in Lisbon begins on 29 March 2026 at 01:00 UTC and ends on 25 October 2026 at 01:00 UTC (EU Directive 2000/84/EC).
it.each([
  ['2026-03-29 00:59', '2026-03-29T00:59:00Z', null],
  ['2026-03-29 01:00', '2026-03-29T01:00:00Z', 'skipped'],
  ['2026-03-29 01:30', '2026-03-29T01:00:00Z', 'skipped'],
  ['2026-03-29 02:00', '2026-03-29T01:00:00Z', null],
  ['2026-10-25 00:59', '2026-10-24T23:59:00Z', null],
  ['2026-10-25 01:30', '2026-10-25T00:30:00Z', 'twice'],
  ['2026-10-25 02:00', '2026-10-25T02:00:00Z', null],
] as const)('when the clocks are changed, %s is %s (%s)', (text, expected, jump) => {
  expect(readTime(text, 'ymd', lisbon)).toEqual({ at: Date.parse(expected), jump });
});

it('when a time names its own offset, the clocks of the file do not matter', () => {
  const expected = { at: Date.parse('2026-03-29T01:30:00Z'), jump: null };
  expect(readTime('2026-03-29T01:30Z', 'ymd', lisbon)).toEqual(expected);
  expect(readTime('2026-03-29 11:30 +10:00', 'ymd', new ZoneClock('America/New_York'))).toEqual(expected);
});

it('when a zone is chosen, times are by its clocks', () => {
  const { at } = readTime('2026-07-01 08:00', 'ymd', new ZoneClock('America/New_York')) ?? { at: 0 };
  expect(at).toBe(Date.parse('2026-07-01T12:00:00Z'));
});
