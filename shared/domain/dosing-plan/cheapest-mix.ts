import { CALCIUM_MG_PER_MEQ } from '../dose-effect.ts';
import { CALCIUM_HYDROXIDE_G_PER_MOL, limeSolubility, strengthOfVinegar } from '../limewater.ts';
import type { LinearConstraint, LinearProgramme, LinearSolver, LinearVariable } from './linear-programme.ts';

/** What a system can be given. Costs are per unit, in one currency. */
export interface Means {
  netVolumeL: number;
  limewater: {
    /** Evaporation, which is all the limewater that can go in. */
    litresPerDay: number;
    temperatureC: number;
    purity: number;
    /** Acid of the vinegar, % w/v; null: none. */
    acidPercent: number | null;
    mostVinegarMlPerL: number;
    /** The strongest that it may be mixed, whatever dissolves, meq/L. */
    mostStrengthMeqL: number;
    limeCost: number;
    vinegarCost: number;
  } | null;
  supplements: { itemId: string; alkalinityMeq: number; calciumMg: number; cost: number }[];
  /** The most alkalinity that may go in during a day, meq/L. */
  roomMeqL: number;
}

/** What is to go in a day, for each litre of the system. */
export interface MixTarget {
  alkalinityMeqL: number;
  calciumMgL: number;
  /** How far calcium may be off. */
  calciumToleranceMgL: number;
}

export interface Mix {
  limeGPerDay: number;
  vinegarMlPerDay: number;
  amounts: { itemId: string; perDay: number }[];
  /** Alkalinity that the means can't bring. */
  shortMeqL: number;
  /** Calcium beyond the tolerance, either way. */
  calciumOffMgL: number;
  cost: number;
}

/** The solver's own tolerance; what one stage found is kept to within it in the next. */
const SLACK = 1e-7;

const LIME = 'lime';
const VINEGAR = 'vinegar';
const SHORT = 'short';
const CALCIUM_SHORT = 'calcium short';
const CALCIUM_OVER = 'calcium over';

/**
 * The cheapest amounts a day that bring a target within all limits. Where the means can't bring it they bring as much as
 * they can; among such mixes calcium is kept in balance as well as can be; among those the cheapest is taken.
 *
 * Limewater brings calcium with alkalinity as skeleton takes them (20.04 mg per meq); its lime can't pass what the water
 * and its vinegar dissolve.
 */
export function cheapestMix(means: Means, target: MixTarget, solve: LinearSolver): Mix {
  const variables = variablesOf(means, target);
  const limits = limitsOf(means, target);
  const best = (goal: (name: string) => number, kept: LinearConstraint[]) => {
    const programme: LinearProgramme = {
      sense: 'min',
      variables: variables.map((variable) => ({ ...variable, objective: goal(variable.name) })),
      constraints: [...limits, ...kept],
    };
    const solution = solve(programme);
    // Dosing nothing satisfies every limit, so there is always a solution.
    if (solution === null) throw new Error('A dosing programme without a solution.');
    return solution;
  };
  const atMost = (name: string, coefficients: Record<string, number>, bound: number): LinearConstraint => ({
    ...{ name, coefficients, relation: '<=', bound: Math.max(0, bound) + SLACK },
  });

  const short = best((name) => (name === SHORT ? 1 : 0), []).objective;
  const keepShort = atMost('as little missing', { [SHORT]: 1 }, short);
  const isOff = (name: string) => name === CALCIUM_SHORT || name === CALCIUM_OVER;
  const off = best((name) => (isOff(name) ? 1 : 0), [keepShort]).objective;
  const keepOff = atMost('calcium as close', { [CALCIUM_SHORT]: 1, [CALCIUM_OVER]: 1 }, off);
  const cost = new Map(variables.map(({ name, objective }) => [name, objective]));
  const { values } = best((name) => cost.get(name) ?? 0, [keepShort, keepOff]);
  return mixOf(means, variables, values);
}

