import type { WaterChangePlan, WaterChangePlans } from '@shared/contracts/water-change-plans.ts';
import type { Day } from '@shared/domain/days.ts';
import type { Sentence } from '@/components/sentence.ts';
import { nearDay } from '@/formatting/format-day.ts';
import { formatNumber } from '@/formatting/format-number.ts';
import { joinWords, plural } from '@/formatting/plural.ts';

interface Sayers {
  litres: (litres: number) => string;
}

/** What is due, what comes next, and whether new water and salt suffice for it. */
export function changesSentence(plans: WaterChangePlans, today: Day, { litres }: Sayers): Sentence {
  const withPlan = plans.items.filter(({ plan }) => plan !== null);
  if (withPlan.length === 0) {
    const after =
      'No system has a habit of water changes yet. Set how often and how much for each, and its needs are told here.';
    return { before: '', number: '', after };
  }
  const due = withPlan.filter(({ nextOn }) => nextOn !== null && nextOn <= today);
  const after = enoughWords(plans, today);
  if (due.length > 0) {
    const codes = joinWords(due.map(({ systemCode }) => systemCode));
    return { before: `Due now: ${codes}, `, number: litres(litresOf(due)), after: ` of new water in all.${after}` };
  }
  const nextOn = withPlan.flatMap((each) => (each.nextOn === null ? [] : [each.nextOn])).sort()[0] ?? today;
  const next = withPlan.filter((each) => each.nextOn === nextOn);
  return {
    before: `Next, ${nearDay(nextOn, today)}: ${joinWords(next.map(({ systemCode }) => systemCode))}, `,
    number: litres(litresOf(next)),
    after: ` of new water in all.${after}`,
  };
}

function litresOf(systems: readonly WaterChangePlan[]): number {
  return systems.reduce((sum, { plan }) => sum + (plan?.litres ?? 0), 0);
}

function enoughWords({ coming, saltOnHandG, horizonDays }: WaterChangePlans, today: Day): string {
  const short = coming.find(({ saltLeftG }) => saltLeftG < 0);
  if (short)
    return ` Salt in store runs out with the change of ${short.systemCode} (${nearDay(short.on, today)}): order before then.`;
  const wants = coming.reduce((sum, { saltG }) => sum + saltG, 0);
  const kg = (grams: number) => `${formatNumber(grams / 1000, { decimals: 1 })} kg`;
  return ` The next ${plural(horizonDays, 'day')} want ${kg(wants)} of salt; ${kg(saltOnHandG)} is in store.`;
}

/** "6 % every 14 days", or that there is none. */
export function habitWords({ plan }: WaterChangePlan): string {
  if (!plan) return 'no habit set';
  const every = plan.everyDays === 1 ? 'every day' : `every ${plan.everyDays} days`;
  const percent = Number((plan.fraction * 100).toFixed(1));
  return `${formatNumber(percent, { decimals: percent % 1 === 0 ? 0 : 1 })} % ${every}`;
}
