import type { Day } from '../../shared/domain/days.ts';
import type { LossCause } from '../../shared/domain/losses.ts';

/** What really went on in the demo farm, which its records only show with the errors of tests and measurements. */
export interface DemoTruth {
  seed: number;
  firstDay: Day;
  lastDay: Day;
  systems: SystemTruth[];
  lines: LineTruth[];
  /** Pieces lost, by what really killed them. */
  losses: Partial<Record<LossCause, number>>;
  heat: { systemCode: string; from: Day; to: Day };
  /** A cutting day on which pieces were handled roughly. */
  roughDay: Day;
  weakLineCode: string;
}

export interface SystemTruth {
  code: string;
  systemId: string;
  netVolumeL: number;
  /** What the corals took on each day, meq/L, and the alkalinity at its morning test. */
  days: { day: Day; demandMeqLPerDay: number; alkalinityMeqL: number }[];
}

export interface LineTruth {
  code: string;
  mmPerWeek: number;
  /** Part of the pieces that would live for half a year without any event, 0 to 1. */
  survival: number;
}
