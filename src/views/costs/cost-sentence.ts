import type { CostOverview } from '@shared/contracts/costs.ts';
import type { Sentence } from '@/components/sentence.ts';
import { THIN_SPACE, formatNumber } from '@/formatting/format-number.ts';
import { KIND_WORDS } from '@/views/supplies/supply-words.ts';

/** The opening sentence of the costs: what a living frag carries, and where it is most. */
export function costSentence(costs: CostOverview, money: (micro: number) => string): Sentence {
  const { perLivingMicro, limePerLivingMicro, lines, used } = costs;
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
    after: ` of supplies so far${lime}.${biggestPart(used)}${most}`,
  };
}

/** Names what most of the systems' cost goes into, where there is one such thing. */
function biggestPart(used: CostOverview['used']): string {
  const [first] = used;
  const all = used.reduce((sum, { costMicro }) => sum + costMicro, 0);
  if (!first || used.length === 1 || first.costMicro * 2 < all) return '';
  const percent = formatNumber((first.costMicro / all) * 100);
  return ` Of what the systems cost, ${percent}${THIN_SPACE}% is ${KIND_WORDS[first.kind].toLowerCase()}.`;
}
