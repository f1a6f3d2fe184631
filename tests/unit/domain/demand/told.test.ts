import { expect, it } from 'vitest';
import { toldBy } from '../../../../shared/domain/demand/told.ts';
import { day } from '../../../support/demand-data.ts';

const at = (...days: number[]) => days.map((each) => ({ at: day(each) }));

it('three tests over two days tell a demand', () => {
  expect(toldBy(at(95, 97, 99), day(100))).toEqual({ from: day(95), to: day(99), readings: 3, lacks: null });
});

it.each([
  ['none', at(), 'too_few_readings', 0],
  ['two', at(91, 99), 'too_few_readings', 2],
  ['three, one of them long ago', at(60, 91, 99), 'too_few_readings', 2],
  ['three in a day and a half', at(98, 99, 99.5), 'too_short', 3],
  ['three, one of them still to come', at(95, 98, 101), 'too_few_readings', 2],
])('%s do not', (_, readings, lacks, count) => {
  expect(toldBy(readings, day(100))).toMatchObject({ lacks, readings: count });
});
