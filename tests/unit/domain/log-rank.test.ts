import { describe, expect, it } from 'vitest';
import { logRank } from '../../../shared/domain/log-rank.ts';
import reference from '../../reference/log-rank.json' with { type: 'json' };

const groups = reference.result.groups.map((name) =>
  reference.time.flatMap((day, index) =>
    reference.group[index] === name ? [{ day, lost: reference.status[index] === 1 }] : [],
  ),
);

describe('logRank', () => {
  it('when given the remissions of Freireich et al. 1963, is the test that R survdiff makes', () => {
    const found = logRank(groups);

    expect(found?.observed).toEqual(reference.result.observed);
    expect(found?.expected).toEqual(reference.result.expected.map((value) => expect.closeTo(value, 10)));
    expect(found?.chiSquare).toBeCloseTo(reference.result.chisq, 9);
    expect(found?.degreesOfFreedom).toBe(1);
    expect(found?.p).toBeCloseTo(reference.result.p, 12);
  });

  it('when groups change places, says the same; when a third is like the others, has two degrees of freedom', () => {
    expect(logRank(groups.toReversed())?.chiSquare).toBeCloseTo(reference.result.chisq, 9);
    expect(logRank([...groups, groups.flat()])?.degreesOfFreedom).toBe(2);
  });

  it('when plugs are counted together, says the same as one by one', () => {
    const day = { day: 4, lost: true };

    expect(
      logRank([
        [
          { ...day, count: 3 },
          { day: 9, lost: false, count: 2 },
        ],
        [{ day: 9, lost: false, count: 5 }],
      ]),
    ).toEqual(
      logRank([[day, day, day, { day: 9, lost: false }, { day: 9, lost: false }], [{ day: 9, lost: false, count: 5 }]]),
    );
  });

  it('when there is one group, or none was lost, has nothing to say', () => {
    expect(logRank(groups.slice(0, 1))).toBeNull();
    expect(logRank([[{ day: 3, lost: false }], [{ day: 4, lost: false }]])).toBeNull();
  });
});
