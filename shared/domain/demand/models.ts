import type { DemandNoise } from './inputs.ts';

/** One guess at the noises, with how likely it is before any data and how large errors of tests are beside the stated. */
export interface Model extends DemandNoise {
  /** Errors of tests beside what is stated of them. */
  testScale: number;
  /** Log of its weight before any data, not normed. */
  logPrior: number;
  /** The squares, worked out once. */
  driftVariance: number;
  supplyVariance: number;
  levelVariance: number;
  testVariance: number;
}

/** From corals that keep on as they are to a system in turmoil, meq/L a day per √day. */
const DRIFTS = [0.003, 0.006, 0.012, 0.024, 0.048];
const USUAL_DRIFT = 0.01;
/** How far drifts of systems lie apart, and how far the real errors of tests from the stated ones: natural logarithms. */
const DRIFT_SPREAD = 0.7;
const TEST_SPREAD = 0.2;
const TEST_SCALES = [0.75, 1, 1.35];
/** A farm that doses as it writes down, and one where more goes on than is written. */
const TIDY = { supplyError: 0.05, levelNoise: 0.005 };
const ROUGH = { supplyError: 0.15, levelNoise: 0.03 };
const LOG_PART_ROUGH = Math.log(0.3);

/**
 * The models that are tried side by side, for levels whose usual demand is `scale` times that of alkalinity in meq/L. The
 * grid and its weights were chosen on simulated systems, so that 95 % intervals cover what they should there.
 */
export function modelsFor(scale: number): Model[] {
  const of = (drift: number, testScale: number, { supplyError, levelNoise }: typeof TIDY): Model => ({
    ...{ drift: drift * scale, supplyError, levelNoise: levelNoise * scale, testScale },
    driftVariance: (drift * scale) ** 2,
    supplyVariance: supplyError ** 2,
    levelVariance: (levelNoise * scale) ** 2,
    testVariance: testScale ** 2,
    logPrior:
      -0.5 * (Math.log(drift / USUAL_DRIFT) / DRIFT_SPREAD) ** 2 - 0.5 * (Math.log(testScale) / TEST_SPREAD) ** 2,
  });
  return DRIFTS.flatMap((drift) => {
    const rough = of(drift, 1, ROUGH);
    return [
      ...TEST_SCALES.map((testScale) => of(drift, testScale, TIDY)),
      { ...rough, logPrior: rough.logPrior + LOG_PART_ROUGH },
    ];
  });
}
