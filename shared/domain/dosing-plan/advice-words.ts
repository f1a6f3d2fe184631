import type { Advice, AdviceFacts, SupplementAdvice } from './facts.ts';
import type { WaterRules } from './rules.ts';

/** A piece of a sentence; `strong` ones are the numbers it is about. */
export interface AdvicePart {
  text: string;
  strong?: true;
}

/** How amounts are put into words, in the units of whoever reads them. */
export interface AdviceWords {
  /** A change or supply of alkalinity in a day, "0.41 dKH". */
  rate: (meqL: number) => string;
  /** A level of alkalinity, "8.2 dKH". */
  level: (meqL: number) => string;
  litres: (amountL: number) => string;
  grams: (amountG: number) => string;
  millilitres: (amountMl: number) => string;
  /** An amount of a supplement in its own unit, "120 mL". */
  amount: (value: number, unit: string) => string;
  ph: (value: number) => string;
}

/** The facts that the sentence names. */
export type AdviceSaid = Pick<AdviceFacts, 'level' | 'band' | 'demand' | 'water' | 'steady' | 'testsSinceChange'> & {
  plan: { strengthMeqL: number; limeGPerL: number } | null;
};

/** What to do, in a sentence or two. */
export function adviceSentence(advice: Advice, said: AdviceSaid, rules: WaterRules, words: AdviceWords): AdvicePart[] {
  switch (advice.kind) {
    case 'pause':
      return pause(advice, said, rules, words);
    case 'correct_low':
      return [...outside('below', said, words), ...raise(advice, words), ...holding(advice, words)];
    case 'correct_high':
      return [...outside('above', said, words), ...fall(advice, words), ...holding(advice, words)];
    case 'wait_for_tests':
      return [
        plain('Test alkalinity: there is not enough to go by yet. Three tests over at least two days are needed.'),
      ];
    case 'wait_for_levels':
      return [plain('Log the level of the reservoir: what limewater brings is not known, so nothing can be advised.')];
    case 'mix_plan':
      return said.plan === null
        ? [plain('Mix the next reservoir as planned.')]
        : [
            plain('Mix the next reservoir with '),
            strong(`${words.grams(said.plan.limeGPerL)} of lime a litre`),
            plain(', as planned.'),
          ];
    case 'start':
      return [plain('Start gently. '), ...dosing(advice, words)];
    case 'hold':
      return [plain(leaveIt(advice, said))];
    case 'wait_after_change':
      return [plain(waitForTests(said.testsSinceChange, rules.testsBeforeChange))];
    case 'change':
      return [...takes(said, words), ...dosing(advice, words)];
  }
}

/** The sentence as plain text, as it is kept. */
export function adviceText(parts: readonly AdvicePart[]): string {
  return parts.map(({ text }) => text).join('');
}

const plain = (text: string): AdvicePart => ({ text });
const strong = (text: string): AdvicePart => ({ text, strong: true });

function pause({ rules: reached }: Advice, { water }: AdviceSaid, rules: WaterRules, words: AdviceWords): AdvicePart[] {
  return reached.includes('omega_limit')
    ? [
        plain(
          `Stop dosing: so much alkalinity at pH ${words.ph(water.phNbs)} would drop out as chalk. Wait until the pH is lower, and test again.`,
        ),
      ]
    : [
        plain('Stop limewater: the pH reads '),
        strong(words.ph(water.phNbs)),
        plain(`, above your limit of ${words.ph(rules.phLimit)}. Air the water and test again.`),
      ];
}

function outside(side: 'below' | 'above', { level, band }: AdviceSaid, words: AdviceWords): AdvicePart[] {
  if (!level || !band) return [];
  const end = side === 'below' ? band.low : band.high;
  return [
    plain('Correct first: alkalinity is '),
    strong(words.level(level.meqL)),
    plain(`, ${side} ${words.level(end)}. `),
  ];
}

