import { z } from 'zod';

export interface TestCard {
  number: string;
  brand: string;
  meaning: string;
  /** Why the bank refuses, or null where it pays. */
  decline: { code: string; declineCode: string; message: string } | null;
}

export const TEST_CARDS: readonly TestCard[] = [
  { number: '4242424242424242', brand: 'visa', meaning: 'Pays', decline: null },
  {
    number: '4000000000000002',
    brand: 'visa',
    meaning: 'Declined',
    decline: { code: 'card_declined', declineCode: 'generic_decline', message: 'Your card was declined.' },
  },
  {
    number: '4000000000009995',
    brand: 'visa',
    meaning: 'Insufficient funds',
    decline: { code: 'card_declined', declineCode: 'insufficient_funds', message: 'Your card has insufficient funds.' },
  },
];

/** What the form holds, as typed. */
export const CardForm = z.object({
  number: z.string().max(40).default(''),
  expiry: z.string().max(20).default(''),
  cvc: z.string().max(10).default(''),
  name: z.string().max(200).default(''),
});
export type CardForm = z.infer<typeof CardForm>;

export type CardErrors = Partial<Record<keyof CardForm, string>>;

export interface Card {
  card: TestCard;
  expMonth: number;
  expYear: number;
  name: string;
}

/** Reads the form, or says for each wrong field what to do. */
export function readCard(form: CardForm, nowMs: number): { card: Card } | { errors: CardErrors } {
  const number = form.number.replace(/[\s-]/g, '');
  const card = TEST_CARDS.find((each) => each.number === number);
  const expiry = readExpiry(form.expiry);
  const name = form.name.trim();

  const numberError = card === undefined ? explainNumber(number) : undefined;
  const expiryError = explainExpiry(expiry, nowMs);
  const cvcError = /^\d{3}$/.test(form.cvc.trim()) ? undefined : 'Enter the three digits of the security code.';
  const nameError = name === '' ? 'Enter the name on the card.' : undefined;

  if (card !== undefined && expiry !== null && !expiryError && !cvcError && !nameError) {
    return { card: { card, expMonth: expiry.month, expYear: expiry.year, name } };
  }
  return {
    errors: {
      ...(numberError && { number: numberError }),
      ...(expiryError && { expiry: expiryError }),
      ...(cvcError && { cvc: cvcError }),
      ...(nameError && { name: nameError }),
    },
  };
}

/**
 * Whether the last digit of a card number is its right check digit.
 *
 * @see ISO/IEC 7812-1, annex B (the Luhn formula)
 */
export function passesLuhn(digits: string): boolean {
  const sum = [...digits].reverse().reduce((total, digit, place) => {
    const value = Number(digit) * (place % 2 === 1 ? 2 : 1);
    return total + (value > 9 ? value - 9 : value);
  }, 0);
  return sum % 10 === 0;
}

function explainNumber(number: string): string {
  if (number === '') return 'Enter a card number.';
  if (!/^\d+$/.test(number)) return 'Enter digits only.';
  if (number.length < 12 || number.length > 19) return 'A card number has 12 to 19 digits. Check for a missing one.';
  if (!passesLuhn(number)) return 'This card number is not valid. Check its digits.';
  return 'This page takes the listed test cards only. Never enter a real card here.';
}

function readExpiry(text: string): { month: number; year: number } | null {
  const match = /^(\d{1,2})\s*[/-]?\s*(?:20)?(\d{2})$/.exec(text.trim());
  if (match === null) return null;
  const month = Number(match[1]);
  return month >= 1 && month <= 12 ? { month, year: 2000 + Number(match[2]) } : null;
}

/** A card is good to the end of the month that is printed on it. */
function explainExpiry(expiry: { month: number; year: number } | null, nowMs: number): string | undefined {
  if (expiry === null) return 'Enter the month and year, such as 08 / 34.';
  if (Date.UTC(expiry.year, expiry.month) <= nowMs) return 'This date has passed. Use a card that is still good.';
  return undefined;
}
