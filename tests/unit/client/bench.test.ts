import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { doseEffect } from '../../../shared/domain/dose-effect.ts';
import { solveCarbonate } from '../../../shared/domain/carbonate/solve.ts';
import { benchCarbonate, PAIRS } from '../../../src/views/water/bench/bench-carbonate.ts';
import { doseOf, doubts } from '../../../src/views/water/bench/bench-dose.ts';
import {
  BENCH_CHOICES,
  BENCH_FIELDS,
  BENCH_NUMBERS,
  type BenchChoices,
  type BenchNumber,
} from '../../../src/views/water/bench/bench-fields.ts';
import { outcomeOf } from '../../../src/views/water/bench/bench-outcome.ts';
import { benchToQuery, choicesFromQuery, numbersFromQuery } from '../../../src/views/water/bench/bench-query.ts';
import { plainFigures, withError } from '../../../src/views/water/bench/bench-words.ts';

const start = numbersFromQuery({});
const choices = choicesFromQuery({});
/** The start of the bench, with some numbers changed; none is empty. */
const given = (change: Partial<Record<BenchNumber, number>> = {}) => {
  const numbers = Object.fromEntries(BENCH_NUMBERS.map((name) => [name, BENCH_FIELDS[name].start]));
  return { ...numbers, ...change } as Record<BenchNumber, number>; // built from all names
};
const chosen = (change: Partial<BenchChoices> = {}): BenchChoices => ({ ...choices, ...change });

describe('the address of the bench', () => {
  it('is empty where nothing was touched', () => {
    expect(benchToQuery(start, choices)).toEqual({});
  });

  it('brings every number and choice back', () => {
    const number = fc.option(fc.double({ min: -1e6, max: 1e6, noNaN: true }), { nil: null });
    const numbers = fc.record(Object.fromEntries(BENCH_NUMBERS.map((name) => [name, number])));
    fc.assert(
      fc.property(
        numbers,
        fc.constantFrom(...BENCH_CHOICES.tool),
        fc.constantFrom(...BENCH_CHOICES.pair),
        (some, tool, pair) => {
          const query = benchToQuery({ ...start, ...some }, chosen({ tool, pair }));
          const texts = Object.fromEntries(Object.entries(query).map(([name, value]) => [name, String(value)]));
          const back = numbersFromQuery(texts);
          for (const name of BENCH_NUMBERS) {
            const value = some[name] ?? null;
            if (value === null) expect(back[name]).toBeNull();
            else expect(Math.abs((back[name] ?? NaN) - value)).toBeLessThanOrEqual(1e-8 * Math.abs(value));
          }
          expect(choicesFromQuery(texts)).toEqual(chosen({ tool, pair }));
        },
      ),
    );
  });

  it('when it holds what is no number or no choice, the bench starts as usual', () => {
    expect(numbersFromQuery({ salinity: 'salty', ph: 'Infinity', volumeL: ['1', '2'] })).toEqual(start);
    expect(choicesFromQuery({ tool: 'spells', pair: ['dic-ph'] })).toEqual(choices);
  });
});

describe('what a calculator says', () => {
  it('when a field is empty, asks for it by its name', () => {
    const outcome = outcomeOf({ ...start, volumeL: null }, ['salinity', 'volumeL'], () => 1);
    expect(outcome).toEqual({ value: null, problem: 'Fill in “System volume”.' });
  });

  it('when the numbers are refused, says why', () => {
    const outcome = outcomeOf({ ...start, salinity: 50 }, ['salinity'], ({ salinity }) =>
      solveCarbonate({ salinity, temperatureC: 25, ph: 8, alkalinityUmolKg: 2300 }),
    );
    expect(outcome.problem).toBe('Salinity must be between 19 and 43.');
  });

  it.each([
    [462.3, 128.7, '460 ± 130'],
    [2431, 115, '2,430 ± 120'],
    [4.213, 0.78, '4.2 ± 0.8'],
    [8.2, 0.098, '8.20 ± 0.10'],
    [421.3, 19.6, '421 ± 20'],
  ])('%d off by %d is told as %s', (value, error, text) => {
    expect(withError(value, error)).toBe(text);
  });

  it.each([
    [8, '8'],
    [2788.0912, '2,788.1'],
    [0.000123456, '0.00012346'],
  ])('%d is told as %s', (value, text) => {
    expect(plainFigures(value, 5)).toBe(text);
  });
});

