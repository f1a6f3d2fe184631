import type { TodayText } from '../../shared/contracts/today.ts';
import type { AlertEnd, AlertFacts, SeenChange } from '../../shared/domain/alert-rules.ts';
import { MS_PER_DAY } from '../../shared/domain/days.ts';
import { PARAMETERS, type ParameterCode } from '../../shared/domain/units.ts';

/** What an alert is about and what to do, in words; values stay values, for each reader's own unit. */
export interface AlertWords {
  title: TodayText;
  detail: TodayText;
}

type Facts<Kind extends AlertFacts['kind']> = Extract<AlertFacts, { kind: Kind }>;

/** @param system code and name of the system */
export function alertWords(facts: AlertFacts, system: string, now: number): AlertWords {
  switch (facts.kind) {
    case 'out_of_band':
      return outOfBand(facts, system);
    case 'drifting':
      return drifting(facts, system, now);
    case 'demand_changed':
      return demandChanged(facts, system, now);
    case 'test_overdue':
      return testOverdue(facts, system, now);
    case 'reservoir_empty':
      return {
        title:
          facts.emptyAt <= now
            ? [`Reservoir ${facts.code} should be empty`]
            : [`Reservoir ${facts.code} empty by `, { clock: facts.emptyAt }],
        detail: [
          facts.readyCode ? `${facts.readyCode} has settled and is ready.` : `Nothing stands ready for ${system}.`,
        ],
      };
    case 'limewater_off':
      return {
        title: [`${system} gets no limewater`],
        detail: [`${facts.code} has settled and is ready to go online.`],
      };
    case 'strength_low':
      return {
        title: [`Limewater in ${facts.code} is weak`],
        detail: [
          `The last check found ${Math.round(facts.strengthLeft * 100)} % of what was mixed. Mix anew, and look at its cover.`,
        ],
      };
    case 'replacement_due':
      return {
        title: [`Replace reservoir ${facts.code}`],
        detail: [`It was due ${lengthWords(facts.dueAt, now)} ago, by the days that you let one run.`],
      };
    case 'overfill_risk':
      return overfillRisk(facts, system);
  }
}

/** What ended it, for the history. */
export function endingWords(facts: AlertFacts, end: AlertEnd | null): TodayText {
  if (end === null) return [];
  if (end.by === 'reading') {
    return [`${labelOf(end.parameter)} was tested at `, { quantity: end.parameter, value: end.value }, '.'];
  }
  return [ENDINGS[facts.kind]];
}

/** From when on an acknowledged alert is told of again. */
export function quietWords(facts: AlertFacts): TodayText {
  if (facts.kind === 'out_of_band') {
    const step = { quantity: facts.parameter, value: facts.step, difference: true } as const;
    return ['Quiet until it is ', step, ' further out.'];
  }
  return [QUIET[facts.kind]];
}

const ENDINGS: Record<AlertFacts['kind'], string> = {
  out_of_band: 'Its band or its readings were changed.',
  drifting: 'It holds now.',
  demand_changed: 'Demand is as it was, or the new one has become the usual one.',
  test_overdue: 'The test is not asked for any more.',
  reservoir_empty: 'The reservoir was swapped or filled, or lasts longer.',
  limewater_off: 'A reservoir is online again.',
  strength_low: 'The reservoir was mixed anew or replaced.',
  replacement_due: 'The reservoir was replaced.',
  overfill_risk: 'What stands in the reservoir is no risk now.',
};

const QUIET: Record<Exclude<AlertFacts['kind'], 'out_of_band'>, string> = {
  drifting: 'Quiet until it leaves its band.',
  demand_changed: 'Quiet until it has changed as much again.',
  test_overdue: 'Quiet for three days more.',
  reservoir_empty: 'Quiet until it is nearer to empty.',
  limewater_off: 'Quiet while it stays so.',
  strength_low: 'Quiet until it is a tenth weaker.',
  replacement_due: 'Quiet for three days more.',
  overfill_risk: 'Quiet while it stays so.',
};

