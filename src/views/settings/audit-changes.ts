/** One value that a change touched, as text; null where there was or is none. */
export interface FieldChange {
  field: string;
  before: string | null;
  after: string | null;
}

/** What differs between a record before and after, field by field; nested fields by dotted names. */
export function changesBetween(before: unknown, after: unknown): FieldChange[] {
  const old = flattened(before);
  const fresh = flattened(after);
  return (
    [...new Set([...old.keys(), ...fresh.keys()])]
      .map((field) => ({ field, before: old.get(field) ?? null, after: fresh.get(field) ?? null }))
      // The count of edits changes with every edit and tells nothing.
      .filter((change) => change.field !== 'version' && change.before !== change.after)
  );
}

/** "user.signed_in" as "User signed in". */
export function actionWords(action: string): string {
  const words = action.replaceAll(/[._]/g, ' ');
  return words.charAt(0).toUpperCase() + words.slice(1);
}

/** "lines.0.holdUntil" as "lines 1, hold until". */
export function fieldWords(field: string): string {
  const parts = field
    .split('.')
    .map((part) => (/^\d+$/.test(part) ? ` ${String(Number(part) + 1)}` : `, ${spaced(part)}`));
  return parts.join('').replace(/^, /, '');
}

function spaced(name: string): string {
  return name.replaceAll(/[A-Z]+/g, (capitals) => ` ${capitals.toLowerCase()}`).trim();
}

function flattened(value: unknown, path = ''): Map<string, string> {
  if (value === null || value === undefined) return new Map();
  if (typeof value !== 'object') return new Map([[path === '' ? 'value' : path, String(value)]]);
  return new Map(
    Object.entries(value).flatMap(([key, part]) => [...flattened(part, path === '' ? key : `${path}.${key}`)]),
  );
}

/** What people call the record: its code, number, name or address; empty where the log holds none of them. */
export function recordName(before: unknown, after: unknown): string {
  const known = flattened(after ?? before);
  return known.get('code') ?? known.get('number') ?? known.get('name') ?? known.get('email') ?? '';
}
