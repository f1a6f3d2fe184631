import { describe, expect, it } from 'vitest';
import { cartridgeState, rejectionPercent, type CartridgeLife } from '../../../shared/domain/cartridges.ts';
import { domainErrorOf } from '../../support/domain-error.ts';

const life = (changes: Partial<CartridgeLife> = {}): CartridgeLife => ({
  ...{ stage: 'carbon', lifeDays: 180, lifeL: 10_000, limit: null, daysUsed: 10, litresUsed: 100, measured: null },
  ...changes,
});

describe('rejection', () => {
  it('is the part of the salts that stayed behind, in percent', () => {
    expect(rejectionPercent(300, 6)).toBeCloseTo(98, 9);
    expect(rejectionPercent(300, 0)).toBe(100);
  });

  it('when nothing came in, can not be told', () => {
    expect(rejectionPercent(0, 0)).toBeNull();
  });
});

describe('when a cartridge is to be replaced', () => {
  it.each([
    [{}, { state: 'ok', by: 'days' }],
    [{ daysUsed: 162 }, { state: 'soon', by: 'days' }],
    [{ daysUsed: 180 }, { state: 'due', by: 'days', usedPart: 1 }],
    [{ litresUsed: 9500 }, { state: 'soon', by: 'litres', usedPart: 0.95 }],
    [
      { litresUsed: 12_000, daysUsed: 179 },
      { state: 'due', by: 'litres', usedPart: 1.2 },
    ],
    [
      { lifeDays: null, lifeL: null },
      { state: 'ok', by: null, usedPart: 0 },
    ],
  ] as const)('%j is %j', (changes, expected) => {
    expect(cartridgeState(life(changes))).toMatchObject(expected);
  });

  // 0-1 mg/L after resin and 90-98 % rejection are trade figures: common practice, no source.
  it.each([
    ['resin', 1, 1, 'ok'],
    ['resin', 1, 2, 'due'],
    ['resin', 1, null, 'ok'],
    ['membrane', 90, 97, 'ok'],
    ['membrane', 90, 89.9, 'due'],
    ['sediment', 1, 50, 'ok'],
  ] as const)('%s with a limit of %d and %s measured is %s', (stage, limit, measured, state) => {
    expect(cartridgeState(life({ stage, limit, measured })).state).toBe(state);
  });

  it('when its life is no length at all, is refused', () => {
    expect(domainErrorOf(() => cartridgeState(life({ lifeDays: 0 }))).code).toBe('domain.out_of_range');
  });
});
