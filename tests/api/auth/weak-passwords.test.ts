import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { assertStrongPassword } from '../../../server/services/weak-passwords.ts';
import { domainErrorOf } from '../../support/domain-error.ts';

const known = ['Ines Ribeira', 'ines.r@example.com', 'Quiet Cove Corals'];

describe('which passwords are refused', () => {
  it.each([
    'password12',
    'P@ssw0rd2026!',
    'passwordpassword',
    'qwertyuiop',
    'Qwertzuiop1',
    '1234567890',
    '0987654321abc',
    'abcdefghijklmn',
    'aaaaaaaaaaaa',
    'abababababab',
    'xk7xk7xk7xk7',
    'letmein2026',
    'iloveyou1234',
    'dragon monkey',
    'sunshine!!!!',
    'correct horse battery staple',
    'CorrectHorseBatteryStaple1',
    'coralreef2026',
    'limestead2026',
    'zxcvbnm,./12',
    'Ribeira in the rain',
    'r1b31ra in the rain',
    'ines.r@example.com',
    'quietcovecorals',
    'Quiet Cove Corals',
  ])('refuses %s', (password) => {
    const error = domainErrorOf(() => assertStrongPassword(password, known));

    expect(error.code).toBe('input.invalid');
    expect(error.fields).toMatchObject([{ path: 'password' }]);
  });

  it.each([
    'grey heron over the weir',
    'nine buckets before noon',
    'vK4-tum9-Lox',
    'Möwen über Sülze',
    '潮が満ちる前に網を上げる',
    'h7#kQz!v2pW',
    'two left gloves, one dry',
  ])('takes %s', (password) => {
    expect(() => assertStrongPassword(password, known)).not.toThrow();
  });

  it('however a common word is dressed up with digits for letters and a year, it is refused', () => {
    const word = fc.constantFrom('password', 'sunshine', 'butterfly', 'chocolate');
    const dressed = fc
      .tuple(word, fc.infiniteStream(fc.boolean()), fc.integer({ min: 1950, max: 2030 }))
      .map(([text, choices, year]) => {
        const letters = [...text].map((letter) => {
          const swap: Record<string, string> = { a: '@', e: '3', i: '!', o: '0', s: '$' };
          return choices.next().value ? (swap[letter] ?? letter.toUpperCase()) : letter;
        });
        return `${letters.join('')}${year}`;
      });

    fc.assert(
      fc.property(dressed, (password) => {
        expect(domainErrorOf(() => assertStrongPassword(password, known)).code).toBe('input.invalid');
      }),
    );
  });
});
