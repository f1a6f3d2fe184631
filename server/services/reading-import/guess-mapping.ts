import type { ColumnRole, DateOrder, ImportMapping } from '../../../shared/contracts/reading-imports.ts';
import { numberFromText } from '../../../shared/domain/number-text.ts';
import type { ParameterCode } from '../../../shared/domain/units.ts';
import type { CsvTable } from './csv-table.ts';

const SAMPLE_ROWS = 200;

/** The first that fits wins. `mg` is magnesium only where it is not part of a unit; units are cut off before. */
const ROLE_WORDS: readonly [ColumnRole, RegExp][] = [
  ['alkalinity', /^(alk|alkalinity|kh|dkh|ta)\b/],
  ['calcium', /^(ca|calcium)\b/],
  ['magnesium', /^(mg|magnesium)\b/],
  ['salinity', /^(sal|salinity|sg|specific gravity|density)\b/],
  ['temperature', /^(temp|temperature|water temp)/],
  ['ph', /^ph\b/],
  ['nitrate', /^(nitrate|no3)\b/],
  ['phosphate', /^(phosphate|po4)\b/],
  ['taken', /^(taken|date ?\/? ?time|datetime|timestamp|measured|sampled|when)/],
  ['day', /^(date|day)\b/],
  ['time', /^(time|clock|hour)\b/],
  ['system', /^(system|tank|raceway)\b/],
  ['method', /^(method|kit|test)\b/],
  ['note', /^(note|notes|comment|comments|remark|remarks)\b/],
];

/** Units as they are written in heads, for each quantity that can be in more than one. */
const UNIT_WORDS: readonly [ParameterCode, string, RegExp][] = [
  ['alkalinity', 'dKH', /\bd?kh\b|°dh|\bdh\b/],
  ['alkalinity', 'meq/L', /meq|mval|mmol/],
  ['alkalinity', 'ppm', /ppm|mg ?\/ ?l|caco3/],
  ['salinity', 'sg', /\bsg\b|specific gravity|density/],
  ['salinity', 'ppt', /ppt|psu|‰|g ?\/ ?kg/],
  ['temperature', 'F', /°f|\bf\b|fahrenheit/],
  ['temperature', 'C', /°c|\bc\b|celsius/],
];

/** What the columns of a file probably mean, for a person to look over. */
export function guessMapping({ heads, rows }: CsvTable, systemId: string | null): ImportMapping {
  const sample = rows.slice(0, SAMPLE_ROWS);
  const taken = new Set<ColumnRole>();
  const columns = heads.map((head, index) => {
    const role = roleOf(head, taken);
    if (role !== 'ignore') taken.add(role);
    return { role, unit: unitOf(head, role, valuesOf(sample, index)) };
  });
  // "Date" beside a column of times is a day; alone it may hold both.
  const dayOnly = taken.has('day') && !taken.has('time') && !taken.has('taken');
  const dated = dayOnly
    ? columns.map((each) => (each.role === 'day' ? { ...each, role: 'taken' as const } : each))
    : columns;
  const dateColumn = dated.findIndex(({ role }) => role === 'taken' || role === 'day');
  return { columns: dated, dateOrder: dateOrderOf(sample.map(({ cells }) => cells[dateColumn] ?? '')), systemId };
}

function roleOf(head: string, taken: ReadonlySet<ColumnRole>): ColumnRole {
  const words = head
    .toLowerCase()
    .replace(/[([{].*$/, '')
    .replace(/[_,;:]+/g, ' ')
    .trim();
  const found = ROLE_WORDS.find(([role, pattern]) => pattern.test(words) && !taken.has(role));
  return found?.[0] ?? 'ignore';
}

function unitOf(head: string, role: ColumnRole, values: readonly number[]): string {
  const named = UNIT_WORDS.find(([quantity, , pattern]) => quantity === role && pattern.test(head.toLowerCase()));
  if (named) return named[1];
  const middle = [...values].sort((a, b) => a - b)[Math.floor(values.length / 2)];
  if (middle === undefined) return '';
  // The ranges of seawater in these units do not meet.
  if (role === 'alkalinity') return middle > 30 ? 'ppm' : middle > 5 ? 'dKH' : 'meq/L';
  if (role === 'salinity') return middle < 2 ? 'sg' : 'ppt';
  if (role === 'temperature') return middle > 45 ? 'F' : 'C';
  return '';
}

function valuesOf(rows: CsvTable['rows'], index: number): number[] {
  return rows.flatMap(({ cells }) => numberFromText(cells[index] ?? '') ?? []);
}

function dateOrderOf(dates: readonly string[]): DateOrder {
  const parts = dates.map((date) => date.split(/[-/. T]/).map(Number));
  if (parts.some(([first = 0]) => first > 31)) return 'ymd';
  return parts.some(([, second = 0]) => second > 12) ? 'mdy' : 'dmy';
}
