import { z } from 'zod';
import { ADVICE_KINDS, ADVICE_RULES } from '../domain/dosing-plan/facts.ts';
import { done, id, idParams, instant, listQuery, nothing, pageOf, shortText } from './common.ts';
import type { Endpoint } from './endpoint.ts';
import { WaterRuleSettings } from './water-rules.ts';

const rate = z.number();
const part = z.enum(['salinity', 'temperatureC', 'alkalinityMeqL', 'calciumMgL', 'phNbs']);

const SupplementAdvice = z.object({
  itemId: id,
  name: z.string(),
  unit: z.string(),
  amountPerDay: z.number(),
  bringsMeqL: rate,
});

/** What to dose and why; rates are meq/L of the system a day. */
export const Advice = z.object({
  kind: z.enum(ADVICE_KINDS),
  rules: z.array(z.enum(ADVICE_RULES)),
  targetMeqL: rate.nullable(),
  limewater: z
    .object({
      litresPerDay: z.number(),
      strengthMeqL: z.number(),
      limeGPerL: z.number(),
      vinegarMlPerL: z.number(),
      bringsMeqL: rate,
      hours: z.union([z.literal(12), z.literal(24)]),
    })
    .nullable(),
  supplements: z.array(SupplementAdvice),
  correction: z
    .object({
      from: z.number(),
      to: z.number(),
      days: z.int(),
      changePerDay: rate,
      supplement: SupplementAdvice.extend({ total: z.number() }).nullable(),
    })
    .nullable(),
  shortMeqL: rate,
  calciumDriftMgL: rate,
  ceilingShare: z.number().nullable(),
  costPerDayMicro: z.int().nullable(),
});

const steady = z.discriminatedUnion('enough', [
  z.object({
    enough: z.literal(false),
    reason: z.enum(['too_few_tests', 'too_short']),
    tests: z.int(),
    days: z.number(),
  }),
  z.object({
    ...{ enough: z.literal(true), steady: z.boolean(), tests: z.int(), days: z.number() },
    ...{ slopePerDay: rate, low: rate, high: rate, change: z.number() },
  }),
]);

/** What an advice was based on. */
export const AdviceFacts = z.object({
  netVolumeL: z.number(),
  band: z.object({ low: z.number(), high: z.number() }).nullable(),
  level: z.object({ meqL: z.number(), error: z.number() }).nullable(),
  demand: z.object({ meqLPerDay: rate, low: rate, high: rate }).nullable(),
  given: z.object({ limewater: rate.nullable(), others: rate, waterChanges: rate }),
  steady,
  testsSinceChange: z.int(),
  water: z.object({
    ...{ salinity: z.number(), temperatureC: z.number(), alkalinityMeqL: z.number() },
    ...{ calciumMgL: z.number(), phNbs: z.number() },
  }),
  /** Parts of the water that no recent test tells. */
  assumed: z.array(part),
  evaporationLPerDay: z.number().nullable(),
  limewater: z
    .object({
      onlineMeqL: z.number().nullable(),
      temperatureC: z.number(),
      purity: z.number(),
      acidPercent: z.number().nullable(),
      limeCost: z.number().nullable(),
      vinegarCost: z.number().nullable(),
    })
    .nullable(),
  supplements: z.array(
    z.object({
      ...{ itemId: id, name: z.string(), unit: z.string() },
      ...{ alkalinityMeq: z.number(), calciumMg: z.number(), cost: z.number().nullable() },
    }),
  ),
  plan: z.object({ strengthMeqL: z.number(), mixed: z.boolean() }).nullable(),
});

/** What the farm decided to dose, from then until the next plan. */
export const DosingPlan = z.object({
  id,
  systemId: id,
  adviceId: id,
  fromAt: instant,
  toAt: instant.nullable(),
  strengthMeqL: z.number(),
  limeGPerL: z.number(),
  vinegarMlPerL: z.number(),
  litresPerDay: z.number(),
  supplements: z.array(z.object({ itemId: id, name: z.string(), unit: z.string(), amountPerDay: z.number() })),
  by: z.string(),
});
export type DosingPlan = z.infer<typeof DosingPlan>;

