import { type ComputedRef, type Ref, computed } from 'vue';
import type { Reservoir } from '@shared/contracts/reservoirs.ts';
import { dayOf } from '@shared/domain/days.ts';
import { systemTitle } from '@shared/domain/system-title.ts';
import { formatClock, nearDay } from '@/formatting/format-day.ts';
import { joinWords } from '@/formatting/plural.ts';
import { useSessionStore } from '@/stores/session.ts';
import { useUnitChoicesStore } from '@/stores/unit-choices.ts';

/** How a reservoir stands and what to do with it next. */
export function useReservoirSentence(reservoir: Ref<Reservoir | undefined>): ComputedRef<string | null> {
  const session = useSessionStore();
  const units = useUnitChoicesStore();

  const litres = (value: number) => units.say('volume', value, { decimals: 0 });
  const day = (at: number) => nearDay(dayOf(at, session.timeZone), dayOf(Date.now(), session.timeZone));

  function onlineWords({
    usableL,
    feeds,
    emptyAt,
    litresPerDay,
    dueAt,
    strengthLow,
    systemCode,
    systemName,
  }: Reservoir) {
    const fed =
      feeds.length > 1
        ? joinWords(feeds.map((feed) => feed.systemCode))
        : systemTitle({ code: systemCode, name: systemName });
    const use =
      litresPerDay === null ? 'its use is not known until a level is logged' : `${litres(litresPerDay)} go a day`;
    const end =
      emptyAt === null
        ? ''
        : emptyAt <= Date.now()
          ? ', so it should be empty by now'
          : `, so it is empty ${day(emptyAt)}`;
    const due =
      dueAt === null || (emptyAt !== null && emptyAt <= dueAt) ? '' : ` By habit it is replaced ${day(dueAt)}.`;
    const weak = strengthLow ? ' The last check found it weak: mix a fresh one.' : '';
    return `Feeds ${fed} with ${litres(usableL)} left; ${use}${end}.${due}${weak}`;
  }

  return computed(() => {
    if (!reservoir.value) return null;
    const { state, levelL, usableL, readyAt, alkalinityMeqL, code, retiredAt } = reservoir.value;
    if (retiredAt !== null) return `${code} is put away.`;
    if (state === 'settling' && readyAt !== null) {
      return `Settling until ${formatClock(readyAt, session.timeZone)}. Then draw only the clear water above the sediment.`;
    }
    if (state === 'online') return onlineWords(reservoir.value);
    if (state === 'spent') return 'Spent: clean out the sediment and mix again.';
    if (levelL === 0) return 'Empty and ready for a new mix.';
    if (alkalinityMeqL === 0) return `Holds ${litres(levelL)} without lime.`;
    if (usableL === 0) return `Only ${litres(levelL)} are left, all below the intake. Clean it out and mix again.`;
    return `Ready with ${litres(usableL)}. Put it online when the one before runs low.`;
  });
}
