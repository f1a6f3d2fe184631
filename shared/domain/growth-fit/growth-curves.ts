import { fitCurve, type Fit, type Model, type Point } from './levenberg-marquardt.ts';

type CurveCode = 'linear' | 'exponential' | 'logistic' | 'von_bertalanffy';

/** A curve of size (mm) by age (days since the cut) that was fitted to measurements. */
export interface GrowthCurve extends Fit {
  code: CurveCode;
  /** Akaike's criterion corrected for few data; the least is the best. */
  aicc: number;
  /** Size at an age, mm. */
  sizeAt: (ageDays: number) => number;
}

interface Form {
  code: CurveCode;
  model: Model;
  start: (from: Rough) => number[];
}

/** What a first look at the points says: the straight line through them, and their least and largest size and last age. */
interface Rough {
  mm: number;
  mmPerDay: number;
  least: number;
  most: number;
  lastDay: number;
}

const FORMS: readonly Form[] = [
  { code: 'linear', model: ([a = 0, b = 0], x) => a + b * x, start: ({ mm, mmPerDay }) => [mm, mmPerDay] },
  {
    code: 'exponential',
    model: ([a = 0, k = 0], x) => a * Math.exp(k * x),
    start: ({ least, most, lastDay }) => [least, Math.log(most / least) / lastDay],
  },
  {
    code: 'logistic',
    model: ([most = 0, middle = 0, width = 1], x) => most / (1 + Math.exp((middle - x) / width)),
    start: ({ most, lastDay }) => [1.3 * most, lastDay / 3, lastDay / 3],
  },
  {
    code: 'von_bertalanffy',
    model: ([most = 0, first = 0, k = 0], x) => most - (most - first) * Math.exp(-k * x),
    start: ({ mm, most, lastDay }) => [1.3 * most, mm, 1.5 / lastDay],
  },
];

/**
 * The curves that fit sizes by age, best first by AICc: straight, exponential, logistic and von Bertalanffy's.
 * Curves that need more data than there are, or find no minimum, are left out.
 *
 * @param points x: days since the cut, zero or more; y: size, mm, above zero
 * @see von Bertalanffy 1938, Human Biology 10:181–213
 * @see Hurvich & Tsai 1989, Biometrika 76:297–307 (AICc)
 */
export function growthCurves(points: readonly Point[]): GrowthCurve[] {
  const from = roughly(points);
  if (!from) return [];
  return FORMS.flatMap(({ code, model, start }) => {
    const fit = fitCurve(model, points, start(from));
    const aicc = fit && criterion(points.length, fit);
    if (!fit || aicc === null) return [];
    return [{ ...fit, code, aicc, sizeAt: (ageDays: number) => model(fit.parameters, ageDays) }];
  }).sort((a, b) => a.aicc - b.aicc);
}

/** The residuals' variance counts as a parameter; null where the correction has no value. */
function criterion(points: number, { parameters, rss }: Fit): number | null {
  const k = parameters.length + 1;
  if (points <= k + 1 || !(rss > 0)) return null;
  return points * Math.log(rss / points) + 2 * k + (2 * k * (k + 1)) / (points - k - 1);
}

function roughly(points: readonly Point[]): Rough | null {
  const lastDay = Math.max(0, ...points.map(({ x }) => x));
  const meanX = points.reduce((sum, { x }) => sum + x, 0) / points.length;
  const meanY = points.reduce((sum, { y }) => sum + y, 0) / points.length;
  const spread = points.reduce((sum, { x }) => sum + (x - meanX) ** 2, 0);
  if (!(spread > 0)) return null;
  const mmPerDay = points.reduce((sum, { x, y }) => sum + (x - meanX) * (y - meanY), 0) / spread;
  const most = Math.max(...points.map(({ y }) => y));
  return {
    mm: Math.max(meanY - mmPerDay * meanX, most / 100),
    mmPerDay,
    least: Math.min(...points.map(({ y }) => y)),
    most,
    lastDay,
  };
}
