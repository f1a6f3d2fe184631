import { expect, it } from 'vitest';
import { type MixInputs, previewMix } from '@/views/water/mix-preview.ts';

const INPUTS: MixInputs = {
  ...{ before: { levelL: 0, alkalinityMeqL: 0 }, volumeL: 60, waterL: 60, limeG: 81, purity: 0.95 },
  ...{ vinegarMl: 0, acidPercent: 5, temperatureC: 25, netVolumeL: 3400 },
};

it('previewMix: tells the strength and what all of it would add to the system', () => {
  const { preview } = previewMix(INPUTS);

  // 81 g × 0.95 / 74.092 × 2,000 / 60 L = 34.62 meq/L, by arithmetic.
  expect(preview?.alkalinityMeqL).toBeCloseTo(34.62, 2);
  expect(preview?.wholeDoseMeqL).toBeCloseTo((34.62 * 60) / 3400, 3);
});

it('previewMix: a rest in the reservoir thins or strengthens the whole', () => {
  const { preview } = previewMix({ ...INPUTS, before: { levelL: 20, alkalinityMeqL: 10 }, waterL: 40, limeG: 54 });

  expect(preview?.levelL).toBe(60);
  expect(preview?.alkalinityMeqL).toBeCloseTo((20 * 10 + 40 * 34.62) / 60, 2);
});

it.each([
  ['more water than it holds', { waterL: 61 }, /Use less water/],
  ['water too cold', { temperatureC: 4 }, /between 15 and 30/],
  ['vinegar that uses up all lime', { vinegarMl: 5000 }, /Use less vinegar or more lime/],
])('previewMix: with %s, says why it can not be made', (_, change, message) => {
  const outcome = previewMix({ ...INPUTS, ...change });

  expect(outcome.preview).toBeNull();
  expect(outcome.problem).toMatch(message);
});
