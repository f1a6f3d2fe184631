import fc from 'fast-check';
import { expect, it } from 'vitest';
import { advanceBank, glimpse, observeBank, startBank } from '../../../../shared/domain/demand/bank.ts';
import { modelsFor } from '../../../../shared/domain/demand/models.ts';
import { nodesOf, transitionOf } from '../../../../shared/domain/demand/moves.ts';
import { NOTHING, type Belief } from '../../../../shared/domain/state-space/belief.ts';
import { observe, predict } from '../../../../shared/domain/state-space/kalman.ts';
import { inputs, reading, steady } from '../../../support/demand-data.ts';

const START: Belief = {
  ...{ level: 0, rate: 0.3, cov: { ...NOTHING, rr: 0.2 }, diffuse: { ...NOTHING, ll: 1 } },
};

const tests = fc.array(
  fc.tuple(fc.double({ min: 0, max: 9, noNaN: true }), fc.double({ min: -2, max: 8, noNaN: true }), fc.boolean()),
  { minLength: 2, maxLength: 15 },
);

it('is the filter of state-space/kalman.ts for each of its models, step by step', () => {
  fc.assert(
    fc.property(tests, (steps) => {
      let at = 0;
      const readings = steps.map(([days, value]) => reading((at += days), value));
      const waterChanges = [{ at: 5 * 86_400_000, fraction: 0.2, value: 2 }];
      const [first, ...rest] = nodesOf({ ...inputs({ readings, waterChanges }), supply: [steady(0, 40, 0.4)] }, []);
      if (!first?.reading) throw new Error('There is a first reading.');
      const models = modelsFor(1);
      const bank = startBank(models, START, first.reading);
      const { value, sd } = first.reading;
      let beliefs = models.map(({ testScale }) => observe(START, value, (sd * testScale) ** 2).belief);

      rest.forEach(({ move, reading: test }, index) => {
        if (!test) return;
        const isTrusted = steps[index + 1]?.[2] ?? true;
        advanceBank(bank, move);
        if (isTrusted) observeBank(bank, test, 1);
        else glimpse(bank, test.value, 4);
        beliefs = models.map((model, at) => {
          const before = predict(beliefs[at] ?? START, transitionOf(move, model));
          return observe(before, test.value, isTrusted ? (test.sd * model.testScale) ** 2 : 4).belief;
        });
      });

      bank.forEach((cell, model) => {
        const belief = beliefs[model];
        expect(cell.level).toBeCloseTo(belief?.level ?? Number.NaN, 10);
        expect(cell.rate).toBeCloseTo(belief?.rate ?? Number.NaN, 10);
        expect(cell.ll).toBeCloseTo(belief?.cov.ll ?? Number.NaN, 10);
        expect(cell.lr).toBeCloseTo(belief?.cov.lr ?? Number.NaN, 10);
        expect(cell.rr).toBeCloseTo(belief?.cov.rr ?? Number.NaN, 10);
      });
      expect(bank.reduce((sum, { weight }) => sum + weight, 0)).toBeCloseTo(1, 12);
    }),
    { numRuns: 60 },
  );
});
