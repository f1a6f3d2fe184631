import { z } from 'zod';
import type { Endpoint } from '../../../shared/contracts/endpoint.ts';

/** The part of JSON Schema that the contracts turn into. */
interface Schema {
  type?: string;
  format?: string;
  enum?: unknown[];
  const?: unknown;
  minimum?: number;
  exclusiveMinimum?: number;
  items?: Schema;
  properties?: Record<string, Schema>;
  required?: string[];
  anyOf?: Schema[];
  oneOf?: Schema[];
}
export type Path = readonly (string | number)[];

/** Real values by the name of their field, so that a sample reaches the rules behind the contract. */
export type KnownValues = Readonly<Record<string, unknown>>;

/** A request part that fits its contract: what must be there, and what `chosen` gives beside it where it has a place. */
export function sampleOf(
  schema: z.ZodType | undefined,
  known: KnownValues,
  chosen: KnownValues = {},
): Record<string, unknown> {
  if (!schema) return {};
  const { properties = {}, ...shape } = schemaOf(schema);
  const extra = Object.keys(properties).filter((name) => chosen[name] !== undefined);
  const required = [...new Set([...(shape.required ?? []), ...extra])];
  return sample({ ...shape, properties, required }, '', { ...known, ...chosen }) as Record<string, unknown>;
}

/** The places of all single values of a request part, the optional ones too; lists by their first entry. */
export function leavesOf(schema: z.ZodType | undefined): Path[] {
  return schema ? leaves(schemaOf(schema), []) : [];
}

/** Names of the `:parts` of an endpoint's path. */
export function pathNames({ path }: Endpoint): string[] {
  return [...path.matchAll(/:([a-zA-Z]+)/g)].map((match) => String(match[1]));
}

/** A copy with one value changed, or left out where it is undefined. */
export function withValue(whole: unknown, path: Path, value: unknown): unknown {
  const [first, ...rest] = path;
  if (first === undefined) return value;
  const changed = withValue((whole as Record<string | number, unknown> | undefined)?.[first], rest, value);
  if (typeof first === 'number') {
    return Array.isArray(whole) ? whole.map((each: unknown, index) => (index === first ? changed : each)) : [changed];
  }
  return { ...(whole as Record<string, unknown> | undefined), [first]: changed };
}

function schemaOf(schema: z.ZodType): Schema {
  return z.toJSONSchema(schema, { io: 'input', unrepresentable: 'any' }) as Schema;
}

function choice(schema: Schema): Schema {
  return (schema.anyOf ?? schema.oneOf)?.[0] ?? schema;
}

function sample(schema: Schema, name: string, known: KnownValues): unknown {
  if (name in known) return known[name];
  const { type, properties = {}, required = [], items, ...rest } = choice(schema);
  if (rest.const !== undefined) return rest.const;
  if (rest.enum) return rest.enum[0];
  if (type === 'object') {
    return Object.fromEntries(required.map((key) => [key, sample(properties[key] ?? {}, key, known)]));
  }
  if (type === 'array') return [sample(items ?? {}, '', known)];
  if (type === 'boolean') return false;
  if (type === 'integer' || type === 'number') return Math.max(rest.minimum ?? rest.exclusiveMinimum ?? 1, 1);
  if (rest.format === 'date') return '2026-02-20';
  if (rest.format === 'email') return 'someone@example.com';
  return 'Some text of this length';
}

function leaves(schema: Schema, path: Path): Path[] {
  const { type, properties = {}, items } = choice(schema);
  if (type === 'object') return Object.entries(properties).flatMap(([key, each]) => leaves(each, [...path, key]));
  if (type === 'array') return [path, ...leaves(items ?? {}, [...path, 0])];
  return [path];
}
