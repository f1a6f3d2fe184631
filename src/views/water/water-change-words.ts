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
    const sum = due.reduce((total, { plan }) => total + (plan?.litres ?? 0), 0);
    return { before: `Due now: ${codes}, `, number: litres(sum), after: ` of new water in all.${after}` };
  }
  const next = [...withPlan].sort((a, b) => (a.nextOn ?? '').localeCompare(b.nextOn ?? ''))[0];
  return {
    before: `Next: ${next?.systemCode ?? ''} ${nearDay(next?.nextOn ?? today, today)}, `,
    number: litres(next?.plan?.litres ?? 0),
    after: `.${after}`,
  };
}

function enoughWords({ coming, saltOnHandG, horizonDays }: WaterChangePlans, today: Day): string {
  const short = coming.find(({ saltLeftG }) => saltLeftG < 0);
  if (short)
    return ` Salt in store runs out with the change of ${short.systemCode} ${nearDay(short.on, today)}: order before then.`;
  const wants = coming.reduce((sum, { saltG }) => sum + saltG, 0);
  const kg = (grams: number) => `${formatNumber(grams / 1000, { decimals: 1 })} kg`;
  return ` The next ${plural(horizonDays, 'day')} want ${kg(wants)} of salt; ${kg(saltOnHandG)} is in store.`;
}

/** "6 % every 14 days", or that there is none. */
export function habitWords({ plan }: WaterChangePlan): string {
  if (!plan) return 'no habit set';
  const every = plan.everyDays === 1 ? 'every day' : `every ${plan.everyDays} days`;
  return `${formatNumber(plan.fraction * 100, { decimals: 1 })} % ${every}`;
}
