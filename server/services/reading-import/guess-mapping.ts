import type { ColumnRole, DateOrder, ImportMapping } from '../../../shared/contracts/reading-imports.ts';
import { type DecimalMark, numberFromFile } from '../../../shared/domain/number-text.ts';
import { PARAMETER_CODES } from '../../../shared/domain/units.ts';
import type { CsvTable } from './csv-table.ts';
import { parameterNamed, plainWords, unitNamed } from './words.ts';

const SAMPLE_ROWS = 200;

/** Meanings of columns other than a parameter's own; the first that fits wins. */
const ROLE_WORDS: readonly [ColumnRole, RegExp][] = [
  ['taken', /^(taken|date ?\/? ?time|datetime|timestamp|measured at|sampled|when)/],
  ['day', /^(date|day)\b/],
  ['time', /^(time|clock|hour)\b/],
  ['system', /^(system|tank|raceway)\b/],
  ['parameter', /^(parameter|param|quantity)\b/],
  ['value', /^(value|result|reading)\b/],
  ['unit', /^units?\b/],
  ['lot', /^(kit lot|lot|kit no|batch)\b/],
  ['method', /^(method|kit|test)\b/],
  ['tester', /^(by|tester|operator|tested by|person)\b/],
  ['note', /^(note|notes|comment|comments|remark|remarks)\b/],
];

/** What the columns of a file probably mean, for a person to look over. */
export function guessMapping({ heads, rows }: CsvTable, systemId: string | null): ImportMapping {
  const sample = rows.slice(0, SAMPLE_ROWS);
  const decimalMark = decimalMarkOf(sample);
  const taken = new Set<ColumnRole>();
  const columns = heads.map((head, index) => {
    const role = roleOf(head, taken);
    if (role !== 'ignore') taken.add(role);
    return { role, unit: unitOf(head, role, valuesOf(sample, index, decimalMark)) };
  });
  // "Date" beside a column of times is a day; alone it may hold both.
  const dayOnly = taken.has('day') && !taken.has('time') && !taken.has('taken');
  const dated = dayOnly
    ? columns.map((each) => (each.role === 'day' ? { ...each, role: 'taken' as const } : each))
    : columns;
  const dateColumn = dated.findIndex(({ role }) => role === 'taken' || role === 'day');
  const dateOrder = dateOrderOf(sample.map(({ cells }) => cells[dateColumn] ?? ''));
  return { columns: dated, dateOrder, timeZone: '', decimalMark, systemId };
}

function roleOf(head: string, taken: ReadonlySet<ColumnRole>): ColumnRole {
  const words = plainWords(head);
  const parameter = parameterNamed(head);
  if (parameter && !taken.has(parameter)) return parameter;
  return ROLE_WORDS.find(([role, pattern]) => pattern.test(words) && !taken.has(role))?.[0] ?? 'ignore';
}

function unitOf(head: string, role: ColumnRole, values: readonly number[]): string {
  const parameter = PARAMETER_CODES.find((code) => code === role);
  if (!parameter) return '';
  const named = unitNamed(parameter, head);
  if (named !== null) return named;
  const middle = [...values].sort((a, b) => a - b)[Math.floor(values.length / 2)];
  if (middle === undefined) return '';
  // The ranges of seawater in these units do not meet.
  if (role === 'alkalinity') return middle > 30 ? 'ppm' : middle > 5 ? 'dKH' : 'meq/L';
  if (role === 'salinity') return middle < 2 ? 'sg' : 'ppt';
  if (role === 'temperature') return middle > 45 ? 'F' : 'C';
  return '';
}

function valuesOf(rows: CsvTable['rows'], index: number, mark: DecimalMark): number[] {
  return rows.flatMap(({ cells }) => numberFromFile(cells[index] ?? '', mark) ?? []);
}

/** A comma before other than three digits, or after a single zero, groups no thousands. */
function decimalMarkOf(rows: CsvTable['rows']): DecimalMark {
  const isComma = /^[+-]?(\d+,(\d{1,2}|\d{4,})|0,\d+)$/;
  return rows.some(({ cells }) => cells.some((cell) => isComma.test(cell))) ? 'comma' : 'point';
}

function dateOrderOf(dates: readonly string[]): DateOrder {
  const parts = dates.map((date) => date.split(/[-/. T]/).map(Number));
  if (parts.some(([first = 0]) => first > 31)) return 'ymd';
  return parts.some(([, second = 0]) => second > 12) ? 'mdy' : 'dmy';
}
