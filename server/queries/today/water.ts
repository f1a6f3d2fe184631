import type { TodayEntry } from '../../../shared/contracts/today.ts';
import type { Db } from '../../db/client.ts';
import { openAlerts, type OpenAlert } from '../alerts.ts';
import { actOf, type TodayContext } from './source.ts';

const TONES = { now: 'brick', today: 'ochre', soon: 'slate' } as const;

/** What is wrong with water and limewater, as far as nobody said yet that they know. */
export function waterToday(db: Db, context: TodayContext): TodayEntry[] {
  return openAlerts(db, context.now)
    .filter(({ acknowledgedAt }) => acknowledgedAt === null)
    .map((alert) => ({
      ...{ id: entryId(alert), tone: TONES[alert.urgency], group: alert.urgency },
      ...{ title: alert.title, detail: alert.detail, act: actFor(context, alert) },
      ...(context.may('water.log') ? { alertId: alert.id } : {}),
    }));
}

/** The same as long as it is about the same thing: what, and where. */
function entryId({ subject, systemId, reservoirId, facts }: OpenAlert): string {
  if (facts.kind === 'out_of_band' || facts.kind === 'drifting') return `${facts.parameter}-${systemId}`;
  if (facts.kind === 'reservoir_empty' || facts.kind === 'limewater_off') return `reservoir-${reservoirId ?? systemId}`;
  return `${subject.split(':')[0] ?? 'alert'}-${reservoirId ?? systemId}`;
}

function actFor(context: TodayContext, { systemId, reservoirId, facts }: OpenAlert): TodayEntry['act'] {
  const system = `/water/systems/${systemId}`;
  const reservoir = reservoirId === null ? system : `/water/reservoirs/${reservoirId}`;
  const mix = () => actOf(context, 'water.log', 'Mix', `/water/mix?system=${systemId}`, reservoir);
  switch (facts.kind) {
    case 'out_of_band':
    case 'test_overdue':
      return actOf(context, 'water.log', 'Test', `/water/log?system=${systemId}`, system);
    case 'reservoir_empty':
      return facts.readyCode === null ? mix() : actOf(context, 'water.log', 'Swap', reservoir);
    case 'limewater_off':
      return actOf(context, 'water.log', 'Put online', reservoir);
    case 'strength_low':
      return mix();
    case 'replacement_due':
      return { label: 'See', to: reservoir };
    case 'drifting':
    case 'demand_changed':
    case 'overfill_risk':
      return { label: 'See', to: system };
  }
}
