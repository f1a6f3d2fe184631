import fc from 'fast-check';
import { expect, it } from 'vitest';
import {
  onlineSpans,
  RESERVOIR_EVENT_KINDS,
  type ReservoirStep,
  SETTLING_MS,
  standingAfter,
  stateAt,
  strengthAfterRefill,
} from '../../../shared/domain/reservoir-state.ts';

const step = (kind: ReservoirStep['kind'], at: number, levelL: number, alkalinityMeqL = 40): ReservoirStep => ({
  kind,
  at,
  levelL,
  alkalinityMeqL,
});

it('standingAfter: nothing logged is an empty reservoir that stands by', () => {
  expect(standingAfter([], 60)).toEqual({ state: 'standby', levelL: 0, alkalinityMeqL: 0, readyAt: null });
});

it('standingAfter: a mix settles, goes online, and is spent when it comes off nearly empty', () => {
  const history = [step('refill', 0, 60), step('online', 10, 60), step('level', 20, 31), step('offline', 30, 5)];

  const states = history.map((_, index) => standingAfter(history.slice(0, index + 1), 60).state);

  expect(states).toEqual(['settling', 'online', 'online', 'spent']);
});

it('standingAfter: a reservoir that comes off with a good rest stands by', () => {
  expect(standingAfter([step('online', 0, 60), step('offline', 1, 6)], 60).state).toBe('standby');
});

it('standingAfter: plain water, a check, a look and less sludge leave the state as it is', () => {
  const quiet = (['topped_up', 'strength', 'level', 'sludge_removed'] as const).map((kind) => step(kind, 5, 40, 30));

  for (const event of quiet) {
    expect(standingAfter([step('refill', 0, 60), step('online', 3, 60), event], 60)).toEqual({
      ...{ state: 'online', levelL: 40, alkalinityMeqL: 30, readyAt: null },
    });
  }
});

it('standingAfter: spent is spent whatever is left; cleaned stands by, empty', () => {
  const spent = standingAfter([step('online', 0, 60), step('spent', 4, 45)], 60);

  expect(spent).toMatchObject({ state: 'spent', levelL: 45 });
  expect(standingAfter([step('cleaned', 5, 0, 0)], 60, spent)).toEqual({
    ...{ state: 'standby', levelL: 0, alkalinityMeqL: 0, readyAt: null },
  });
});

it('standingAfter: told one by one or all at once, it stands the same', () => {
  const anEvent = fc.record({
    kind: fc.constantFrom(...RESERVOIR_EVENT_KINDS),
    levelL: fc.integer({ min: 0, max: 60 }),
    alkalinityMeqL: fc.integer({ min: 0, max: 45 }),
  });
  fc.assert(
    fc.property(fc.array(anEvent), (list) => {
      const steps = list.map((event, at) => ({ ...event, at }));
      const oneByOne = steps.reduce((standing, each) => standingAfter([each], 60, standing), standingAfter([], 60));
      expect(oneByOne).toEqual(standingAfter(steps, 60));
    }),
  );
});

it('stateAt: settling ends at the instant that it is ready', () => {
  const standing = standingAfter([step('refill', 1000, 60)], 60);

  expect(stateAt(standing, 999 + SETTLING_MS)).toBe('settling');
  expect(stateAt(standing, 1000 + SETTLING_MS)).toBe('standby');
});

it('onlineSpans: a refill or a changeover ends a span; the last one stays open', () => {
  const history = [
    ...[step('refill', 0, 60), step('online', 10, 60), step('refill', 20, 60), step('online', 30, 60)],
    ...[step('online', 35, 60), step('offline', 40, 20), step('online', 50, 20)],
  ];

  expect(onlineSpans(history)).toEqual([
    { from: 10, to: 20 },
    { from: 30, to: 40 },
    { from: 50, to: null },
  ]);
});

it('onlineSpans: a reservoir that is spent or cleaned feeds no more; plain water and checks go on', () => {
  const history = [
    ...[step('online', 10, 60), step('topped_up', 12, 60), step('strength', 14, 50), step('sludge_removed', 16, 48)],
    ...[step('spent', 20, 40), step('online', 30, 40), step('cleaned', 35, 0)],
  ];

  expect(onlineSpans(history)).toEqual([
    { from: 10, to: 20 },
    { from: 30, to: 35 },
  ]);
});

it('strengthAfterRefill: alkalinity is neither made nor lost by mixing', () => {
  const strength = strengthAfterRefill({ levelL: 12, alkalinityMeqL: 20 }, { waterL: 48, alkalinityMeqL: 40 });

  expect(strength * 60).toBeCloseTo(12 * 20 + 48 * 40, 9);
});
