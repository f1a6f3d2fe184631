import type { Calibration, TestMethod } from '@shared/contracts/test-methods.ts';
import { MS_PER_DAY } from '@shared/domain/days.ts';
import { differenceInUnit } from '@shared/domain/test-error.ts';
import { unitOf } from '@shared/domain/units.ts';
import type { Sentence } from '@/components/sentence.ts';
import { decimalsForError, formatNumber } from '@/formatting/format-number.ts';
import { plural } from '@/formatting/plural.ts';
import { parameterOf } from '@/views/water/water-labels.ts';

/** How long a check is fresh: reagents and probes drift over months. Common practice, no source. */
const FRESH_DAYS = 90;

type Kind = Pick<TestMethod, 'parameter' | 'unit'>;

/** A difference in the unit that the method is read in, "0.3 dKH". */
export function differenceWords({ parameter, unit }: Kind, difference: number, digits = 2): string {
  const { label } = unitOf(parameter, unit);
  const shown = differenceInUnit(parameter, difference, unit);
  const number = formatNumber(Number(shown.toPrecision(digits)), { decimals: decimalsFor(shown, digits) });
  return parameter === 'ph' ? number : `${number} ${label}`;
}

/** "reads 0.4 ± 0.2 dKH too high", or that it can't be told from right. */
export function biasWords(
  { parameter, unit }: Kind,
  { bias, low, high, isDistinct }: Pick<Calibration, 'bias' | 'low' | 'high' | 'isDistinct'>,
): string {
  const [shown, half] = [bias, (high - low) / 2].map((each) => differenceInUnit(parameter, each, unit)) as [
    number,
    number,
  ]; // two in, two out
  const decimals = decimalsForError(half);
  const label = parameter === 'ph' ? '' : ` ${unitOf(parameter, unit).label}`;
  const number = (value: number) =>
    `${formatNumber(value, { decimals })} ± ${formatNumber(half, { decimals })}${label}`;
  if (!isDistinct) return `no bias to be told, ${number(shown)}`;
  return `reads ${number(Math.abs(shown))} too ${bias > 0 ? 'high' : 'low'}`;
}

/** What is so with the farm's methods, and which to check next. */
export function methodsSentence(methods: readonly TestMethod[], now: number): Sentence {
  const used = methods.filter(({ retired }) => !retired);
  const fresh = used.filter(({ calibrations: [last] }) => last && now - last.at <= FRESH_DAYS * MS_PER_DAY);
  const busiest = used
    .filter((method) => !fresh.includes(method) && method.readings > 0)
    .sort((a, b) => b.readings - a.readings)[0];
  const next = busiest ? ` Check the ${nameOf(busiest)} next: most readings hang on it.` : '';
  const biased = fresh.find(({ calibrations: [last] }) => last?.isDistinct);
  const [check] = biased?.calibrations ?? [];
  if (biased && check) {
    return {
      before: `The ${nameOf(biased)} `,
      number: biasWords(biased, check),
      after: `; ${plural(check.corrects, 'reading')} since then ${check.corrects === 1 ? 'is' : 'are'} corrected for it.${next}`,
    };
  }
  return {
    before: '',
    number: `${fresh.length} of ${plural(used.length, 'method')}`,
    after: ` ${fresh.length === 1 ? 'was' : 'were'} checked against a known solution in the last ${FRESH_DAYS} days.${next}`,
  };
}

/** "photometer of alkalinity". */
function nameOf({ name, parameter }: TestMethod): string {
  const small = /^[A-Z][a-z]/.test(name) ? name[0]?.toLowerCase() + name.slice(1) : name;
  const label = parameterOf(parameter).label;
  return `${small} for ${parameter === 'ph' ? label : label.toLowerCase()}`;
}

function decimalsFor(value: number, digits: number): number {
  if (value === 0) return 0;
  return Math.max(0, digits - 1 - Math.floor(Math.log10(Math.abs(Number(value.toPrecision(digits))))));
}