function outOfBand(facts: Facts<'out_of_band'>, system: string): AlertWords {
  const { parameter, value, low, high, backAt, change } = facts;
  const isOut = value < low || value > high;
  const isLow = value < (low + high) / 2;
  const edge = { quantity: parameter, value: isLow ? low : high };
  return {
    title: [parameter === 'ph' ? `${system}: ` : `${system}: ${wordOf(parameter)} `, { quantity: parameter, value }],
    detail: isOut
      ? [
          `${isLow ? 'Below' : 'Above'} its band, which ${isLow ? 'begins' : 'ends'} at `,
          edge,
          ...changeWords(parameter, change),
          '. Test again, then correct.',
        ]
      : [
          'Back inside its band by a hair; it counts as in again ',
          isLow ? 'from ' : 'below ',
          { quantity: parameter, value: backAt },
          isLow ? ' on.' : '.',
        ],
  };
}

function drifting({ parameter, value, leavesAt, change }: Facts<'drifting'>, system: string, now: number): AlertWords {
  const days = Math.max(1, Math.round((leavesAt - now) / MS_PER_DAY));
  const moves = change.changeBy < 0 ? 'falls' : 'rises';
  return {
    title: [`${system}: ${wordOf(parameter)} ${moves}, now `, { quantity: parameter, value }],
    detail: [
      days === 1 ? 'It leaves its band in about a day' : `It leaves its band in about ${days} days`,
      ...changeWords(parameter, change),
      '.',
    ],
  };
}

function changeWords(parameter: ParameterCode, change: SeenChange | null): TodayText {
  if (!change || change.changeBy === 0) return [];
  const { changeBy, changeDays } = change;
  return [
    `; it ${changeBy < 0 ? 'fell' : 'rose'} by `,
    { quantity: parameter, value: Math.abs(changeBy), difference: true },
    changeDays === 1 ? ' in a day' : ` in ${changeDays} days`,
  ];
}

function demandChanged(facts: Facts<'demand_changed'>, system: string, now: number): AlertWords {
  const { expected, now: is, half, since } = facts;
  const up = is > expected;
  const amount = (value: number) => ({ quantity: 'alkalinity' as const, value, difference: true });
  return {
    title: [`${system}: demand is ${up ? 'up' : 'down'} by `, amount(Math.abs(is - expected)), ' a day'],
    detail: [
      'By its stock and growth it should be ',
      amount(expected),
      '; it is ',
      amount(is),
      ', ± ',
      amount(half),
      `, over ${lengthWords(since, now)}. `,
      up ? 'Look for precipitation, then test again.' : 'Look at the corals and at temperature.',
    ],
  };
}

function overfillRisk({ code, litres, changeMeqL, ph, harmlessL }: Facts<'overfill_risk'>, system: string): AlertWords {
  const volume = (value: number) => ({ quantity: 'volume' as const, value });
  return {
    title: [`${code} holds more than ${system} could take at once`],
    detail: [
      'If the top-off sticks, ',
      volume(litres),
      ' raise alkalinity by ',
      { quantity: 'alkalinity', value: changeMeqL, difference: true },
      ', and bring the water to ',
      { quantity: 'ph', value: ph },
      '. Fit a second, independent cut-off',
      ...(harmlessL === null ? ['.'] : [', or keep at most ', volume(harmlessL), ' in it.']),
    ],
  };
}

function testOverdue({ parameter, lastAt }: Facts<'test_overdue'>, system: string, now: number): AlertWords {
  const days = lastAt === null ? null : Math.floor((now - lastAt) / MS_PER_DAY);
  return {
    title: [`Test ${wordOf(parameter)} in ${system}`],
    detail: [
      days === null
        ? 'It was never tested here.'
        : days === 0
          ? 'The last test was less than a day ago.'
          : days === 1
            ? 'The last test was a day ago.'
            : `The last test was ${days} days ago.`,
    ],
  };
}

function lengthWords(since: number, now: number): string {
  const days = Math.max(1, Math.round((now - since) / MS_PER_DAY));
  return days === 1 ? 'a day' : `${days} days`;
}

function labelOf(parameter: ParameterCode): string {
  return PARAMETERS.find(({ code }) => code === parameter)?.label ?? parameter;
}

function wordOf(parameter: ParameterCode): string {
  const label = labelOf(parameter);
  return label === 'pH' ? label : label.toLowerCase();
}
