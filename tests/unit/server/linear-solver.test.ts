import { describe, expect, it } from 'vitest';
import { solveLinear } from '../../../server/outside/linear-solver.ts';
import type { LinearProgramme } from '../../../shared/domain/dosing-plan/linear-programme.ts';
import reference from '../../reference/linear-programmes.json' with { type: 'json' };

type Case = (typeof reference.cases)[number];

function programmeOf(given: Case, whole: boolean): LinearProgramme {
  const relations = { '<=': '<=', '>=': '>=', '==': '=' } as const;
  return {
    sense: given.sense === 'min' ? 'min' : 'max',
    variables: given.variables.map((name, index) => ({
      name,
      objective: given.objective[index] ?? 0,
      lower: given.lower[index] ?? -Infinity,
      upper: given.upper[index] ?? Infinity,
      whole: whole && given.integer[index] === true,
    })),
    constraints: given.constraints.map(({ name, coefs, op, rhs }) => ({
      name,
      // The file names one table of coefficients for each constraint; JSON's type is their union.
      coefficients: Object.fromEntries(Object.entries(coefs).map(([variable, value]) => [variable, Number(value)])),
      relation: relations[op as keyof typeof relations],
      bound: rhs,
    })),
  };
}

describe('solveLinear', () => {
  it.each(reference.cases)('of $id has the optimum that scipy and GLPK agree on, within 1e-6', (given) => {
    const solution = solveLinear(programmeOf(given, true));

    expect(solution !== null).toBe(given.feasible);
    if (solution === null) return;
    expect(solution.objective).toBeCloseTo(given.optimum ?? NaN, 6);
    for (const { coefs, op, rhs } of given.constraints) {
      const sum = Object.entries(coefs).reduce((total, [name, each]) => total + each * (solution.values[name] ?? 0), 0);
      if (op !== '>=') expect(sum).toBeLessThanOrEqual(rhs + 1e-6);
      if (op !== '<=') expect(sum).toBeGreaterThanOrEqual(rhs - 1e-6);
    }
  });

  it.each(reference.cases.filter((given) => given.lp_relaxation_optimum !== null))(
    'of $id without whole numbers has the optimum of the relaxation',
    (given) => {
      const solution = solveLinear(programmeOf(given, false));
      expect(solution?.objective).toBeCloseTo(given.lp_relaxation_optimum ?? NaN, 6);
    },
  );

  it('when the names hold what a file format would not take, keeps them apart', () => {
    const names = ['a b', 'a-b', '3 + 4', 'End'];
    const solution = solveLinear({
      sense: 'min',
      variables: names.map((name, index) => ({ name, objective: index + 1, lower: index, upper: Infinity })),
      constraints: [],
    });
    expect(solution?.values).toEqual({ 'a b': 0, 'a-b': 1, '3 + 4': 2, End: 3 });
  });

  it('when it has no end, says so instead of making something up', () => {
    const endless: LinearProgramme = {
      sense: 'max',
      variables: [{ name: 'x', objective: 1, lower: 0, upper: Infinity }],
      constraints: [],
    };
    expect(() => solveLinear(endless)).toThrow(/ended/);
  });
});
