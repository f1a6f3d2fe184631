import { expect, it } from 'vitest';
import { MIXING_CAUTIONS, mixingSteps, spoonWords } from '../../../shared/domain/mixing-steps.ts';

const WORDS = {
  litres: (amount: number) => `${amount} L`,
  grams: (amount: number) => `${amount} g`,
  millilitres: (amount: number) => `${amount} mL`,
};
const codes = (mix: { limeG: number; vinegarMl: number }) =>
  mixingSteps({ waterL: 50, ...mix }, WORDS).map(({ code }) => code);

// The order of work is common practice, no source; goggles and gloves first as in ICSC 0408.
it('mixingSteps: gloves, water, powder, vinegar last, then cover, label and settle', () => {
  expect(codes({ limeG: 60, vinegarMl: 200 })).toEqual([
    ...['protect', 'water', 'lime', 'stir', 'vinegar', 'cover', 'label', 'settle'],
  ]);
});

it('mixingSteps: what is not in the mix is not on the card', () => {
  expect(codes({ limeG: 60, vinegarMl: 0 })).not.toContain('vinegar');
  expect(codes({ limeG: 0, vinegarMl: 0 })).toEqual(['protect', 'water', 'cover', 'label']);
});

it('mixingSteps: says the amounts, and the spoons where one was weighed', () => {
  const said = (spoons: string | null) =>
    mixingSteps({ waterL: 50, limeG: 60, vinegarMl: 0 }, WORDS, spoons).find(({ code }) => code === 'lime')?.text;

  expect(said(null)).toBe('Sprinkle in 60 g of lime.');
  expect(said('24 level spoons')).toBe('Sprinkle in 60 g of lime (24 level spoons).');
});

it('spoonWords: to the nearest half', () => {
  expect(spoonWords(60, 2.5)).toBe('about 24 level spoons');
  expect(spoonWords(61, 2.5)).toBe('about 24.5 level spoons');
  expect(spoonWords(2.4, 2.5)).toBe('about 1 level spoon');
});

it('spoonWords: without a weighed spoon, without lime, or beyond counting, says nothing', () => {
  expect([spoonWords(60, null), spoonWords(0, 2.5), spoonWords(400, 2.5)]).toEqual([null, null, null]);
});

it('the cautions name the hazard, the first aid and what comes first', () => {
  const all = MIXING_CAUTIONS.join(' ');

  for (const word of ['caustic', 'goggles', 'doctor', 'safety sheet', 'local rules', 'electrician']) {
    expect(all).toContain(word);
  }
});
