/** A linear programme as data; what solves it is passed in. Variables are named. */
export interface LinearProgramme {
  sense: 'min' | 'max';
  variables: LinearVariable[];
  constraints: LinearConstraint[];
}

export interface LinearVariable {
  name: string;
  /** Its part in the objective, per unit. */
  objective: number;
  lower: number;
  /** May be `Infinity`. */
  upper: number;
  /** Whole numbers only. */
  whole?: boolean;
}

export interface LinearConstraint {
  name: string;
  coefficients: Record<string, number>;
  relation: '<=' | '=' | '>=';
  bound: number;
}

/** The best values of the variables by name; null where no values satisfy all constraints. */
export type LinearSolution = { objective: number; values: Record<string, number> } | null;

export type LinearSolver = (programme: LinearProgramme) => LinearSolution;
