import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { carbonateConstants } from '../../../shared/domain/carbonate/constants.ts';
import type { CarbonateInput } from '../../../shared/domain/carbonate/input.ts';
import { PH_SCALES, phOnScale, phTotalFrom } from '../../../shared/domain/carbonate/ph-scales.ts';
import { solveCarbonate, type CarbonateState } from '../../../shared/domain/carbonate/solve.ts';
import { DomainError } from '../../../shared/errors.ts';
import reference from '../../reference/carbonate.json' with { type: 'json' };
import { domainErrorOf } from '../../support/domain-error.ts';

const PARTS = {
  alkalinityUmolKg: 'alkalinityUmolKg',
  dicUmolKg: 'dicUmolKg',
  ph: 'phTotal',
  pco2Uatm: 'pco2Uatm',
} as const satisfies Record<string, keyof CarbonateState>;
type Part = keyof typeof PARTS;
const parts = Object.keys(PARTS) as Part[];
const pairs = parts.flatMap((one, index) => parts.slice(index + 1).map((other): [Part, Part] => [one, other]));

const reefWater = { salinity: 35, temperatureC: 25 };
const between = (min: number, max: number) => fc.double({ min, max, noNaN: true });
const conditions = fc.record({ salinity: between(19, 43), temperatureC: between(2, 35) });

describe('against PyCO2SYS 1.8.3 with the same constants', () => {
  it.each(reference.states)('$id: every part of the state', (row) => {
    const boron = row.boron === 'lee2010' ? 'lee2010' : 'uppstrom1974';
    const calciumMgL = row.calciumMgL ?? undefined;
    const { salinity, temperatureC, given, expected } = row;
    const state = solveCarbonate({ salinity, temperatureC, ...given, boron, calciumMgL });

    for (const name of ['phTotal', 'phFree', 'phSws', 'phNbs'] as const) {
      expect(Math.abs(state[name] - expected[name]), name).toBeLessThan(1e-7);
    }
    for (const name of ['dicUmolKg', 'pco2Uatm', 'bicarbonateUmolKg', 'carbonateUmolKg', 'co2UmolKg'] as const) {
      expect(Math.abs(state[name] / expected[name] - 1), name).toBeLessThan(1e-6);
    }
    expect(Math.abs(state.omegaAragonite / expected.omegaAragonite - 1)).toBeLessThan(1e-6);
    expect(Math.abs(state.omegaCalcite / expected.omegaCalcite - 1)).toBeLessThan(1e-6);
  });
});

describe('laws of the system', () => {
  it.each(pairs)('from %s and %s comes the same water back', (one, other) => {
    fc.assert(
      fc.property(
        conditions,
        between(300, 6000),
        between(6.5, 9.5),
        fc.constantFrom(0, 30),
        (at, dic, ph, phosphateUmolKg) => {
          const input = { ...at, phosphateUmolKg };
          const state = solveCarbonate({ ...input, dicUmolKg: dic, ph });
          if (state.alkalinityUmolKg < 1) return;
          const again = solveCarbonate({ ...input, [one]: state[PARTS[one]], [other]: state[PARTS[other]] });
          expect(Math.abs(again.phTotal - ph)).toBeLessThan(1e-9);
          expect(again.dicUmolKg / dic).toBeCloseTo(1, 8);
          expect(again.alkalinityUmolKg / state.alkalinityUmolKg).toBeCloseTo(1, 8);
          expect(again.pco2Uatm / state.pco2Uatm).toBeCloseTo(1, 8);
        },
      ),
    );
  });

  it('carbon is bicarbonate, carbonate and carbon dioxide, and nothing else', () => {
    fc.assert(
      fc.property(conditions, between(100, 20_000), between(100, 20_000), (at, alkalinityUmolKg, dicUmolKg) => {
        const state = unlessImpossible({ ...at, alkalinityUmolKg, dicUmolKg });
        if (!state) return;
        const { bicarbonateUmolKg, carbonateUmolKg, co2UmolKg } = state;
        expect((bicarbonateUmolKg + carbonateUmolKg + co2UmolKg) / dicUmolKg).toBeCloseTo(1, 12);
      }),
    );
  });

  it('more alkalinity at the same carbon raises pH and saturation and lowers carbon dioxide', () => {
    fc.assert(
      fc.property(conditions, between(1500, 5000), between(500, 5000), between(1, 500), (at, ta, dic, more) => {
        const [less, higher] = [ta, ta + more].map((alkalinityUmolKg) =>
          solveCarbonate({ ...at, alkalinityUmolKg, dicUmolKg: dic }),
        );
        expect(higher?.phTotal).toBeGreaterThan(less?.phTotal ?? 99);
        expect(higher?.omegaAragonite).toBeGreaterThan(less?.omegaAragonite ?? Infinity);
        expect(higher?.pco2Uatm).toBeLessThan(less?.pco2Uatm ?? 0);
      }),
    );
  });

  it('more carbon dioxide at the same alkalinity lowers pH and adds carbon', () => {
    fc.assert(
      fc.property(conditions, between(500, 6000), between(50, 5000), between(1, 500), (at, ta, pco2, more) => {
        const [less, higher] = [pco2, pco2 + more].map((pco2Uatm) =>
          solveCarbonate({ ...at, alkalinityUmolKg: ta, pco2Uatm }),
        );
        expect(higher?.phTotal).toBeLessThan(less?.phTotal ?? 0);
        expect(higher?.dicUmolKg).toBeGreaterThan(less?.dicUmolKg ?? Infinity);
      }),
    );
  });

  it('twice the calcium is twice the saturation, and nothing else changes', () => {
    const at = { ...reefWater, alkalinityUmolKg: 2800, ph: 8.1 };
    const { omegaAragonite, omegaCalcite, ...rest } = solveCarbonate({ ...at, calciumMgL: 210 });
    const twice = solveCarbonate({ ...at, calciumMgL: 420 });
    expect(twice.omegaAragonite).toBeCloseTo(2 * omegaAragonite, 10);
    expect(twice.omegaCalcite).toBeCloseTo(2 * omegaCalcite, 10);
    expect(twice).toMatchObject(rest);
  });

  it('phosphate holds part of the alkalinity, so less is left for carbon', () => {
    const at = { ...reefWater, alkalinityUmolKg: 2500, ph: 8.1 };
    expect(solveCarbonate({ ...at, phosphateUmolKg: 10 }).dicUmolKg).toBeLessThan(solveCarbonate(at).dicUmolKg - 5);
  });

  it.each(PH_SCALES)('pH on the %s scale goes there and back', (scale) => {
    const constants = carbonateConstants(35, 25, 'uppstrom1974');
    expect(phTotalFrom(constants, phOnScale(constants, 8.1, scale), scale)).toBeCloseTo(8.1, 12);
    const onScale = { total: 'phTotal', free: 'phFree', sws: 'phSws', nbs: 'phNbs' } as const;
    const state = solveCarbonate({ ...reefWater, alkalinityUmolKg: 2500, ph: 8.1, phScale: scale });
    expect(state[onScale[scale]]).toBeCloseTo(8.1, 12);
  });
});

