import type { z } from 'zod';

type Path = readonly PropertyKey[];
export type FieldMessages = Record<string, string>;

export type ParsedDraft<Output> = { ok: true; data: Output } | { ok: false; errors: FieldMessages };

/**
 * Parses what stands in a form. An empty field can mean an empty text, a left-out value or null: each contract has its
 * own, so a field that is empty and refused is read again as the next of these.
 */
export function parseDraft<Schema extends z.ZodType>(schema: Schema, draft: unknown): ParsedDraft<z.output<Schema>> {
  let attempt = schema.safeParse(draft);
  if (attempt.success) return { ok: true, data: attempt.data };

  // The first messages are about what the person sees, not about our readings of it.
  const seen = messagesOf(attempt.error);
  let reading = draft;
  for (const blank of [undefined, null]) {
    const blanks = attempt.error.issues.map(({ path }) => path).filter((path) => isBlank(valueAt(draft, path)));
    if (blanks.length === 0) break;
    for (const path of blanks) reading = withValue(reading, path, blank);
    attempt = schema.safeParse(reading);
    if (attempt.success) return { ok: true, data: attempt.data };
  }
  const errors = messagesOf(attempt.error);
  for (const path of Object.keys(errors)) errors[path] = seen[path] ?? errors[path] ?? '';
  return { ok: false, errors };
}

function messagesOf(error: z.ZodError): FieldMessages {
  const messages: FieldMessages = {};
  for (const issue of error.issues) messages[issue.path.join('.')] ??= issue.message;
  return messages;
}

function isBlank(value: unknown): boolean {
  return value === null || value === undefined || value === '';
}

export function valueAt(root: unknown, path: Path): unknown {
  return path.reduce<unknown>(
    (value, key) => (typeof value === 'object' && value !== null ? Reflect.get(value, key) : undefined),
    root,
  );
}

/** A copy with another value at the path; undefined leaves the key out. */
function withValue(root: unknown, path: Path, value: unknown): unknown {
  const [key, ...rest] = path;
  if (key === undefined || typeof root !== 'object' || root === null) return value;
  const copy: object = Array.isArray(root) ? [...(root as unknown[])] : { ...root };
  const inner = withValue(Reflect.get(root, key), rest, value);
  if (inner === undefined) Reflect.deleteProperty(copy, key);
  else Reflect.set(copy, key, inner);
  return copy;
}
