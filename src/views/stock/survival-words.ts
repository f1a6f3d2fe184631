import type { SurvivalGroups } from '@shared/contracts/stock.ts';
import { formatNumber } from '@/formatting/format-number.ts';

type Group = SurvivalGroups['groups'][number];

/** Above this share whole per cents would hide the band. */
const NEARLY_ALL = 0.95;
/** The band's two ends stay on one line. */
const DASH = '\u2060–\u2060';

/** Share of plugs that live at an age, by the curve, in per cent with its 95 % band. */
export function livesAt({ steps }: Group, day: number): string {
  const step = steps.findLast((each) => each.day <= day);
  if (!step) return '100 %';
  const inPercent = (share: number) => formatNumber(100 * share, { decimals: step.survival > NEARLY_ALL ? 1 : 0 });
  return `${inPercent(step.survival)} % (${inPercent(step.low)}${DASH}${inPercent(step.high)})`;
}

export function percent(share: number): string {
  return `${Math.round(share * 100)} %`;
}
