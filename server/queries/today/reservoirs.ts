import type { Reservoir } from '../../../shared/contracts/reservoirs.ts';
import type { TodayEntry } from '../../../shared/contracts/today.ts';
import { MS_PER_HOUR } from '../../../shared/domain/days.ts';
import { groupBy } from '../../../shared/domain/group-by.ts';
import { systemTitle } from '../../../shared/domain/system-title.ts';
import type { Db } from '../../db/client.ts';
import { listReservoirs } from '../reservoirs.ts';
import { actOf, type TodayContext } from './source.ts';

/** How long before it runs empty a reservoir is named in each group. */
const NOW_HOURS = 6;
const TODAY_HOURS = 24;
const SOON_HOURS = 48;

/** Reservoirs that run empty, and systems without limewater although some stands ready. */
export function reservoirEntries(db: Db, context: TodayContext): TodayEntry[] {
  return [...groupBy(listReservoirs(db, context.now), ({ systemId }) => systemId).values()].flatMap((held) => {
    const online = held.find(({ state }) => state === 'online');
    const ready = held.find(({ state, levelL }) => state === 'standby' && levelL > 0);
    if (online) return runsEmpty(context, online, ready);
    return ready ? [unused(context, ready)] : [];
  });
}

function runsEmpty(context: TodayContext, online: Reservoir, ready: Reservoir | undefined): TodayEntry[] {
  if (online.emptyAt === null) return [];
  const hours = (online.emptyAt - context.now) / MS_PER_HOUR;
  if (hours > SOON_HOURS) return [];
  const group = hours <= NOW_HOURS ? 'now' : hours <= TODAY_HOURS ? 'today' : 'soon';
  const page = `/water/reservoirs/${online.id}`;
  return [
    {
      id: `reservoir-${online.id}`,
      tone: group === 'now' ? 'brick' : group === 'today' ? 'ochre' : 'slate',
      group,
      title:
        hours <= 0
          ? [`Reservoir ${online.code} should be empty`]
          : [`Reservoir ${online.code} empty by `, { clock: online.emptyAt }],
      detail: [ready ? `${ready.code} has settled and is ready.` : `Nothing stands ready for ${systemOf(online)}.`],
      act: ready
        ? actOf(context, 'water.log', 'Swap', page)
        : actOf(context, 'water.log', 'Mix', `/water/mix?system=${online.systemId}`, page),
    },
  ];
}

function unused(context: TodayContext, ready: Reservoir): TodayEntry {
  return {
    id: `reservoir-${ready.id}`,
    tone: 'ochre',
    group: 'today',
    title: [`${systemOf(ready)} gets no limewater`],
    detail: [`${ready.code} has settled and is ready to go online.`],
    act: actOf(context, 'water.log', 'Put online', `/water/reservoirs/${ready.id}`),
  };
}

function systemOf({ systemCode: code, systemName: name }: Reservoir): string {
  return systemTitle({ code, name });
}