/** Variables with their cost as objective. */
function variablesOf({ limewater, supplements, netVolumeL, roomMeqL }: Means, target: MixTarget): LinearVariable[] {
  const variable = (name: string, objective: number, upper: number): LinearVariable => ({
    ...{ name, objective, lower: 0, upper: Math.max(0, upper) },
  });
  const calciumRoom = target.calciumMgL + target.calciumToleranceMgL;
  return [
    ...(limewater
      ? [
          variable(LIME, limewater.limeCost, Infinity),
          variable(
            VINEGAR,
            limewater.vinegarCost,
            limewater.acidPercent === null ? 0 : limewater.mostVinegarMlPerL * limewater.litresPerDay,
          ),
        ]
      : []),
    ...supplements.map(({ itemId, cost, alkalinityMeq, calciumMg }) =>
      variable(
        itemId,
        cost,
        alkalinityMeq > 0 ? (roomMeqL * netVolumeL) / alkalinityMeq : (calciumRoom * netVolumeL) / calciumMg,
      ),
    ),
    variable(SHORT, 0, target.alkalinityMeqL),
    variable(CALCIUM_SHORT, 0, Infinity),
    variable(CALCIUM_OVER, 0, Infinity),
  ];
}

function limitsOf(means: Means, target: MixTarget): LinearConstraint[] {
  const { alkalinity, calcium } = bringing(means);
  const { alkalinityMeqL, calciumMgL, calciumToleranceMgL } = target;
  const limit = (
    name: string,
    coefficients: Record<string, number>,
    relation: LinearConstraint['relation'],
    bound: number,
  ): LinearConstraint => ({ name, coefficients, relation, bound });
  return [
    limit('alkalinity', { ...alkalinity, [SHORT]: 1 }, '=', alkalinityMeqL),
    limit('room in the water', alkalinity, '<=', means.roomMeqL),
    limit('calcium at least', { ...calcium, [CALCIUM_SHORT]: 1 }, '>=', calciumMgL - calciumToleranceMgL),
    limit('calcium at most', { ...calcium, [CALCIUM_OVER]: -1 }, '<=', calciumMgL + calciumToleranceMgL),
    ...(means.limewater ? limewaterLimits(means.limewater) : []),
  ].filter(({ coefficients }) => Object.keys(coefficients).length > 0);
}

/** What one unit of each brings to a litre of the system: meq/L and mg/L. */
function bringing({ limewater, supplements, netVolumeL }: Means) {
  const limeMeq = limewater ? (2000 * limewater.purity) / CALCIUM_HYDROXIDE_G_PER_MOL / netVolumeL : 0;
  const lime = limewater ? [[LIME, limeMeq] as const] : [];
  return {
    alkalinity: Object.fromEntries([
      ...lime,
      ...supplements.map(({ itemId, alkalinityMeq }) => [itemId, alkalinityMeq / netVolumeL] as const),
    ]),
    calcium: Object.fromEntries([
      ...lime.map(([name, meq]) => [name, meq * CALCIUM_MG_PER_MEQ] as const),
      ...supplements.map(({ itemId, calciumMg }) => [itemId, calciumMg / netVolumeL] as const),
    ]),
  };
}

function limewaterLimits(limewater: NonNullable<Means['limewater']>): LinearConstraint[] {
  const { litresPerDay, purity, temperatureC, acidPercent, mostStrengthMeqL } = limewater;
  const dissolved = purity / CALCIUM_HYDROXIDE_G_PER_MOL;
  const room = acidPercent === null ? 0 : strengthOfVinegar(acidPercent).roomMolPerMl;
  return [
    {
      name: 'solubility',
      coefficients: { [LIME]: dissolved, [VINEGAR]: -room },
      relation: '<=',
      bound: (limeSolubility(temperatureC) * litresPerDay) / CALCIUM_HYDROXIDE_G_PER_MOL,
    },
    {
      name: 'strength',
      coefficients: { [LIME]: 2000 * dissolved },
      relation: '<=',
      bound: mostStrengthMeqL * litresPerDay,
    },
  ];
}

function mixOf(
  { supplements, limewater }: Means,
  variables: readonly LinearVariable[],
  values: Record<string, number>,
): Mix {
  // Traces of the solver's tolerance are nothing that anyone can weigh.
  const amount = (name: string) => {
    const value = values[name] ?? 0;
    return value > 1e-6 ? value : 0;
  };
  return {
    limeGPerDay: limewater ? amount(LIME) : 0,
    vinegarMlPerDay: limewater ? amount(VINEGAR) : 0,
    amounts: supplements.map(({ itemId }) => ({ itemId, perDay: amount(itemId) })).filter(({ perDay }) => perDay > 0),
    shortMeqL: amount(SHORT),
    calciumOffMgL: amount(CALCIUM_SHORT) + amount(CALCIUM_OVER),
    cost: variables.reduce((sum, { name, objective }) => sum + objective * amount(name), 0),
  };
}
