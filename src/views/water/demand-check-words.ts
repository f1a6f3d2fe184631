import type { DemandCheck } from '@shared/contracts/demand.ts';
import { CALCIUM_MG_PER_MEQ } from '@shared/domain/dose-effect.ts';
import type { Tone } from '@/components/tone.ts';
import { formatWithError } from '@/formatting/format-number.ts';

/** How amounts are put into words, in the units that the person chose. */
export interface CheckWords {
  /** A rate of alkalinity with its unit, and its error where it has one. */
  rate: (meqLPerDay: number, error?: number) => string;
  /** A change of alkalinity with its unit. */
  level: (meqL: number) => string;
  nitrate: (mgL: number, error: number) => string;
  salinity: (salinity: number) => string;
  day: (at: number) => string;
}

export interface CheckText {
  tag: { word: string; tone: Tone };
  text: string;
}

const SKELETON = CALCIUM_MG_PER_MEQ.toFixed(2);

/** What a check found, as a sentence with its numbers. */
export function checkText(check: DemandCheck, words: CheckWords): CheckText {
  switch (check.code) {
    case 'calcium_agrees':
      return {
        tag: { word: 'agrees', tone: 'kelp' },
        text: `Calcium goes with alkalinity: ${ratio(check)} for each meq, and skeleton takes ${SKELETON}.`,
      };
    case 'calcium_exceeds':
      return {
        tag: { word: 'look', tone: 'ochre' },
        text: `More calcium goes than skeleton takes: ${ratio(check)} for each meq of alkalinity instead of ${SKELETON}. Check the calcium test, and what else was given.`,
      };
    case 'alkalinity_alone':
      return { tag: { word: 'look', tone: 'ochre' }, text: alkalinityAlone(check, words) };
    case 'may_precipitate':
      return { tag: { word: 'look', tone: 'ochre' }, text: mayPrecipitate(check, words) };
    case 'salinity_moved':
      return { tag: { word: 'note', tone: 'slate' }, text: salinityMoved(check, words) };
    case 'changed':
      return { tag: { word: 'look', tone: 'ochre' }, text: changed(check, words) };
    case 'stepped':
      return { tag: { word: 'look', tone: 'ochre' }, text: stepped(check, words) };
  }
}

type Of<Code extends DemandCheck['code']> = Extract<DemandCheck, { code: Code }>;

function ratio({ ratio: value, half }: { ratio: number; half: number }): string {
  const shown = formatWithError(value, half);
  return `${shown.value} ± ${shown.error} mg`;
}

function alkalinityAlone(check: Of<'alkalinity_alone'>, words: CheckWords): string {
  const { withoutCalcium, nitrate } = check;
  const found = `Alkalinity goes without calcium: ${ratio(check)} for each meq instead of ${SKELETON}, so ${words.rate(withoutCalcium)} a day go some other way.`;
  if (!nitrate) return `${found} Nitrate does not rise enough to explain it: check both tests, and what was given.`;
  const rise = words.nitrate(nitrate.risePerDay, nitrate.half);
  return `${found} Nitrate rises by ${rise} a day, and making it takes ${words.rate(nitrate.takes)} a day of that.`;
}

function mayPrecipitate({ before, now, half, ph, saturation }: Of<'may_precipitate'>, words: CheckWords): string {
  const signs = [
    ...(ph === null ? [] : [`pH was ${ph.toFixed(2)}`]),
    ...(saturation === null ? [] : [`aragonite stood at ${saturation.toFixed(1)} times saturation`]),
  ].join(' and ');
  return `Demand rose from ${words.rate(before)} to ${words.rate(now, half)} a day while ${signs}: part of it may be chalk that forms by itself. Look for white grit on pumps and heaters, and spread doses out.`;
}

function salinityMoved({ from, to, moves }: Of<'salinity_moved'>, words: CheckWords): string {
  const verb = to > from ? 'rose' : 'fell';
  const does = moves > 0 ? 'lifts' : 'lowers';
  return `Salinity ${verb} from ${words.salinity(from)} to ${words.salinity(to)} in two weeks, which alone ${does} alkalinity by ${words.level(Math.abs(moves))}. Levels are brought to today's salinity, so it is not taken for demand.`;
}

function changed({ direction, before, now, half, since }: Of<'changed'>, words: CheckWords): string {
  const verb = direction === 'up' ? 'rose' : 'fell';
  return `Demand ${verb} from ${words.rate(before)} to ${words.rate(now, half)} a day since ${words.day(since)}, by more than tests, stock and growth explain.`;
}

function stepped({ at, by }: Of<'stepped'>, words: CheckWords): string {
  const verb = by > 0 ? 'rose' : 'fell';
  return `Alkalinity ${verb} by ${words.level(Math.abs(by))} before the test of ${words.day(at)}, and nothing that was logged explains it. Was a dose, an overfill or a water change not written down?`;
}
