import { describe, expect, it } from 'vitest';
import type { LatestValue, SystemGlance } from '../../../shared/contracts/water.ts';
import { numbersOf } from '../../../src/views/water/bench/use-bench-fill.ts';

const reading = (parameter: LatestValue['parameter'], value: number): LatestValue => ({
  ...{ parameter, value, takenAt: 0, method: '', band: null, state: 'none' },
});

function aGlance(change: Partial<SystemGlance> = {}): SystemGlance {
  return {
    system: {
      ...{ id: 'a', code: 'A', name: 'Long Run', kind: 'growout', netVolumeL: 3400, surfaceM2: null },
      ...{ note: '', createdAt: 0, version: 1 },
    },
    latest: [reading('alkalinity', 3), reading('ph', 8.1), reading('nitrate', 8)],
    demand: {
      ...{ enough: true, from: 0, to: 1, readings: 14, windowDays: 14 },
      ...{ demand: 0.4, low: 0.35, high: 0.45 },
    },
    carried: { limewater: 0.3, others: 0, waterChanges: 0 },
    ...{ online: null, standby: 0, plugs: 0 },
    ...change,
  };
}

describe('a system on the bench', () => {
  it('brings its volume, its demand and the readings that the bench works with', () => {
    expect(numbersOf(aGlance())).toEqual({ volumeL: 3400, alkalinityMeqL: 3, ph: 8.1, demandMeqL: 0.4 });
  });

  it('when demand is not known yet, leaves it as it was', () => {
    const demand = { enough: false, from: 0, to: 1, readings: 2, windowDays: 14, reason: 'too_few_readings' } as const;
    expect(numbersOf(aGlance({ demand }))).not.toHaveProperty('demandMeqL');
  });
});
