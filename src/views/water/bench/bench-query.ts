import type { LocationQuery, LocationQueryRaw } from 'vue-router';
import { BENCH_CHOICES, BENCH_FIELDS, BENCH_NUMBERS, type BenchChoice, type BenchChoices } from './bench-fields.ts';
import type { BenchNumber } from './bench-fields.ts';

export type BenchNumbers = Record<BenchNumber, number | null>;

/** The bench as a link holds it: only what differs from where it starts. */
export function benchToQuery(numbers: BenchNumbers, choices: BenchChoices): LocationQueryRaw {
  const query: LocationQueryRaw = {};
  for (const choice of choiceNames) {
    if (choices[choice] !== BENCH_CHOICES[choice][0]) query[choice] = choices[choice];
  }
  for (const name of BENCH_NUMBERS) {
    const value = numbers[name];
    if (value === null) query[name] = '';
    else if (numberText(value) !== numberText(BENCH_FIELDS[name].start)) query[name] = numberText(value);
  }
  return query;
}

/** The numbers of a link; what is missing or no number is where the bench starts. */
export function numbersFromQuery(query: LocationQuery): BenchNumbers {
  const entries = BENCH_NUMBERS.map((name) => [name, numberFrom(query[name], BENCH_FIELDS[name].start)]);
  return Object.fromEntries(entries) as BenchNumbers; // built from the names one by one
}

export function choicesFromQuery(query: LocationQuery): BenchChoices {
  const entries = choiceNames.map((choice) => {
    const known: readonly string[] = BENCH_CHOICES[choice];
    const chosen = query[choice];
    return [choice, typeof chosen === 'string' && known.includes(chosen) ? chosen : known[0]];
  });
  return Object.fromEntries(entries) as BenchChoices; // each is one of its own list
}

const choiceNames = Object.keys(BENCH_CHOICES) as BenchChoice[]; // the keys of the table are the names

function numberFrom(text: LocationQuery[string] | undefined, start: number): number | null {
  if (typeof text !== 'string') return start;
  if (text === '') return null;
  const value = Number(text);
  return Number.isFinite(value) ? value : start;
}

/** Nine figures are more than any reading has, and keep the noise of conversion out of the link. */
function numberText(value: number): string {
  return String(Number(value.toPrecision(9)));
}
