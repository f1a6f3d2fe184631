import { expect, it } from 'vitest';
import { MS_PER_DAY } from '../../../shared/domain/days.ts';
import { type CareEvent, careOf, sludgeDueAt } from '../../../shared/domain/reservoir-care.ts';

const event = (kind: CareEvent['kind'], day: number, strengthLeft: number | null = null): CareEvent => ({
  ...{ kind, at: day * MS_PER_DAY, strengthLeft },
});

it('careOf: an online reservoir is due so many days after it went online', () => {
  const care = careOf([event('refill', 0), event('online', 2), event('level', 4)], 6);

  expect(care).toMatchObject({ onlineSince: 2 * MS_PER_DAY, replaceAt: 8 * MS_PER_DAY });
});

it('careOf: without a habit, or off, nothing is due', () => {
  expect(careOf([event('online', 2)], null).replaceAt).toBeNull();
  for (const kind of ['offline', 'refill', 'spent', 'cleaned'] as const) {
    expect(careOf([event('online', 2), event(kind, 3)], 6)).toMatchObject({ onlineSince: null, replaceAt: null });
  }
});

it('careOf: a check below 85 % of what was mixed is low; a new mix is not checked yet', () => {
  const mixed = [event('refill', 0), event('strength', 3, 0.84)];

  expect(careOf(mixed, null)).toMatchObject({ strengthLow: true, lastCheck: { strengthLeft: 0.84 } });
  expect(careOf([...mixed, event('strength', 4, 0.85)], null).strengthLow).toBe(false);
  expect(careOf([...mixed, event('refill', 5)], null)).toMatchObject({ strengthLow: false, lastCheck: null });
});

it('careOf: a check that could tell nothing is no check', () => {
  expect(careOf([event('refill', 0), event('strength', 3)], null)).toMatchObject({
    ...{ strengthLow: false, lastCheck: null },
  });
});

it('sludgeDueAt: six weeks on are 42 days; before the first mix nothing is due', () => {
  expect(sludgeDueAt(MS_PER_DAY, 6)).toBe(43 * MS_PER_DAY);
  expect(sludgeDueAt(null, 6)).toBeNull();
});
