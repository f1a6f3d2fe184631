import type { CostOverview } from '@shared/contracts/costs.ts';
import type { Sentence } from '@/components/sentence.ts';

/** The opening sentence of the costs: what a living frag carries, and where it is most. */
export function costSentence(costs: CostOverview, money: (micro: number) => string): Sentence {
  const { perLivingMicro, limePerLivingMicro, lines } = costs;
  if (perLivingMicro === null || limePerLivingMicro === null) {
    return { before: 'No frag stands on a rack yet, so there is nothing to carry a cost.', number: '', after: '' };
  }
  const lime = limePerLivingMicro > 0 ? `, of it ${money(limePerLivingMicro)} lime` : ', without any lime yet';
  const [dearest] = lines;
  const most =
    lines.length > 1 && dearest && dearest.perLivingMicro !== null && dearest.perLivingMicro > perLivingMicro
      ? ` ${dearest.tradeName} costs most: ${money(dearest.perLivingMicro)}.`
      : '';
  return {
    before: 'A living frag has cost ',
    number: money(perLivingMicro),
    after: ` of supplies so far${lime}.${most}`,
  };
}