function raise({ correction }: Advice, words: AdviceWords): AdvicePart[] {
  if (!correction) return [plain('The water has no room for a correction now; test pH and alkalinity again. ')];
  const { supplement, days, changePerDay, to } = correction;
  const span = days === 1 ? 'for one day' : `a day for ${days} days`;
  if (!supplement) {
    return [
      plain(
        `No supplement of your list raises alkalinity: add one to bring it ${words.rate(changePerDay)} ${span} to ${words.level(to)}. `,
      ),
    ];
  }
  return [
    plain('Add '),
    strong(`${words.amount(supplement.amountPerDay, supplement.unit)} of ${supplement.name} ${span}`),
    plain(`, up to ${words.level(to)}. `),
  ];
}

function fall({ correction }: Advice, words: AdviceWords): AdvicePart[] {
  if (!correction) return [plain('Dose nothing until it is back in its band. ')];
  const { days, changePerDay } = correction;
  const span = days === 1 ? 'within a day' : `a day over ${days} days`;
  return [plain(`Let it fall ${words.rate(-changePerDay)} ${span}. `)];
}

/** What holds the level beside a correction. */
function holding(advice: Advice, words: AdviceWords): AdvicePart[] {
  if (advice.targetMeqL === null) return [];
  const means = meansParts(advice, words);
  return means.length > 0 ? [plain('Meanwhile '), ...means, plain('.'), ...missing(advice, words)] : [];
}

function dosing(advice: Advice, words: AdviceWords): AdvicePart[] {
  const means = meansParts(advice, words);
  if (means.length === 0) return [plain('Nothing needs to be dosed.')];
  const [first, ...rest] = means;
  return [...(first ? [{ ...first, text: capital(first.text) }] : []), ...rest, plain('.'), ...missing(advice, words)];
}

function meansParts({ limewater, supplements }: Advice, words: AdviceWords): AdvicePart[] {
  const night = limewater?.hours === 12 ? ', at night only,' : '';
  const lime =
    limewater && limewater.limeGPerL > 0
      ? [
          plain('mix limewater with '),
          strong(limeText(limewater, words)),
          plain(`${night} for the ${words.litres(limewater.litresPerDay)} that evaporate a day`),
        ]
      : [];
  const given = supplements.map((each) => supplementText(each, words));
  if (given.length === 0) return lime;
  const list = given.length > 1 ? `${given.slice(0, -1).join(', ')} and ${given.at(-1)}` : given.join('');
  return lime.length > 0 ? [...lime, plain(', and dose '), strong(list)] : [plain('dose '), strong(list)];
}

function limeText({ limeGPerL, vinegarMlPerL }: NonNullable<Advice['limewater']>, words: AdviceWords): string {
  const vinegar = vinegarMlPerL > 0 ? ` and ${words.millilitres(vinegarMlPerL)} of vinegar` : '';
  return `${words.grams(limeGPerL)} of lime${vinegar} a litre`;
}

function supplementText({ amountPerDay, unit, name }: SupplementAdvice, words: AdviceWords): string {
  return `${words.amount(amountPerDay, unit)} of ${name} a day`;
}

function missing({ shortMeqL, rules }: Advice, words: AdviceWords): AdvicePart[] {
  if (!rules.includes('short')) return [];
  return [plain(' That leaves '), strong(`${words.rate(shortMeqL)} a day`), plain(' missing: plan a second method.')];
}

function takes({ demand }: AdviceSaid, words: AdviceWords): AdvicePart[] {
  return demand ? [plain(`The corals take ${words.rate(demand.meqLPerDay)} a day. `)] : [];
}

function leaveIt({ rules }: Advice, { steady }: AdviceSaid): string {
  if (rules.includes('steady') && steady.enough) {
    return `Leave it as it is: ${steady.tests} tests over ${Math.round(steady.days)} days show no trend.`;
  }
  return 'Leave it as it is: what goes in is what the corals take, within the error of the tests.';
}

function waitForTests(done: number, needed: number): string {
  const tests = done === 0 ? 'no test' : done === 1 ? 'one test' : `${done} tests`;
  return `Leave it for now: there ${done === 1 || done === 0 ? 'is' : 'are'} ${tests} since the last change, and ${needed} are needed to see what it did.`;
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
