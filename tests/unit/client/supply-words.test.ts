import { nameLines } from '../../../src/views/supplies/name-lines.ts';
import { describe, expect, it } from 'vitest';
import type { Item } from '@shared/contracts/supplies.ts';
import { itemSentence, suppliesSentence } from '@/views/supplies/supply-words.ts';
import { costSentence } from '@/views/costs/cost-sentence.ts';

const TODAY = '2026-03-02';

function anItem(
  name: string,
  fields: Partial<Omit<Item, 'advice' | 'use'>> & {
    daysLeft?: number | null;
    orderBy?: string;
    perDay?: number | null;
  } = {},
): Item {
  const { daysLeft = 40, orderBy = '2026-04-01', perDay = 20, ...rest } = fields;
  return {
    ...{
      id: name,
      code: name.toUpperCase(),
      name,
      kind: 'lime',
      unit: 'g',
      packSize: 1000,
      leadTimeDays: 7,
      safetyDays: 5,
    },
    ...{
      supplierId: null,
      supplierName: null,
      strength: 0.95,
      calciumMg: null,
      magnesiumMg: null,
      retired: false,
      version: 1,
      onHand: 800,
      onHandMicro: 0,
    },
    nextExpiry: null,
    state: 'ok',
    advice: {
      ...{ daysLeft, outDay: null, orderByDay: daysLeft === null ? null : orderBy },
      ...{ orderPacks: 2, orderQuantity: 2000, reorderPoint: 240 },
    },
    use: {
      perDay,
      sdPerDay: 0,
      basis: 'consumption',
      windowDays: 28,
      taken: 560,
      takes: 9,
      systems: [],
      demandPerDay: null,
    },
    ...rest,
  };
}

const say = (value: number, unit: string) => `${value} ${unit}`;
const text = ({ before, number, after }: { before: string; number: string; after: string }) => before + number + after;

describe('suppliesSentence', () => {
  it('when nothing is kept, says how to begin', () => {
    expect(text(suppliesSentence([], TODAY))).toContain('Nothing is kept here yet');
  });

  it('when something is out and more is urgent, names it first and counts the others', () => {
    const items = [anItem('Lime', { state: 'out', onHand: 0, daysLeft: 0 }), anItem('Glue', { state: 'order_now' })];
    expect(text(suppliesSentence(items, TODAY))).toBe(
      "Lime: none left. Order 2 packs today. 1 other supply can't wait either.",
    );
  });

  it('when the last day to order is here, says how long it lasts and how long a delivery takes', () => {
    const lime = anItem('Lime', { state: 'order_now', daysLeft: 1.5 });
    expect(text(suppliesSentence([lime], TODAY))).toBe(
      'Lime: 1.5 days left, and a delivery takes 7 days. Order 2 packs today.',
    );
  });

  it('when another supply takes longer to come than the first to run out, both are named', () => {
    const items = [
      anItem('Plugs', { state: 'order_soon', daysLeft: 30, orderBy: '2026-03-05' }),
      anItem('Lime', { daysLeft: 20 }),
    ];
    expect(text(suppliesSentence(items, TODAY))).toBe(
      'First to run out: Lime, in 20 days. Plugs takes longer to come: order 2 packs by Thursday.',
    );
  });

  it('when nothing was used, says so instead of guessing', () => {
    expect(text(suppliesSentence([anItem('Lime', { daysLeft: null, perDay: null })], TODAY))).toContain('Not enough');
  });
});

describe('itemSentence', () => {
  it.each([
    ['lasting well', {}, 'Lasts 40 days at 20 g a day. Order by 1 Apr.'],
    [
      'due soon',
      { state: 'order_soon', orderBy: '2026-03-03' },
      'Lasts 40 days at 20 g a day. Order 2 packs by tomorrow.',
    ],
    ['out', { state: 'out' }, 'None is left. Order 2 packs today, or count again if there is some on the shelf.'],
    ['unknown', { perDay: null, daysLeft: null }, 'Not enough was used yet to say how long it lasts.'],
    ['unused', { perDay: 0, daysLeft: null }, 'None was used in 28 days, so it lasts until someone takes it.'],
  ] as const)('when it is %s, says what to do', (_, fields, sentence) => {
    expect(text(itemSentence(anItem('Lime', fields), TODAY, say))).toBe(sentence);
  });
});

describe('costSentence', () => {
  const money = (micro: number) => `${micro / 1_000_000} EUR`;
  const parts = { limePerLivingMicro: null, vinegarPerLivingMicro: null, cutPerLivingMicro: null };
  const carried = { ...parts, perLivingMicro: null, otherPerLivingMicro: null };
  const none = { asOf: null, living: 0, ...carried, used: [], lines: [], months: [] };

  it('when no frag stands anywhere, says so', () => {
    expect(text(costSentence(none, money))).toContain('nothing to carry a cost');
  });

  it('when frags carry cost, names the mean, its lime and the dearest line', () => {
    const line = { batches: 1, living: 5, totalMicro: 1, ...carried };
    const lines = [
      { ...line, lineId: 'a', code: 'AAA', tradeName: 'Ember Plate', perLivingMicro: 620_000 },
      { ...line, lineId: 'b', code: 'BBB', tradeName: 'Wicket Green', perLivingMicro: 100_000 },
    ];
    expect(
      text(costSentence({ ...none, living: 10, perLivingMicro: 310_000, limePerLivingMicro: 14_000, lines }, money)),
    ).toBe(
      'A living frag has cost 0.31 EUR of supplies so far, of it 0.014 EUR lime. Ember Plate costs most: 0.62 EUR.',
    );
  });

  it('when one kind of supply is most of what the systems use, names it', () => {
    const used = [
      { kind: 'salt' as const, costMicro: 714 },
      { kind: 'lime' as const, costMicro: 286 },
    ];
    const costs = { ...none, living: 10, perLivingMicro: 310_000, limePerLivingMicro: 0, used };

    expect(text(costSentence(costs, money))).toContain('Of what the systems cost, 71\u2009% is salt mix.');
  });
});

describe('the name of a supply in a drawing', () => {
  it.each([
    ['Salt mix', ['Salt mix']],
    ['Lime, calcium hydroxide 95 %', ['Lime, calcium', 'hydroxide 95 %']],
    ['Calcium hydroxide of the purest kind', ['Calcium hydroxide', 'of the purest ki…']],
    ['Unbreakablesupplement', ['Unbreakablesuppl…']],
  ])('breaks %s between words and never drops letters without a sign', (name, lines) => {
    expect(nameLines(name, 17)).toEqual(lines);
  });
});
