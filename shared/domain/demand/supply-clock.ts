import { MS_PER_DAY } from '../days.ts';
import type { SupplyInterval } from '../reservoir-use.ts';

/** What was supplied over a stretch, and what its error grows with. */
export interface Supplied {
  amount: number;
  /** ∫ rate² dt in days, with the squares of single doses: times the square of a relative daily error it is a variance. */
  square: number;
}

/**
 * Sums of supply over any stretch, quick however many intervals overlap: running sums at every instant where the rate
 * changes, and a search between them.
 */
export function supplyClock(supply: readonly SupplyInterval[]): (from: number, to: number) => Supplied {
  const marks = runningSums(supply);
  return (from, to) => {
    const [before, after] = [sumsAt(marks, from), sumsAt(marks, to)];
    return { amount: after.amount - before.amount, square: after.square - before.square };
  };
}

interface Mark extends Supplied {
  at: number;
  /** Supply a day from here to the next mark. */
  rate: number;
}

function runningSums(supply: readonly SupplyInterval[]): Mark[] {
  const changes = supply
    .flatMap(({ from, to, meqL }) => {
      if (to <= from) return [{ at: to, rate: 0, dose: meqL }];
      const rate = (meqL * MS_PER_DAY) / (to - from);
      return [
        { at: from, rate, dose: 0 },
        { at: to, rate: -rate, dose: 0 },
      ];
    })
    .sort((a, b) => a.at - b.at);
  const marks: Mark[] = [];
  let mark: Mark = { at: changes[0]?.at ?? 0, rate: 0, amount: 0, square: 0 };
  for (const { at, rate, dose } of changes) {
    mark = { at, ...grown(mark, at), rate: mark.rate + rate };
    mark.amount += dose;
    mark.square += dose ** 2;
    marks.push(mark);
  }
  return marks;
}

function grown({ at, rate, amount, square }: Mark, to: number): Supplied {
  const days = (to - at) / MS_PER_DAY;
  return { amount: amount + rate * days, square: square + rate ** 2 * days };
}

/** Sums up to an instant. What was dosed at that very instant comes after it: people test, then dose. */
function sumsAt(marks: readonly Mark[], at: number): Supplied {
  let [low, high] = [0, marks.length];
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((marks[middle]?.at ?? Infinity) < at) low = middle + 1;
    else high = middle;
  }
  const last = marks[low - 1];
  return last ? grown(last, at) : { amount: 0, square: 0 };
}
