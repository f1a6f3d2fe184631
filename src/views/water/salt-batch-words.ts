import { mdiCheck, mdiTimerSandEmpty } from '@mdi/js';
import type { SaltBatch } from '@shared/contracts/salt-batches.ts';
import type { Quantity } from '@shared/domain/units.ts';
import type { Tone } from '@/components/tone.ts';

export const SALT_BATCH_TAGS: Record<SaltBatch['state'], { tone: Tone; text: string; icon?: string }> = {
  mixing: { tone: 'ochre', text: 'still mixing', icon: mdiTimerSandEmpty },
  ready: { tone: 'kelp', text: 'ready', icon: mdiCheck },
  used: { tone: 'plain', text: 'used up' },
  discarded: { tone: 'plain', text: 'poured away' },
};

type Say = (quantity: Quantity, value: number, options?: { decimals?: number }) => string;

/** What new water tested at, or that it was not tested. */
export function testedWords(batch: SaltBatch, say: Say): string {
  const { salinity, alkalinityMeqL, calciumMgL, magnesiumMgL, temperatureC } = batch;
  const parts = [
    salinity === null ? null : say('salinity', salinity),
    alkalinityMeqL === null ? null : say('alkalinity', alkalinityMeqL),
    calciumMgL === null ? null : `${say('calcium', calciumMgL, { decimals: 0 })} calcium`,
    magnesiumMgL === null ? null : `${say('magnesium', magnesiumMgL, { decimals: 0 })} magnesium`,
    temperatureC === null ? null : say('temperature', temperatureC),
  ].filter((part) => part !== null);
  return parts.length > 0 ? parts.join(', ') : 'not tested yet';
}
