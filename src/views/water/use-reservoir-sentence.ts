import { type ComputedRef, type Ref, computed } from 'vue';
import type { Reservoir } from '@shared/contracts/reservoirs.ts';
import { dayOf } from '@shared/domain/days.ts';
import { systemTitle } from '@shared/domain/system-title.ts';
import { formatClock, nearDay } from '@/formatting/format-day.ts';
import { useSessionStore } from '@/stores/session.ts';
import { useUnitChoicesStore } from '@/stores/unit-choices.ts';

/** How a reservoir stands and what to do with it next. */
export function useReservoirSentence(reservoir: Ref<Reservoir | undefined>): ComputedRef<string | null> {
  const session = useSessionStore();
  const units = useUnitChoicesStore();

  const litres = (value: number) => units.say('volume', value, { decimals: 0 });
  const day = (at: number) => nearDay(dayOf(at, session.timeZone), dayOf(Date.now(), session.timeZone));

  return computed(() => {
    if (!reservoir.value) return null;
    const {
      state,
      levelL,
      systemCode: code,
      systemName: name,
      emptyAt,
      litresPerDay,
      readyAt,
      alkalinityMeqL,
    } = reservoir.value;
    if (state === 'settling' && readyAt !== null) {
      return `Settling until ${formatClock(readyAt, session.timeZone)}. Then draw only the clear water above the sediment.`;
    }
    if (state === 'online') {
      const use =
        litresPerDay === null ? 'its use is not known until a level is logged' : `${litres(litresPerDay)} go a day`;
      const end =
        emptyAt === null
          ? ''
          : emptyAt <= Date.now()
            ? ', so it should be empty by now'
            : `, so it is empty ${day(emptyAt)}`;
      return `Feeds ${systemTitle({ code, name })} with ${litres(levelL)} left; ${use}${end}.`;
    }
    if (levelL === 0 || state === 'spent') return 'Spent: clean out the sediment and mix again.';
    if (alkalinityMeqL === 0) return `Holds ${litres(levelL)} without lime.`;
    return `Ready with ${litres(levelL)}. Put it online when the one before runs low.`;
  });
}
