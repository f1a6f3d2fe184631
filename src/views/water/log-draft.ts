import type { LogSheet, TestedValue } from '@shared/contracts/readings.ts';
import type { TestMethod } from '@shared/contracts/test-methods.ts';
import { checkFor } from '@shared/domain/calibration.ts';
import { MS_PER_DAY } from '@shared/domain/days.ts';
import { numberFromText } from '@shared/domain/number-text.ts';
import { canonicalValue, readingValue } from '@shared/domain/reading-value.ts';
import { meanOfTests } from '@shared/domain/replicates.ts';
import { LAST_COUNTS_DAYS, type Suspicion, suspectValue } from '@shared/domain/suspect-value.ts';
import { SD_PER_HALF_INTERVAL, testErrorOf } from '@shared/domain/test-error.ts';
import type { ParameterCode } from '@shared/domain/units.ts';

export type SheetRow = LogSheet['parameters'][number];

/** What a person typed for one parameter: one test, or several with blanks between. */
export interface LogDraft {
  parameter: ParameterCode;
  text: string;
  unit: string;
  methodId: string | null;
  kitLotId: string | null;
  /** The person says that an unusual value is so. */
  confirmed: boolean;
}

/** The tests of a draft as typed; null where some of the text is no number. */
export function testsOf({ text }: Pick<LogDraft, 'text'>): number[] | null {
  const numbers = text
    .trim()
    .split(/[\s;/]+/)
    .filter((word) => word !== '')
    .map(numberFromText);
  return numbers.every((number) => number !== null) ? numbers : null;
}

/** The first odd test of a draft, unless it is only unusual and the person says that it is so. */
export function suspicionOf(
  draft: LogDraft,
  row: SheetRow | undefined,
  takenAt: number,
): (Suspicion & { at: number }) | null {
  const last = row?.last && Math.abs(takenAt - row.last.takenAt) <= LAST_COUNTS_DAYS * MS_PER_DAY ? row.last : null;
  const tests = testsOf(draft) ?? [];
  for (const [at, test] of tests.entries()) {
    const suspicion = suspectValue(draft.parameter, test, draft.unit, last?.value ?? null);
    if (suspicion && !(suspicion.kind === 'unusual' && draft.confirmed)) return { ...suspicion, at };
  }
  return null;
}

/** What a draft comes to, in the canonical unit. */
export interface LogResult {
  value: number;
  /** Half of the 95 % interval. */
  error: number;
  tests: number;
  /** What is taken off for the bias of the kit; 0 where none is known. */
  bias: number;
  checkedAt: number | null;
}

/** Null while there is nothing that can be stored. */
export function resultOf(draft: LogDraft, methods: readonly TestMethod[], takenAt: number): LogResult | null {
  const tests = testsOf(draft);
  if (!tests || tests.length === 0) return null;
  if (tests.some((test) => readingValue(draft.parameter, test, draft.unit).problem !== null)) return null;
  const method = methods.find(({ id }) => id === draft.methodId);
  const { mean, sd } = meanOfTests(
    tests.map((test) => canonicalValue(draft.parameter, test, draft.unit) ?? 0),
    method?.repeatabilitySd ?? testErrorOf(draft.parameter, '').sd,
  );
  const check = checkFor(method?.calibrations ?? [], { takenAt, kitLotId: draft.kitLotId });
  const bias = check?.bias ?? 0;
  return {
    ...{ value: mean - bias, tests: tests.length, bias, checkedAt: check?.at ?? null },
    error: SD_PER_HALF_INTERVAL * Math.hypot(sd, check?.biasSd ?? 0),
  };
}

/** What of a draft is sent; null where nothing was typed. A text that is no number is sent as none, to be refused. */
export function valueOf(draft: LogDraft): (Omit<TestedValue, 'value'> & { value: number | null }) | null {
  if (draft.text.trim() === '') return null;
  const [value = null, ...repeats] = testsOf(draft) ?? [];
  const { parameter, unit, methodId, kitLotId, confirmed } = draft;
  return { parameter, value, unit, methodId, kitLotId, confirmed, ...(repeats.length > 0 ? { repeats } : {}) };
}

/** What a person should know of method and kit before the value counts. */
export function kitNotes(
  { methodId, kitLotId }: Pick<LogDraft, 'methodId' | 'kitLotId'>,
  row: SheetRow | undefined,
  methods: readonly TestMethod[],
  today: string,
): string[] {
  const last = row?.last;
  const lot = methods.flatMap(({ lots }) => lots).find(({ id }) => id === kitLotId);
  const before = methods.find(({ id }) => id === last?.methodId);
  const otherMethod = before !== undefined && methodId !== before.id;
  return [
    ...(otherMethod ? [`Last time it was ${before.name}: a step between the two may be the method’s.`] : []),
    ...(!otherMethod && last?.kitLotId && kitLotId !== null && kitLotId !== last.kitLotId
      ? ['Another kit lot than last time: a step between the two may be the lot’s.']
      : []),
    ...(lot?.expiresOn && lot.expiresOn < today
      ? [`Lot ${lot.code} has expired. Check it against a known solution.`]
      : []),
  ];
}
