/** What came of a key: nothing yet, the first of a possible burst, or a whole text that a scanner typed. */
export type BurstStep = { kind: 'none' } | { kind: 'started' } | { kind: 'scanned'; text: string };

export interface BurstOptions {
  /** Longest pause between two keys of a scanner, ms. People are slower, even when they type fast. */
  maxGapMs: number;
  minLength: number;
}

const NONE: BurstStep = { kind: 'none' };

/** Tells a scanner that acts as a keyboard from a person at one: many keys without a pause, then Enter or Tab. */
export function makeBurstReader({ maxGapMs, minLength }: BurstOptions): (key: string, at: number) => BurstStep {
  let text = '';
  let lastAt = Number.NEGATIVE_INFINITY;

  return (key, at) => {
    const continues = at - lastAt <= maxGapMs;
    if (key === 'Enter' || key === 'Tab') {
      const scanned = continues && text.length >= minLength ? text : null;
      text = '';
      lastAt = Number.NEGATIVE_INFINITY;
      return scanned === null ? NONE : { kind: 'scanned', text: scanned };
    }
    // Shift and the like come between the capitals of one burst.
    if ([...key].length !== 1) return NONE;
    text = continues ? text + key : key;
    lastAt = at;
    return text === key ? { kind: 'started' } : NONE;
  };
}
