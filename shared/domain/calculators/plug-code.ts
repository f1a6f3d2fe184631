import { z } from 'zod';
import { foldPlugCode, parsePlugCode } from '../plug-code.ts';
import { calculator } from './calculator.ts';

/**
 * `code`: the text as codes are stored, null where it has not their shape; it stands too where its check is wrong.
 * `suggestion`: the right code one look-alike or one swap of neighbours away, where there is just one.
 */
export const codeCalculator = calculator(
  'whether a text is a plug code, and the one near it that is where it is not',
  z.strictObject({ text: z.string('must be a text').max(500, 'must be at most 500 characters') }),
  ({ text }) => {
    const parsed = parsePlugCode(text);
    return 'code' in parsed
      ? { code: parsed.code, valid: true, suggestion: null }
      : { code: foldPlugCode(text), valid: false, suggestion: parsed.suggestion ?? null };
  },
);
