import { expect, it } from 'vitest';
import type { TestMethod } from '@shared/contracts/test-methods.ts';
import { MEQ_PER_DKH } from '@shared/domain/units.ts';
import {
  kitNotes,
  type LogDraft,
  resultOf,
  type SheetRow,
  suspicionOf,
  testsOf,
  valueOf,
} from '@/views/water/log-draft.ts';

const NOW = Date.parse('2026-03-02T09:00:00Z');
const DAY = 86_400_000;

function aDraft(fields: Partial<LogDraft> = {}): LogDraft {
  return {
    ...{ parameter: 'alkalinity', text: '8.2', unit: 'dKH', methodId: null, kitLotId: null, confirmed: false },
    ...fields,
  };
}
function aRow(takenAt = NOW - DAY): SheetRow {
  const last = { value: 8.2 * MEQ_PER_DKH, sd: 0.05, takenAt, methodId: 'm', kitLotId: 'a' };
  return { parameter: 'alkalinity', band: null, last, unit: '', methodId: null, kitLotId: null };
}
const method: TestMethod = {
  ...{ id: 'm', parameter: 'alkalinity', name: 'Photometer', unit: 'dKH', error: 0.3, step: 0.1, source: '' },
  ...{ repeatabilitySd: (0.3 / 1.96) * MEQ_PER_DKH, retired: false, readings: 1, calibrations: [], version: 1 },
  lots: [{ id: 'a', methodId: 'm', code: 'A', openedOn: null, expiresOn: '2026-02-01', usedUp: false, version: 1 }],
};

it.each([
  ['8.2', [8.2]],
  ['8,2 8,4  8.3 ', [8.2, 8.4, 8.3]],
  ['8.2/8.4', [8.2, 8.4]],
  ['', []],
  ['8.2 eight', null],
])('“%s” are the tests %j', (text, expected) => {
  expect(testsOf({ text })).toEqual(expected);
});

it('when several tests are typed, the first is the value and the others are its repeats', () => {
  expect(valueOf(aDraft({ text: '8.2 8.4' }))).toMatchObject({ value: 8.2, repeats: [8.4] });
  expect(valueOf(aDraft({ text: ' ' }))).toBeNull();
  expect(valueOf(aDraft({ text: 'eight' }))).toMatchObject({ value: null });
});

it('when a test is odd, it is asked about until it is confirmed; an old last value does not count', () => {
  const odd = aDraft({ text: '8.2 11.5' });
  expect(suspicionOf(odd, aRow(), NOW)).toMatchObject({ kind: 'unusual', at: 1 });
  expect(suspicionOf({ ...odd, confirmed: true }, aRow(), NOW)).toBeNull();
  expect(suspicionOf(odd, aRow(NOW - 30 * DAY), NOW)).toBeNull();
});

it('when tests are typed, what they come to is shown with the error of the method', () => {
  const result = resultOf(aDraft({ methodId: 'm' }), [method], NOW);
  expect((result?.value ?? 0) / MEQ_PER_DKH).toBeCloseTo(8.2, 9);
  expect((result?.error ?? 0) / MEQ_PER_DKH).toBeCloseTo(0.3, 9);
  expect(resultOf(aDraft({ text: '83' }), [method], NOW)).toBeNull();
});

it('when the method is another or the lot has expired, says so', () => {
  const other = { ...method, id: 'n', name: 'Titration', lots: [] };
  expect(kitNotes({ methodId: 'n', kitLotId: null }, aRow(), [method, other], '2026-03-02')).toEqual([
    expect.stringMatching(/Last time it was Photometer/),
  ]);
  expect(kitNotes({ methodId: 'm', kitLotId: 'a' }, aRow(), [method], '2026-03-02')).toEqual([
    expect.stringMatching(/expired/),
  ]);
});
