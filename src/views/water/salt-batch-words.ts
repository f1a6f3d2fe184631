import type { SaltBatch } from '@shared/contracts/salt-batches.ts';
import type { Quantity } from '@shared/domain/units.ts';
import type { Tone } from '@/components/tone.ts';

export const SALT_BATCH_TAGS: Record<SaltBatch['state'], { tone: Tone; word: string }> = {
  mixing: { tone: 'ochre', word: 'still mixing' },
  ready: { tone: 'kelp', word: 'ready' },
  used: { tone: 'plain', word: 'used up' },
  discarded: { tone: 'plain', word: 'poured away' },
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
