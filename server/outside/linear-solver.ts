import loadHighs from 'highs';
import type { LinearProgramme, LinearSolution } from '../../shared/domain/dosing-plan/linear-programme.ts';

/** HiGHS compiled to WebAssembly. Loading waits, solving doesn't, so it is loaded with the server. */
const highs = await loadHighs();

/**
 * Solves a linear programme, with whole variables where they are asked for.
 *
 * @throws {Error} where it is unbounded or the solver gives up: then the programme is wrong, not the farm's numbers
 */
export function solveLinear(programme: LinearProgramme): LinearSolution {
  const solution = highs.solve(lpText(programme), { output_flag: false });
  if (solution.Status === 'Infeasible') return null;
  if (solution.Status !== 'Optimal') throw new Error(`The linear programme ended ${solution.Status}.`);
  const values = programme.variables.map(({ name }, index) => {
    const column = solution.Columns[columnName(index)];
    return [name, column && 'Primal' in column ? column.Primal : 0] as const;
  });
  return { objective: solution.ObjectiveValue, values: Object.fromEntries(values) };
}

/** The LP format allows few characters in names, so columns are numbered. */
function columnName(index: number): string {
  return `x${index}`;
}

function lpText({ sense, variables, constraints }: LinearProgramme): string {
  const columnOf = new Map(variables.map(({ name }, index) => [name, columnName(index)]));
  const sumOf = (terms: readonly (readonly [string, number])[]) =>
    terms.map(([name, factor]) => `${factor < 0 ? '-' : '+'} ${Math.abs(factor)} ${columnOf.get(name)}`).join(' ');
  const bounds = variables.map(
    ({ name, lower, upper }) => ` ${text(lower)} <= ${columnOf.get(name)} <= ${text(upper)}`,
  );
  const whole = variables.filter((variable) => variable.whole).map(({ name }) => columnOf.get(name));
  return [
    sense === 'min' ? 'Minimize' : 'Maximize',
    ` obj: ${sumOf(variables.map(({ name, objective }) => [name, objective]))}`,
    'Subject To',
    ...constraints.map(
      ({ coefficients, relation, bound }, index) =>
        ` c${index}: ${sumOf(Object.entries(coefficients))} ${relation} ${bound}`,
    ),
    'Bounds',
    ...bounds,
    ...(whole.length > 0 ? ['General', ` ${whole.join(' ')}`] : []),
    'End',
  ].join('\n');
}

function text(bound: number): string {
  if (bound === Infinity) return '+inf';
  return bound === -Infinity ? '-inf' : String(bound);
}
