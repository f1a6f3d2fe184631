import { GRADES, type GradeCode } from '@shared/domain/growth.ts';
import { GROWTH_FORMS } from '@shared/domain/growth-forms.ts';
import type { PlugPage, StockAct } from '@shared/contracts/stock.ts';
import type { Tone } from '@/components/tone.ts';
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
