import { describe, expect, it } from 'vitest';
import { growthCurves } from '../../../shared/domain/growth-fit/growth-curves.ts';
import { leastSquares } from '../../../shared/domain/growth-fit/least-squares.ts';
import { fitCurve, type Model } from '../../../shared/domain/growth-fit/levenberg-marquardt.ts';
import reference from '../../reference/curve-fits.json' with { type: 'json' };

const MODELS: Record<string, Model> = {
  Misra1a: ([b1 = 0, b2 = 0], x) => b1 * (1 - Math.exp(-b2 * x)),
  DanWood: ([b1 = 0, b2 = 0], x) => b1 * x ** b2,
  Chwirut2: ([b1 = 0, b2 = 0, b3 = 0], x) => Math.exp(-b1 * x) / (b2 + b3 * x),
  Rat42: ([b1 = 0, b2 = 0, b3 = 0], x) => b1 / (1 + Math.exp(b2 - b3 * x)),
  Thurber: ([b1 = 0, b2 = 0, b3 = 0, b4 = 0, b5 = 0, b6 = 0, b7 = 0], x) =>
    (b1 + b2 * x + b3 * x ** 2 + b4 * x ** 3) / (1 + b5 * x + b6 * x ** 2 + b7 * x ** 3),
  orange_tree3_logistic: ([most = 0, middle = 0, width = 1], x) => most / (1 + Math.exp((middle - x) / width)),
  dnase1_gompertz: ([most = 0, b2 = 0, b3 = 0], x) => most * Math.exp(-b2 * b3 ** x),
  chick1_exponential: ([first = 0, k = 0], x) => first * Math.exp(k * x),
};

const starts = reference.nist.flatMap((given) => [
  { ...given, from: 'the far start', start: given.start1, digits: 4 },
  { ...given, from: 'the near start', start: given.start2, digits: 6 },
]);

describe('fitCurve', () => {
  it.each(starts)('when given $id of NIST StRD from $from, reaches the certified values', (given) => {
    const fit = fitCurve(modelOf(given.id), pointsOf(given), given.start);

    given.certified.forEach((value, index) => {
      expect(agreeingDigits(fit?.parameters[index], value)).toBeGreaterThanOrEqual(given.digits);
      expect(agreeingDigits(fit?.standardErrors[index], given.certified_se[index])).toBeGreaterThanOrEqual(
        given.digits - 1,
      );
    });
    expect(agreeingDigits(fit?.rss, given.certified_rss)).toBeGreaterThanOrEqual(8);
  });

  it.each(reference.growth)('when given $id, finds the parameters and errors to seven digits ($source)', (given) => {
    const fit = fitCurve(modelOf(given.id), pointsOf(given), given.start);

    given.params.forEach((value, index) => {
      expect(agreeingDigits(fit?.parameters[index], value)).toBeGreaterThanOrEqual(7);
      expect(agreeingDigits(fit?.standardErrors[index], given.std_errors[index])).toBeGreaterThanOrEqual(6);
    });
    expect(agreeingDigits(fit?.rss, given.rss)).toBeGreaterThanOrEqual(8);
  });

  it('when there are no more points than parameters, or a parameter changes nothing, has no fit', () => {
    const line: Model = ([a = 0, b = 0], x) => a + b * x;

    expect(
      fitCurve(
        line,
        [
          { x: 0, y: 1 },
          { x: 1, y: 2 },
        ],
        [0, 0],
      ),
    ).toBeNull();
    expect(
      fitCurve(
        ([a = 0]) => a,
        [1, 2, 3].map((x) => ({ x, y: x })),
        [1, 1],
      ),
    ).toBeNull();
  });
});

describe('leastSquares', () => {
  it('when columns are the same, or there are fewer rows than columns, has no solution', () => {
    expect(
      leastSquares(
        [
          [0, 0],
          [0, 0],
          [0, 0],
        ],
        [1, 2, 3],
      ),
    ).toBeNull();
    expect(leastSquares([[1, 2]], [1])).toBeNull();
  });
});

describe('growthCurves', () => {
  const ages = Array.from({ length: 16 }, (_, index) => index * 20);
  const wobble = (index: number) => 0.3 * Math.sin(index * 2.4);

  it.each([
    ['linear', (x: number) => 20 + 0.2 * x],
    ['exponential', (x: number) => 10 * Math.exp(0.008 * x)],
    ['logistic', (x: number) => 90 / (1 + Math.exp((150 - x) / 40))],
    ['von_bertalanffy', (x: number) => 80 - 65 * Math.exp(-0.012 * x)],
  ] as const)('when sizes follow a %s curve with a little error, AICc chooses that one', (code, sizeAt) => {
    const [best] = growthCurves(ages.map((x, index) => ({ x, y: sizeAt(x) + wobble(index) })));

    expect(best?.code).toBe(code);
    expect(best?.sizeAt(100)).toBeCloseTo(sizeAt(100), 0);
  });

  it('when all sizes are of one day, or none are there, has no curve', () => {
    expect(growthCurves([])).toEqual([]);
    expect(growthCurves([1, 2, 3, 4, 5].map((y) => ({ x: 7, y })))).toEqual([]);
  });
});

function modelOf(id: string): Model {
  const model = MODELS[id];
  if (!model) throw new Error(`No model for ${id}`);
  return model;
}

function pointsOf({ x, y }: { x: number[]; y: number[] }) {
  return x.map((value, index) => ({ x: value, y: y[index] ?? NaN }));
}

/** Log relative error, as NIST compares. */
function agreeingDigits(found = NaN, certified = NaN): number {
  return found === certified ? 15 : -Math.log10(Math.abs(found - certified) / Math.abs(certified));
}
