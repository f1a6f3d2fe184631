import type { AdviceKind } from '@shared/domain/dosing-plan/facts.ts';
import type { Tone } from '@/components/tone.ts';

const TAGS: Record<AdviceKind, { label: string; tone: Tone }> = {
  pause: { label: 'Stop dosing', tone: 'brick' },
  correct_low: { label: 'Correct first', tone: 'brick' },
  correct_high: { label: 'Correct first', tone: 'ochre' },
  wait_for_tests: { label: 'Tests missing', tone: 'slate' },
  wait_for_levels: { label: 'Level missing', tone: 'slate' },
  mix_plan: { label: 'Mix by the plan', tone: 'plum' },
  start: { label: 'Start', tone: 'plum' },
  hold: { label: 'Leave it', tone: 'kelp' },
  wait_after_change: { label: 'Wait', tone: 'slate' },
  change: { label: 'Change', tone: 'plum' },
};

/** An advice in a word or two. */
export function kindTag(kind: AdviceKind): { label: string; tone: Tone } {
  return TAGS[kind];
}

export const OUTCOME_LABELS = {
  accepted: 'Became the plan',
  changed: 'Changed, then the plan',
  dismissed: 'Dismissed',
} as const;
