import fc from 'fast-check';
import { afterEach, describe, expect, it } from 'vitest';
import { effectScope } from 'vue';
import { useWedgeScanner } from '../../../src/composables/useWedgeScanner.ts';
import { makeBurstReader } from '../../../src/scanning/burst-reader.ts';
import { makeRepeatFilter } from '../../../src/scanning/repeat-filter.ts';

const burst = () => makeBurstReader({ maxGapMs: 60, minLength: 3 });

/** Types a text with the same pause between keys and gives what came of the last one. */
function type(read: ReturnType<typeof burst>, keys: readonly string[], gapMs: number, from = 0) {
  return keys.map((key, index) => read(key, from + index * gapMs)).at(-1);
}

describe('makeBurstReader', () => {
  it.each(['Enter', 'Tab'])('when keys come fast and %s ends them, gives the text', (end) => {
    expect(type(burst(), [...'7Q2KX9M', end], 8)).toEqual({ kind: 'scanned', text: '7Q2KX9M' });
  });

  it('when capitals are made with Shift, Shift is no part of the text', () => {
    expect(type(burst(), ['Shift', 'Q', 'Shift', 'K', '2', 'Enter'], 10)).toEqual({ kind: 'scanned', text: 'QK2' });
  });

  it('when a person types, even fast, hears nothing', () => {
    expect(type(burst(), [...'7Q2KX9M', 'Enter'], 90)).toEqual({ kind: 'none' });
  });

  it('when a person typed something before the scanner, only the scan is taken', () => {
    const read = burst();
    type(read, [...'42'], 200);

    expect(type(read, [...'7Q2KX9M', 'Enter'], 5, 5000)).toEqual({ kind: 'scanned', text: '7Q2KX9M' });
  });

  it.each([
    ['the text is too short', [...'R7', 'Enter']],
    ['there is Enter alone', ['Enter']],
  ])('when %s, hears nothing', (_why, keys) => {
    expect(type(burst(), keys, 5)).toEqual({ kind: 'none' });
  });

  it('when Enter comes long after the keys, hears nothing', () => {
    const read = burst();
    type(read, [...'7Q2KX9M'], 5);

    expect(read('Enter', 1000)).toEqual({ kind: 'none' });
  });

  it('whatever a scanner types, two scans one after the other are two texts', () => {
    const text = fc.string({ unit: 'grapheme-ascii', minLength: 3, maxLength: 80 });
    fc.assert(
      fc.property(text, text, (first, second) => {
        const read = burst();
        expect(type(read, [...first, 'Enter'], 4)).toEqual({ kind: 'scanned', text: first });
        expect(type(read, [...second, 'Enter'], 4, 500)).toEqual({ kind: 'scanned', text: second });
      }),
    );
  });
});

describe('makeRepeatFilter', () => {
  it('when a label stays in view, it counts once', () => {
    const isNew = makeRepeatFilter(1500);

    expect([0, 100, 1400, 2800, 4200].map((at) => isNew('A', at))).toEqual([true, false, false, false, false]);
  });

  it('when a label was away for longer than that, it counts again', () => {
    const isNew = makeRepeatFilter(1500);
    isNew('A', 0);

    expect([isNew('A', 1500), isNew('A', 3001)]).toEqual([false, true]);
  });

  it('when two labels are in view, each counts by itself', () => {
    const isNew = makeRepeatFilter(1500);

    expect([isNew('A', 0), isNew('B', 10), isNew('A', 20), isNew('B', 30)]).toEqual([true, true, false, false]);
  });
});

describe('useWedgeScanner', () => {
  const scope = effectScope();
  const heard: string[] = [];
  scope.run(() => {
    useWedgeScanner({ onCode: (text) => heard.push(text) });
  });

  afterEach(() => {
    heard.length = 0;
    document.body.replaceChildren();
  });

  /** Sends keys as a browser does, with a clock of our own, and lets them change the field. */
  function press(target: HTMLElement, keys: readonly string[], gapMs: number): KeyboardEvent | undefined {
    return keys
      .map((key, index) => {
        const event = new KeyboardEvent('keydown', { key, bubbles: true, cancelable: true });
        Object.defineProperty(event, 'timeStamp', { value: 10_000 + index * gapMs });
        target.dispatchEvent(event);
        if (target instanceof HTMLInputElement && !event.defaultPrevented && key.length === 1) target.value += key;
        return event;
      })
      .at(-1);
  }

  it('when the focus is nowhere, hears the scanner', () => {
    press(document.body, [...'HTTPS://FARM.EXAMPLE.COM/P/7Q2KX9M', 'Enter'], 6);

    expect(heard).toEqual(['HTTPS://FARM.EXAMPLE.COM/P/7Q2KX9M']);
  });

  it('when a field has the focus, its value is as before and its form is not sent', () => {
    const field = document.body.appendChild(document.createElement('input'));
    field.value = '42';
    const told: string[] = [];
    field.addEventListener('input', () => told.push(field.value));

    const end = press(field, [...'7Q2KX9M', 'Enter'], 6);

    expect([heard, field.value, told, end?.defaultPrevented]).toEqual([['7Q2KX9M'], '42', ['42'], true]);
  });

  it('when a person types into a field, leaves it alone', () => {
    const field = document.body.appendChild(document.createElement('input'));

    const end = press(field, [...'7Q2KX9M', 'Enter'], 120);

    expect([heard, field.value, end?.defaultPrevented]).toEqual([[], '7Q2KX9M', false]);
  });

  it('when the page is left, hears nothing more', () => {
    const left = effectScope();
    const alsoHeard: string[] = [];
    left.run(() => {
      useWedgeScanner({ onCode: (text) => alsoHeard.push(text) });
    });
    left.stop();

    press(document.body, [...'7Q2KX9M', 'Enter'], 6);

    expect(alsoHeard).toEqual([]);
  });
});
