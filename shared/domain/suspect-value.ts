import { canonicalValue, readingValue } from './reading-value.ts';
import {
  everydayUnitsOf,
  fromCanonical,
  MEQ_PER_DKH,
  PARAMETERS,
  type ParameterCode,
  unitOf,
  unitsOf,
} from './units.ts';

/** What was probably meant. */
export interface Suggestion {
  parameter: ParameterCode;
  value: number;
  unit: string;
  reason: 'decimal' | 'unit' | 'parameter';
}

export interface Suspicion {
  /** An impossible value can't be stored; an unusual one can, when the person says that it is so. */
  kind: 'impossible' | 'unusual';
  /** In plain words, with its own numbers. */
  message: string;
  /** The likeliest first, three at most. */
  suggestions: Suggestion[];
}

/** Where coral water usually is, and how far one test is from the last one; canonical units. */
interface Habit {
  low: number;
  high: number;
  jump: number;
}

/** Common practice, no source: wide enough that a person who keeps coral is asked only about what is odd. */
const HABITS: Readonly<Record<ParameterCode, Habit>> = {
  alkalinity: { low: 5 * MEQ_PER_DKH, high: 14 * MEQ_PER_DKH, jump: 2 * MEQ_PER_DKH },
  calcium: { low: 300, high: 600, jump: 80 },
  magnesium: { low: 1000, high: 1700, jump: 200 },
  salinity: { low: 28, high: 40, jump: 3 },
  temperature: { low: 18, high: 32, jump: 4 },
  ph: { low: 7.4, high: 8.8, jump: 0.5 },
  nitrate: { low: 0, high: 80, jump: 20 },
  phosphate: { low: 0, high: 1, jump: 0.3 },
};

/** An older value says little about a new one. */
export const LAST_COUNTS_DAYS = 14;

const MOST_SUGGESTIONS = 3;
const SLIPS = [0.1, 10, 0.01, 100, 0.001];

/**
 * Whether a typed value looks like a slip: a decimal point that went astray, another unit, or the field of another
 * parameter. Null where there is nothing to ask.
 *
 * @param value as typed, in `unit`
 * @param unit name of a unit of the parameter; the canonical one when empty
 * @param last the value before, canonical; null where there is none within {@link LAST_COUNTS_DAYS}
 */
export function suspectValue(
  parameter: ParameterCode,
  value: number,
  unit: string,
  last: number | null,
): Suspicion | null {
  const unitName = unit === '' ? (unitsOf(parameter)[0] ?? '') : unit;
  const read = readingValue(parameter, value, unitName);
  if (read.problem === null && isUsual(parameter, read.value, last)) return null;
  const suggestions = suggest(parameter, value, unitName, last);
  const [first] = suggestions;
  const asked = first ? ` Did you mean ${suggestionWords(first, parameter)}?` : '';
  if (read.problem !== null) return { kind: 'impossible', message: `${read.problem}${asked}`, suggestions };
  const label = `${labelOf(parameter)} of ${amountWords(parameter, value, unitName)}`;
  const message =
    last === null
      ? `${label} is unusual for coral water.`
      : `${label} is far from the last, ${amountWords(parameter, fromCanonical(parameter, last, unitName), unitName)}.`;
  return { kind: 'unusual', message: `${message}${asked}`, suggestions };
}

/** A suggestion in words, with its parameter where that is another one: "Calcium 450 mg/L". */
export function suggestionWords({ parameter, value, unit }: Suggestion, asked: ParameterCode): string {
  const amount = amountWords(parameter, value, unit);
  return parameter === asked ? amount : `${labelOf(parameter)} ${amount}`;
}

function suggest(asked: ParameterCode, value: number, unit: string, last: number | null): Suggestion[] {
  const other = PARAMETERS.map(({ code }) => code).filter((code) => code !== asked);
  const thoughts: Suggestion[] = [
    ...SLIPS.map((factor) => ({
      ...{ parameter: asked, value: Number((value * factor).toPrecision(9)), unit },
      reason: 'decimal' as const,
    })),
    ...everydayUnitsOf(asked)
      .filter((name) => name !== unit)
      .map((name) => ({ parameter: asked, value, unit: name, reason: 'unit' as const })),
    ...other.flatMap((code) =>
      everydayUnitsOf(code).map((name) => ({ parameter: code, value, unit: name, reason: 'parameter' as const })),
    ),
  ];
  const likely = thoughts.flatMap((each) => {
    const canonical = canonicalValue(each.parameter, each.value, each.unit);
    const known = each.parameter === asked ? last : null;
    if (canonical === null || !isUsual(each.parameter, canonical, known)) return [];
    // Values near zero are where nutrients often are, so as another field they tell nothing of what was meant.
    if (each.parameter !== asked && HABITS[each.parameter].low === 0) return [];
    return [{ each, far: farness(each, canonical, known) }];
  });
  likely.sort((a, b) => a.far - b.far);
  const sorted = likely.map(({ each }) => each);
  // Another field is thought of only where nothing fits this one.
  const own = sorted.filter(({ parameter }) => parameter === asked);
  return (own.length > 0 ? own : sorted).slice(0, MOST_SUGGESTIONS);
}

/** Nothing to ask: near the last value, or as coral water is where none is known. */
function isUsual(parameter: ParameterCode, canonical: number, last: number | null): boolean {
  const { low, high, jump } = HABITS[parameter];
  return last === null ? canonical >= low && canonical <= high : Math.abs(canonical - last) <= jump;
}

function farness({ parameter }: Suggestion, canonical: number, last: number | null): number {
  const { low, high, jump } = HABITS[parameter];
  return last === null ? Math.abs(canonical - (low + high) / 2) / (high - low) : Math.abs(canonical - last) / jump;
}

function labelOf(parameter: ParameterCode): string {
  return PARAMETERS.find(({ code }) => code === parameter)?.label ?? parameter;
}

function amountWords(parameter: ParameterCode, value: number, unit: string): string {
  const { decimals, label } = unitOf(parameter, unit);
  const number = String(Number(value.toFixed(decimals + 1)));
  return parameter === 'ph' ? number : `${number} ${label}`;
}
