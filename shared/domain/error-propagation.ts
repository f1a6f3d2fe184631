/** A measured value and its standard deviation. */
export interface Measured {
  value: number;
  sd: number;
}

/**
 * Standard deviation of each result whose inputs err independently: the root of the summed squares of what half of the
 * change across ± one deviation of each input makes.
 *
 * @param outcome the results for given inputs, by name
 * @see JCGM 100:2008 (GUM), 5.1.2 with the sensitivities of 5.1.3 note 2
 */
export function propagatedSd<Input extends string, Result extends string>(
  outcome: (inputs: Record<Input, number>) => Record<Result, number>,
  measured: Record<Input, Measured>,
): Record<Result, number> {
  const names = Object.keys(measured) as Input[]; // a record's keys are its inputs
  const values = Object.fromEntries(names.map((name) => [name, measured[name].value])) as Record<Input, number>; // same keys
  const swings = names.map((name) => {
    const { value, sd } = measured[name];
    return [outcome({ ...values, [name]: value - sd }), outcome({ ...values, [name]: value + sd })] as const;
  });
  const results = Object.keys(outcome(values)) as Result[]; // the outcome has all results, whatever the inputs
  return Object.fromEntries(
    results.map((result) => [result, Math.hypot(...swings.map(([low, high]) => (high[result] - low[result]) / 2))]),
  ) as Record<Result, number>; // built from the results one by one
}
