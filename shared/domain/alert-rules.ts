import type { ParameterCode } from './units.ts';

/** What can be wrong with a system's water or limewater. */
export const ALERT_KINDS = [
  'out_of_band',
  'drifting',
  'demand_changed',
  'test_overdue',
  'reservoir_empty',
  'limewater_off',
  'strength_low',
  'overfill_risk',
] as const;
export type AlertKind = (typeof ALERT_KINDS)[number];

/** What was seen, by kind, in canonical units. */
export type AlertFacts =
  | {
      kind: 'out_of_band';
      parameter: ParameterCode;
      value: number;
      at: number;
      low: number;
      high: number;
      changeBy: number | null;
      changeDays: number;
    }
  | {
      kind: 'drifting';
      parameter: ParameterCode;
      value: number;
      at: number;
      leavesAt: number;
      changeBy: number;
      changeDays: number;
    }
  | { kind: 'demand_changed'; from: number; to: number; half: number; sinceDays: number }
  | { kind: 'test_overdue'; parameter: ParameterCode; lastAt: number | null }
  | { kind: 'reservoir_empty'; code: string; emptyAt: number; readyCode: string | null }
  | { kind: 'limewater_off'; code: string }
  | { kind: 'strength_low'; code: string; alkalinityMeqL: number; freshMeqL: number }
  | { kind: 'overfill_risk'; code: string; litres: number; safeL: number; reason: string };

/** What ended an alert: the test that shows it, or that what it was about is so no more. */
export type AlertEnd = { by: 'reading'; parameter: ParameterCode; value: number; at: number } | { by: 'change' };
