/** Kinds of work that comes due. What is logged of the same kind settles a task by itself. */
export const TASK_KINDS = ['test', 'refill', 'changeover', 'calibration', 'pump_service', 'cleaning', 'other'] as const;
export type TaskKind = (typeof TASK_KINDS)[number];
