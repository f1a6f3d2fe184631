import type { CreateTask } from '../../../shared/contracts/tasks.ts';
import type { StaffKey } from './farm.ts';

/** A task of the demo farm; `system` by its code. */
export interface TaskSpec extends Pick<CreateTask, 'kind' | 'title' | 'repeat'> {
  system?: string;
  parameter?: CreateTask['parameter'];
  /** Its first reservoir. */
  vessel?: true;
  dueMinute?: number;
  for?: StaffKey;
  note?: string;
  /** Days after the tasks were written down on which it is first due. */
  from?: number;
  /** Left undone in so many last days. */
  undone?: number;
}

const daily = { every: 'days', interval: 1 } as const;
const weekly = (...weekdays: number[]) => ({ every: 'weeks' as const, interval: 1, weekdays });
const after = (days: number) => ({ every: 'after_done' as const, days });

const HEAVY = ['A', 'B', 'C', 'D'];
const ALL = [...HEAVY, 'E', 'F'];
const WITH_LIMEWATER = [...HEAVY, 'E'];

/** What comes again on the farm: its tests, its swaps, and the care of what it runs on. */
export const TASKS: readonly TaskSpec[] = [
  ...HEAVY.map((system) => test(system, 'alkalinity', daily)),
  ...['E', 'F'].map((system) => test(system, 'alkalinity', weekly(1, 3, 5))),
  ...ALL.map((system, index) => test(system, 'calcium', weekly(1 + (index % 5)))),
  ...ALL.map((system, index) => test(system, 'magnesium', weekly(1 + (index % 5)))),
  ...WITH_LIMEWATER.map((system): TaskSpec => ({
    ...{ kind: 'changeover', title: 'Swap the reservoir', system, repeat: after(6), from: 1 },
  })),
  ...WITH_LIMEWATER.map((system, index): TaskSpec => ({
    ...{ kind: 'cleaning', title: 'Take the sludge out', system, vessel: true, repeat: after(42), from: 3 + 9 * index },
    note: 'Gloves and goggles: what lies at the bottom is as caustic as the powder.',
  })),
  ...HEAVY.map((system, index): TaskSpec => ({
    ...{ kind: 'pump_service', title: 'Service the return pump', system, from: 4 + 11 * index },
    repeat: { every: 'weeks', interval: 12, weekdays: [2] },
    note: 'Off at the plug first. Soak the impeller in dilute acid, rinse, look at the seals.',
    ...(system === 'D' ? { undone: 6 } : {}),
  })),
  {
    ...{ kind: 'calibration', title: 'Calibrate the pH probes', repeat: after(30), from: 6, undone: 4 },
    note: 'Fresh buffers 7 and 10.',
  },
  {
    ...{ kind: 'calibration', title: 'Check the photometer with the reference solution' },
    repeat: { every: 'months_on', interval: 1, week: 1, weekday: 1 },
  },
  { kind: 'cleaning', title: 'Rinse the filter socks', repeat: { every: 'days', interval: 3 }, undone: 2 },
  { kind: 'cleaning', title: 'Brush the nursery racks', repeat: weekly(2, 5), for: 'grower2' },
  {
    ...{ kind: 'other', title: 'Rinse the eyewash and count the gloves', dueMinute: 9 * 60 },
    repeat: { every: 'months', interval: 1, monthDay: 1 },
  },
  {
    ...{ kind: 'other', title: 'Look at the plug boards for salt creep', repeat: weekly(4), for: 'owner' },
    note: 'Electricity near salt water: drip loops, and every breaker’s test button.',
  },
];

function test(system: string, parameter: 'alkalinity' | 'calcium' | 'magnesium', repeat: TaskSpec['repeat']): TaskSpec {
  return { kind: 'test', title: `Test ${parameter}`, system, parameter, repeat };
}
