import type { DosingPump, DosingRate } from '@shared/contracts/dosing.ts';
import type { StockSolution } from '@shared/contracts/stock-solutions.ts';
import { MS_PER_DAY } from '@shared/domain/days.ts';
import type { Sentence } from '@/components/sentence.ts';
import { plural } from '@/formatting/plural.ts';

const SOON_DAYS = 7;

interface Dosing {
  rates: readonly DosingRate[];
  pumps: readonly DosingPump[];
  solutions: readonly StockSolution[];
}

/** What runs, and what wants care first: a bottle that runs dry, a pump that drifted. */
export function dosingSentence(
  { rates, pumps, solutions }: Dosing,
  sayDay: (at: number) => string,
  now: number,
): Sentence {
  if (rates.length === 0) {
    const after =
      solutions.length === 0
        ? 'Nothing is dosed steadily. Write a recipe, make a batch, and start a dose on a system’s page.'
        : 'Nothing is dosed steadily. Start a dose on a system’s page.';
    return { before: '', number: '', after };
  }
  const first = [...rates]
    .filter(({ lastsUntil }) => lastsUntil !== null)
    .sort((a, b) => (a.lastsUntil ?? 0) - (b.lastsUntil ?? 0))[0];
  const drifted = pumps.filter(({ clean, retired }) => clean && !retired);
  const care =
    drifted.length > 0 ? ` Clean the tube of ${drifted.map(({ code }) => code).join(', ')}: it drifted over 10 %.` : '';
  const runs = `${plural(rates.length, 'dose')} ${rates.length === 1 ? 'runs' : 'run'}.`;
  if (!first || first.lastsUntil === null) return { before: '', number: runs, after: care };
  const isSoon = first.lastsUntil < now + SOON_DAYS * MS_PER_DAY;
  const isMade = solutions.some(({ itemId }) => itemId === first.itemId);
  const next = isSoon ? (isMade ? ' Make a batch before then.' : ' Order it before then.') : '';
  return {
    before: `${runs} ${first.itemName} lasts until `,
    number: sayDay(first.lastsUntil),
    after: `.${next}${care}`,
  };
}
