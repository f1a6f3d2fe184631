import { z } from 'zod';
import { DomainError } from '../../errors.ts';

/** One calculation with named inputs and outputs, each name with its unit. */
export interface Calculator {
  /** What it tells, in a line. */
  summary: string;
  /**
   * @param input as it came in, checked here
   * @throws {DomainError} `input.invalid` for inputs that are missing, unknown or of the wrong kind; the errors of the
   *   calculation itself for values that it cannot take
   */
  run(input: unknown): Record<string, unknown>;
}

/** A calculation behind the schema of its inputs. */
export function calculator<Schema extends z.ZodType>(
  summary: string,
  schema: Schema,
  work: (input: z.output<Schema>) => Record<string, unknown>,
): Calculator {
  return { summary, run: (input) => work(parse(schema, input)) };
}

/** Null and left out mean the same for an input that need not be given. */
export function optional<Schema extends z.ZodType>(schema: Schema) {
  return schema.nullish().transform((value) => value ?? undefined);
}

export const amount = z.number('must be a number').min(0, 'must be zero or more');
export const anyNumber = z.number('must be a number');

function parse<Schema extends z.ZodType>(schema: Schema, input: unknown): z.output<Schema> {
  const parsed = schema.safeParse(input);
  if (parsed.success) return parsed.data;
  const problems = parsed.error.issues.map(({ path, message }) => [path.join('.'), message].filter(Boolean).join(' '));
  throw new DomainError('input.invalid', `${problems.join('; ')}.`);
}
