import type { SurvivalGroups } from '@shared/contracts/stock.ts';

type Group = SurvivalGroups['groups'][number];

/** Share of plugs that live at an age, by the curve, in whole per cent with its 95 % band. */
export function livesAt({ steps }: Group, day: number): string {
  const step = steps.findLast((each) => each.day <= day);
  if (!step) return '100 %';
  return `${percent(step.survival)} (${Math.round(step.low * 100)}–${Math.round(step.high * 100)})`;
}

export function percent(share: number): string {
  return `${Math.round(share * 100)} %`;
}
