import { GRADES, type GradeCode } from '@shared/domain/growth.ts';
import { GROWTH_FORMS } from '@shared/domain/growth-forms.ts';
import type { PlugPage, StockAct } from '@shared/contracts/stock.ts';
import type { Tone } from '@/components/tone.ts';
import { formatNumber } from '@/formatting/format-number.ts';
import { plural } from '@/formatting/plural.ts';

export function gradeLabel(code: GradeCode): string {
  return GRADES.find((grade) => grade.code === code)?.label ?? code;
}

export function growthFormLabel(code: string): string {
  return GROWTH_FORMS.find((form) => form.code === code)?.label ?? code;
}

/** "9 days", "14 weeks": how growers say an age. */
export function ageWords(days: number): string {
  return days < 21 ? plural(days, 'day') : plural(Math.round(days / 7), 'week');
}

/** When something was done, by its age: 'today', '3 weeks ago'. */
export function agoWords(days: number): string {
  return days === 0 ? 'today' : `${ageWords(days)} ago`;
}

/** What of a batch or line can be sold and how much of it is promised, said so that it holds where too much is promised. */
export function saleableWords(saleable: number, held: number): string {
  const are = saleable === 0 ? 'None is saleable' : `${formatNumber(saleable)} ${isOrAre(saleable)} saleable`;
  if (held === 0) return `${are}.`;
  const missing = held - saleable;
  if (missing <= 0) return `${are}, ${formatNumber(held)} of them promised.`;
  return `${are} and ${formatNumber(held)} ${isOrAre(held)} promised: ${formatNumber(missing)} ${isOrAre(missing)} missing.`;
}

/** What of a rack is for sale and why the rest is not, after "12 plugs in 96 positions". */
export function rackWords(
  rack: { plugs: number; saleable: number; saleableIn14Days: number; systemKind: string },
  withheld: number,
): string {
  if (rack.plugs === 0) return '.';
  if (rack.systemKind === 'quarantine') return '. It stands in quarantine, so nothing here is for sale.';
  if (withheld === rack.plugs) return ', all of them withheld from sale.';
  const soon = rack.saleableIn14Days;
  const now = rack.saleable === 0 ? 'none' : formatNumber(rack.saleable);
  const later = soon === 0 ? '' : ` and ${formatNumber(soon)} more within 14 days`;
  const kept = withheld === 0 ? '' : ` ${formatNumber(withheld)} ${isOrAre(withheld)} withheld.`;
  return `, ${now} saleable now${later}.${kept}`;
}

/** The parts of a stock that a row on a phone names, those that are nothing left out. */
export function countWords(counts: { alive: number; held: number; withheld: number }): string {
  const { alive, held, withheld } = counts;
  return [
    `${formatNumber(alive)} alive`,
    ...(held > 0 ? [`${formatNumber(held)} promised`] : []),
    ...(withheld > 0 ? [`${formatNumber(withheld)} withheld`] : []),
  ].join(' · ');
}

function isOrAre(count: number): string {
  return count === 1 ? 'is' : 'are';
}

export const PLUG_STATES: Readonly<Record<PlugPage['state'], { label: string; tone: Tone; dashed?: boolean }>> = {
  bench: { label: 'on the bench', tone: 'ochre' },
  healing: { label: 'healing', tone: 'ochre' },
  growing: { label: 'growing', tone: 'slate' },
  saleable: { label: 'saleable', tone: 'kelp' },
  withheld: { label: 'withheld', tone: 'brick', dashed: true },
  quarantine: { label: 'in quarantine', tone: 'ochre' },
  picked: { label: 'picked', tone: 'plum' },
  gone: { label: 'left the stock', tone: 'plain' },
};

export const ACT_WORDS: Readonly<Record<StockAct['kind'], string>> = {
  cut: 'Cut',
  place: 'Placed',
  move: 'Moved',
  loss: 'Lost',
  cull: 'Culled',
  give: 'Given away',
  recut: 'Cut again',
  pick: 'Picked',
  ship: 'Shipped',
  count: 'Counted',
  reversal: 'Undone',
};

export const HEALTH_WORDS = {
  good: { label: 'good', tone: 'kelp' },
  watch: { label: 'watch', tone: 'ochre' },
  poor: { label: 'poor', tone: 'brick' },
} as const satisfies Record<string, { label: string; tone: Tone }>;

/** Letters of CITES source codes in plain words (Resolution Conf. 12.3); papers are the farm's own records. */
export const CITES_WORDS: Readonly<Record<string, string>> = {
  '': 'Not recorded',
  W: 'W, from the wild',
  C: 'C, bred in captivity',
  F: 'F, born in captivity',
  R: 'R, ranched',
  I: 'I, confiscated',
  O: 'O, before the convention',
  U: 'U, not known',
};
