import { z } from 'zod';
import { parsePlugCode } from '../plug-code.ts';
import { calculator } from './calculator.ts';

export const codeCalculator = calculator(
  'whether a text is a plug code, and the one near it that is where it is not',
  z.strictObject({ text: z.string('must be a text').max(500, 'must be at most 500 characters') }),
  ({ text }) => {
    const parsed = parsePlugCode(text);
    return 'code' in parsed
      ? { code: parsed.code, valid: true, suggestion: null }
      : { code: null, valid: false, suggestion: parsed.suggestion ?? null };
  },
);
