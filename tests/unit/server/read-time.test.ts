import { expect, it } from 'vitest';
import { readTime } from '../../../server/services/reading-import/read-time.ts';

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
  expect(readTime(text, order, 'Europe/Lisbon')).toBe(Date.parse(expected));
});

it.each(['', 'yesterday', '2026-02-30', '31/02/2026', '2026-03-12 25:00', '2026-03-12 8', '13:00', '1e9'])(
  'when a file says “%s”, there is no time in it',
  (text) => {
    expect(readTime(text, 'dmy', 'Europe/Lisbon')).toBeNull();
  },
);

it('when the clocks skip the time, takes the moment after the jump', () => {
  expect(readTime('2026-03-29 01:30', 'ymd', 'Europe/Lisbon')).toBe(Date.parse('2026-03-29T01:00:00Z'));
});
