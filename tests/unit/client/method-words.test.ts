import { describe, expect, it } from 'vitest';
import type { Calibration, TestMethod } from '@shared/contracts/test-methods.ts';
import { MEQ_PER_DKH } from '@shared/domain/units.ts';
import { biasWords, methodsSentence } from '@/views/water/method-words.ts';

const NOW = Date.parse('2026-03-02T09:00:00Z');
const DAY = 86_400_000;

function aCheck(fields: Partial<Calibration> = {}): Calibration {
  return {
    ...{ id: 'c', methodId: 'm', kitLotId: null, at: NOW - DAY, by: 'Ana', note: '', solution: '', found: [8.4] },
    ...{ referenceValue: 8, referenceSd: 0, mean: 8.4, bias: 0.4 * MEQ_PER_DKH, biasSd: 0.1, corrects: 12 },
    ...{ low: 0.2 * MEQ_PER_DKH, high: 0.6 * MEQ_PER_DKH, isDistinct: true },
    ...fields,
  };
}

function aMethod(fields: Partial<TestMethod> = {}): TestMethod {
  return {
    ...{ id: 'm', parameter: 'alkalinity', name: 'Photometer', unit: 'dKH', error: 0.3, step: 0.1 },
    ...{ repeatabilitySd: 0.05, source: '', retired: false, readings: 40, lots: [], calibrations: [], version: 1 },
    ...fields,
  };
}

describe('words for checks', () => {
  it('a bias is said with its interval in the unit that is read', () => {
    expect(biasWords(aMethod(), aCheck())).toBe('reads 0.4 ± 0.2 dKH too high');
    expect(biasWords(aMethod(), aCheck({ bias: -0.4 * MEQ_PER_DKH }))).toMatch(/too low$/);
    expect(biasWords(aMethod(), aCheck({ isDistinct: false }))).toMatch(/^no bias to be told/);
  });

  it('the page says what is corrected, and which method to check next', () => {
    const titration = aMethod({ id: 'n', parameter: 'calcium', name: 'Titration', readings: 90 });
    const sentence = methodsSentence([aMethod({ calibrations: [aCheck()] }), titration], NOW);

    expect(`${sentence.before}${sentence.number}${sentence.after}`).toBe(
      'The photometer for alkalinity reads 0.4 ± 0.2 dKH too high; 12 readings since then are corrected for it. ' +
        'Check the titration for calcium next: most readings hang on it.',
    );
  });

  it('an old check counts no more', () => {
    const stale = aMethod({ calibrations: [aCheck({ at: NOW - 200 * DAY })] });
    expect(methodsSentence([stale], NOW)).toMatchObject({ number: '0 of 1 method' });
  });
});
