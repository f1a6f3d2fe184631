import { DomainError } from '../errors.ts';
import { fromCanonical, PARAMETERS, type ParameterCode, toCanonical, unitOf, unitsOf } from './units.ts';

/**
 * A measured value as it is stored, or why it can't be one: a unit that the parameter does not have, or a value so far
 * out that it is a slip of the pen or another unit.
 *
 * @param unit name of a unit of the parameter; the canonical one when empty
 */
export function readingValue(
  code: ParameterCode,
  value: number,
  unit: string,
): { value: number; problem: null } | { value: null; problem: string } {
  const parameter = PARAMETERS.find((each) => each.code === code);
  const unitName = unit === '' ? (unitsOf(code)[0] ?? '') : unit;
  if (!parameter || !unitsOf(code).includes(unitName)) {
    return { value: null, problem: `Choose one of these units: ${unitsOf(code).join(', ')}.` };
  }
  const { min, max } = parameter.plausible;
  const canonical = canonicalValue(code, value, unitName);
  // A limit that is typed in a converted unit may land a rounding beside the limit itself.
  const slack = 1e-9 * (max - min);
  if (canonical !== null && canonical >= min - slack && canonical <= max + slack) {
    return { value: canonical, problem: null };
  }
  const shown = unitOf(code, unitName);
  const limit = (canonicalLimit: number) => limitIn(code, canonicalLimit, unitName, shown.decimals);
  return {
    value: null,
    problem: `${parameter.label} reads from ${limit(min)} to ${limit(max)} ${shown.label}. Check the value and its unit.`,
  };
}

/** The same for one value that must be good. @throws {DomainError} `input.invalid` at the field */
export function assertReadingValue(code: ParameterCode, value: number, unit: string, path: string): number {
  const read = readingValue(code, value, unit);
  if (read.problem === null) return read.value;
  throw new DomainError('input.invalid', read.problem, { fields: [{ path, message: read.problem }] });
}

/**
 * A value in the canonical unit, which an empty `unit` means too; null where the conversion refuses it, as a specific
 * gravity of no seawater.
 */
export function canonicalValue(code: ParameterCode, value: number, unit: string): number | null {
  try {
    return unit === '' ? value : toCanonical(code, value, unit);
  } catch (error) {
    if (error instanceof DomainError) return null;
    throw error;
  }
}

function limitIn(code: ParameterCode, canonical: number, unit: string, decimals: number): string {
  return String(Number(fromCanonical(code, canonical, unit).toFixed(decimals)));
}