describe('carbonate system on the bench', () => {
  it('every pair of one water tells the same water', () => {
    const { state } = benchCarbonate(given({ ph: 8.2 }), chosen({ pair: 'alkalinity-ph', phScale: 'nbs' }));
    const same = given({ ph: state.phNbs, dicUmolKg: state.dicUmolKg, pco2Uatm: state.pco2Uatm });
    for (const pair of BENCH_CHOICES.pair) {
      expect(PAIRS[pair].fields).toHaveLength(2);
      const other = benchCarbonate(same, chosen({ pair, phScale: 'nbs' })).state;
      expect(other.phTotal).toBeCloseTo(state.phTotal, 8);
      expect(other.omegaAragonite).toBeCloseTo(state.omegaAragonite, 7);
    }
  });

  it('what was measured keeps the error of its test', () => {
    const { sd, state } = benchCarbonate(given(), chosen());
    expect(sd?.phNbs).toBeCloseTo(0.05, 3);
    expect((sd?.pco2Uatm ?? 0) / state.pco2Uatm).toBeGreaterThan(0.1);
  });

  it('at the edge of what the constants hold for, tells the state without errors', () => {
    const { sd, state } = benchCarbonate(given({ salinity: 43 }), chosen({ pair: 'dic-ph' }));
    expect(sd).toBeNull();
    expect(
      outcomeOf({ ...start, salinity: 60 }, ['salinity'], () => benchCarbonate(given({ salinity: 60 }), choices))
        .problem,
    ).toBe('Salinity must be between 19 and 43.');
    expect(state.phTotal).toBeGreaterThan(7);
  });
});

describe('a dose on the bench', () => {
  const amounts = { volumeL: 1000, limewaterL: 10, strengthMeqL: 40, powderG: 84.006 };

  it('bicarbonate brings a carbon with each equivalent, carbonate half of one, limewater none', () => {
    const bicarbonate = doseOf(amounts, { dosed: 'sodium_bicarbonate', topOff: 'replaces' });
    // 84.006 g is one mole of sodium bicarbonate (CIAAW abridged weights).
    expect(bicarbonate).toEqual({
      alkalinityMeqL: expect.closeTo(1, 10),
      calciumMgL: 0,
      dicMmolL: expect.closeTo(1, 10),
    });
    const carbonate = doseOf(amounts, { dosed: 'sodium_carbonate', topOff: 'replaces' });
    expect((carbonate.dicMmolL ?? 0) / carbonate.alkalinityMeqL).toBeCloseTo(0.5, 12);
    expect(doseOf(amounts, { dosed: 'limewater', topOff: 'adds' })).toMatchObject({
      alkalinityMeqL: 0.4,
      waterLPerL: 0.01,
    });
  });

  it('when a dose is small, nothing speaks against it; when it is large, all does', () => {
    const limits = { phLimit: 8.5, phRise: 0.2, omegaLimit: 7 };
    const water = { salinity: 35, temperatureC: 25, alkalinityMeqL: 2.85, calciumMgL: 420, phNbs: 8.2 };
    const after = (limewaterL: number) =>
      doubts(doseEffect(water, doseOf({ ...amounts, limewaterL }, { dosed: 'limewater', topOff: 'replaces' })), limits);
    expect(after(2)).toEqual([]);
    expect(after(40)).toEqual([
      'the pH jumps by more than 0.2',
      'the pH passes 8.5',
      'above a saturation of 7 chalk drops out',
    ]);
  });
});