describe('at the edges', () => {
  it.each(pairs)('whatever %s and %s are given, answers in numbers or says why not', (one, other) => {
    const extremes: Record<Part, fc.Arbitrary<number>> = {
      alkalinityUmolKg: between(100, 20_000),
      dicUmolKg: between(50, 20_000),
      ph: between(6, 11),
      pco2Uatm: between(0.1, 100_000),
    };
    fc.assert(
      fc.property(conditions, extremes[one], extremes[other], (at, first, second) => {
        const state = unlessImpossible({ ...at, [one]: first, [other]: second });
        if (!state) return;
        // Acid without carbon has an alkalinity below zero; everything else is an amount.
        const { alkalinityUmolKg, ...amounts } = state;
        expect(Number.isFinite(alkalinityUmolKg)).toBe(true);
        for (const value of Object.values(amounts)) expect(value > 0 && value < Infinity).toBe(true);
      }),
    );
  });

  it('when a top-off has run away, still converges: 10 meq/kg more at the same carbon', () => {
    const state = solveCarbonate({ ...reefWater, alkalinityUmolKg: 12_500, dicUmolKg: 2200 });
    expect(state.phTotal).toBeGreaterThan(11);
  });

  it.each([19, 43])('at salinity %d takes measured calcium too', (salinity) => {
    const state = solveCarbonate({ salinity, temperatureC: 25, alkalinityUmolKg: 2500, ph: 8.1, calciumMgL: 420 });
    expect(state.omegaAragonite).toBeGreaterThan(1);
  });

  it.each<[string, Partial<CarbonateInput>]>([
    ['salinity', { salinity: 18.9 }],
    ['salinity', { salinity: 43.1 }],
    ['salinity', { salinity: Number.NaN }],
    ['temperatureC', { temperatureC: 1.9 }],
    ['temperatureC', { temperatureC: 35.1 }],
    ['ph', { ph: 12.5 }],
    ['ph', { ph: Infinity }],
    ['alkalinityUmolKg', { alkalinityUmolKg: 0 }],
    ['calciumMgL', { calciumMgL: -1 }],
    ['phosphateUmolKg', { phosphateUmolKg: -1 }],
  ])('when %s is out of range, says which input it is', (path, change) => {
    const error = domainErrorOf(() => solveCarbonate({ ...reefWater, alkalinityUmolKg: 2500, ph: 8.1, ...change }));
    expect(error.code).toBe('domain.out_of_range');
    expect(error.fields.map((field) => field.path)).toEqual([path]);
  });

  it.each<[string, Partial<CarbonateInput>]>([
    ['one part only', { ph: 8.1 }],
    ['three parts', { ph: 8.1, alkalinityUmolKg: 2500, dicUmolKg: 2200 }],
    ['none', {}],
  ])('when %s is given, asks for two', (_what, given) => {
    expect(domainErrorOf(() => solveCarbonate({ ...reefWater, ...given })).code).toBe('input.invalid');
  });

  it.each<[string, Partial<CarbonateInput>]>([
    ['more hydroxide than alkalinity', { ph: 11, alkalinityUmolKg: 1000 }],
    ['more carbon dioxide than carbon', { pco2Uatm: 100_000, dicUmolKg: 100 }],
    ['more alkalinity than pH 12.5 allows', { alkalinityUmolKg: 100_000, dicUmolKg: 100, temperatureC: 2 }],
  ])('when the two cannot both be true (%s), says so', (_what, given) => {
    const error = domainErrorOf(() => solveCarbonate({ ...reefWater, ...given }));
    expect(error.code).toBe('domain.out_of_range');
    expect(error.message).toContain('both');
  });
});

/** Null where the solver says that no seawater can have both values. */
function unlessImpossible(input: CarbonateInput): CarbonateState | null {
  try {
    return solveCarbonate(input);
  } catch (error) {
    if (error instanceof DomainError) return null;
    throw error;
  }
}
