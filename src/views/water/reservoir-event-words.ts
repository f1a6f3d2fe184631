import type { ReservoirEvent } from '@shared/contracts/reservoirs.ts';
import type { Tone } from '@/components/tone.ts';

type Kind = ReservoirEvent['kind'];

/** What happened to a reservoir, as the list of events heads it. */
export const EVENT_KINDS: Record<Kind, { title: string; tone: Tone }> = {
  refill: { title: 'Limewater mixed', tone: 'plum' },
  level: { title: 'Level logged', tone: 'plain' },
  online: { title: 'Put online', tone: 'kelp' },
  offline: { title: 'Taken off', tone: 'slate' },
  topped_up: { title: 'Topped up', tone: 'slate' },
  strength: { title: 'Strength checked', tone: 'plain' },
  sludge_removed: { title: 'Sludge taken out', tone: 'plain' },
  spent: { title: 'Marked spent', tone: 'ochre' },
  cleaned: { title: 'Emptied and cleaned', tone: 'plain' },
};

/** What is told once an event is taken back. */
export const EVENT_TAKEN_BACK: Record<Kind, string> = {
  refill: 'The mix is taken back; its lime and vinegar are in store again.',
  level: 'The level is taken back.',
  online: 'The changeover is taken back.',
  offline: 'The changeover is taken back.',
  topped_up: 'The top-up is taken back.',
  strength: 'The check is taken back; the strength is as it was.',
  sludge_removed: 'The sludge removal is taken back.',
  spent: 'It is as it was before.',
  cleaned: 'The cleaning is taken back.',
};
