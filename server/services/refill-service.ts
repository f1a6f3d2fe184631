import type { RefillReservoir } from '../../shared/contracts/reservoir-acts.ts';
import type { RefillResult } from '../../shared/contracts/reservoirs.ts';
import { mixLimewater, USUAL_ACID_PERCENT, USUAL_LIME_PURITY } from '../../shared/domain/limewater.ts';
import { strengthAfterRefill } from '../../shared/domain/reservoir-state.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Write } from '../db/write.ts';
import { feedsOf } from '../queries/reservoir-feeds.ts';
import { reservoirRow, showReservoir } from '../queries/reservoirs.ts';
import { waterItem, type WaterItemRow } from '../queries/water-items.ts';
import { actTime } from './act-time.ts';
import { addEvent, assertFits } from './reservoir-events.ts';
import { useSharedSupply } from './shared-supply-use.ts';

/** Logs a mix: lime and vinegar leave the supplies, the reservoir settles with the strength that the mix and the rest make. */
export function refillReservoir(write: Write, reservoirId: string, input: RefillReservoir): RefillResult {
  const { waterL, limeG, vinegarMl, temperatureC, note } = input;
  const reservoir = reservoirRow(write.tx, reservoirId);
  const levelBeforeL = input.levelBeforeL ?? reservoir.levelL;
  const levelL = levelBeforeL + waterL;
  assertFits(reservoir, levelBeforeL, 'levelBeforeL');
  assertFits(reservoir, levelL, 'waterL');
  const at = actTime(write, input.at);
  const lime = limeG > 0 ? weighed(waterItem(write.tx, 'lime', input.limeItemId, 'limeItemId'), 'g') : null;
  const vinegar =
    vinegarMl > 0 ? weighed(waterItem(write.tx, 'vinegar', input.vinegarItemId, 'vinegarItemId'), 'mL') : null;
  const purity = lime?.strength ?? USUAL_LIME_PURITY;
  const acidPercent = vinegar?.strength ?? USUAL_ACID_PERCENT;
  const mix = mixLimewater({ waterL, limeG, purity, vinegarMl, acidPercent, temperatureC });
  const before = { levelL: levelBeforeL, alkalinityMeqL: reservoir.alkalinityMeqL };

  const event = addEvent(write, reservoir, {
    ...{ kind: 'refill', at, note, levelBeforeL, levelL },
    alkalinityMeqL: strengthAfterRefill(before, { waterL, alkalinityMeqL: mix.alkalinityMeqL }),
    ...{ waterL, limeG, vinegarMl, temperatureC },
    limePurity: lime ? purity : null,
    acidPercent: vinegar ? acidPercent : null,
    undissolvedG: mix.undissolvedG,
    calciumMgL: mix.calciumMgL,
  });
  const feeds = feedsOf(write.tx, reservoir, at);
  const cause = { cause: 'refill', causeId: event.id, at } as const;
  if (lime) useSharedSupply(write, { itemId: lime.id, quantity: limeG, ...cause }, feeds);
  if (vinegar) useSharedSupply(write, { itemId: vinegar.id, quantity: vinegarMl, ...cause }, feeds);
  const { vinegarHelps, shortOf, saturation } = mix;
  return { reservoir: showReservoir(write.tx, reservoirId, write.now), event, vinegarHelps, shortOf, saturation };
}

/** A mix counts grams and millilitres, so the item must be kept in them. */
function weighed(item: WaterItemRow, unit: 'g' | 'mL'): WaterItemRow {
  if (item.unit === unit) return item;
  throw new DomainError('rule.refused', `${item.name} is kept in another unit than ${unit}. Change the item first.`);
}