/** Advice that a person answered. */
export const AnsweredAdvice = z.object({
  id,
  kind: z.enum(ADVICE_KINDS),
  rules: z.array(z.enum(ADVICE_RULES)),
  /** As it was said, alkalinity in dKH. */
  text: z.string(),
  facts: AdviceFacts,
  advice: Advice,
  outcome: z.enum(['accepted', 'changed', 'dismissed']),
  reason: z.string(),
  at: instant,
  by: z.string(),
  takenBackAt: instant.nullable(),
  /** Nothing was answered since, so that it can be taken back. */
  isLast: z.boolean(),
});
export type AnsweredAdvice = z.infer<typeof AnsweredAdvice>;

/** The amounts of a mix for a reservoir that stands ready to be filled. */
const MixFor = z.object({
  reservoirId: id,
  code: z.string(),
  waterL: z.number(),
  limeG: z.number(),
  vinegarMl: z.number(),
});

export const SystemPlan = z.object({
  systemId: id,
  systemCode: z.string(),
  systemName: z.string(),
  asOf: instant,
  /** Names this advice, so that what is answered is what was read. */
  key: z.string(),
  advice: Advice,
  facts: AdviceFacts,
  rules: WaterRuleSettings,
  /** The plan that runs. */
  plan: DosingPlan.nullable(),
  /** Where advice of this kind was dismissed lately: it comes again on its own at `until`. */
  dismissed: z.object({ id, at: instant, by: z.string(), reason: z.string(), until: instant }).nullable(),
  mix: MixFor.nullable(),
});
export type SystemPlan = z.infer<typeof SystemPlan>;

const key = z.string().min(1).max(200);

export const AcceptAdvice = z.strictObject({
  key,
  /** What the person decided otherwise. */
  changes: z
    .strictObject({
      limeGPerL: z.number('Enter the grams.').min(0, 'Zero or more.').max(10, 'At most 10 g/L.').optional(),
      vinegarMlPerL: z.number('Enter the millilitres.').min(0, 'Zero or more.').max(50, 'At most 50 mL/L.').optional(),
      supplements: z
        .array(
          z.strictObject({
            itemId: id,
            amountPerDay: z.number('Enter the amount.').min(0, 'Zero or more.').max(1_000_000),
          }),
        )
        .max(20)
        .optional(),
    })
    .optional(),
  /** Why it was changed. */
  reason: z.string().trim().max(300, 'At most 300 characters.').default(''),
});
export type AcceptAdvice = z.infer<typeof AcceptAdvice>;

export const DismissAdvice = z.strictObject({ key, reason: shortText });
export type DismissAdvice = z.infer<typeof DismissAdvice>;

export const planEndpoints = {
  list: {
    method: 'get',
    path: '/api/plans',
    access: 'water.read',
    summary: 'Advice on the dosing of every system, and the plans that run',
    query: nothing,
    response: z.object({ items: z.array(SystemPlan) }),
  },
  show: {
    method: 'get',
    path: '/api/systems/:id/plan',
    access: 'water.read',
    summary: 'Advice on the dosing of a system, what it is based on, and the plan that runs',
    params: idParams,
    response: SystemPlan,
  },
  history: {
    method: 'get',
    path: '/api/systems/:id/advice',
    access: 'water.read',
    summary: 'Advice that was answered, newest first',
    params: idParams,
    query: listQuery.pick({ cursor: true, limit: true }),
    response: pageOf(AnsweredAdvice),
  },
  accept: {
    method: 'post',
    path: '/api/systems/:id/advice/accept',
    access: 'water.log',
    summary: 'Take advice as the plan, as it is or changed',
    params: idParams,
    body: AcceptAdvice,
    response: SystemPlan,
    creates: true,
  },
  dismiss: {
    method: 'post',
    path: '/api/systems/:id/advice/dismiss',
    access: 'water.log',
    summary: 'Dismiss advice with a reason',
    params: idParams,
    body: DismissAdvice,
    response: SystemPlan,
    creates: true,
  },
  takeBack: {
    method: 'delete',
    path: '/api/advice/:id',
    access: 'water.log',
    summary: 'Take the last answer to advice back, and its plan with it',
    params: idParams,
    response: done,
  },
} as const satisfies Record<string, Endpoint>;
