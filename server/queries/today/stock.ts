import { eq } from 'drizzle-orm';
import type { CuttingChoice, Withheld } from '../../../shared/contracts/stock.ts';
import type { TodayEntry } from '../../../shared/contracts/today.ts';
import { daysBetween } from '../../../shared/domain/days.ts';
import type { Db } from '../../db/client.ts';
import { batches, racks, systems } from '../../db/schema/index.ts';
import type { BatchStock } from '../batch-stock.ts';
import { cuttingChoices } from '../colonies.ts';
import { listWithholds } from '../withholds.ts';
import { actOf, type TodayContext } from './source.ts';

/** A batch is named as healed for this long, unless it was measured meanwhile. */
const HEALED_FOR_DAYS = 3;
/** Mothers named at once; the cutting page has them all. */
const MOST_MOTHERS = 2;
/** Pieces that stores want for each that lives, from which a line is worth cutting. */
const WANTED = 0.25;

/** Pieces to place, batches that healed, what is withheld, and mothers that may be cut again. */
export function stockToday(db: Db, context: TodayContext): TodayEntry[] {
  const { stock, may } = context;
  return [
    ...stock.filter(({ counts }) => counts.bench > 0).map((each) => onBench(context, each)),
    ...stock.filter((each) => healedLately(each, context)).map((each) => healed(context, each)),
    ...listWithholds(db).map((each) => withheld(db, context, each)),
    ...(may('stock.work') ? cuttingChoices(db, context.now).filter(isWanted).slice(0, MOST_MOTHERS).map(mother) : []),
  ];
}

function onBench(context: TodayContext, { batch, counts }: BatchStock): TodayEntry {
  return {
    id: `bench-${batch.id}`,
    tone: 'ochre',
    group: 'today',
    title: [`Place ${counts.bench} of batch ${batch.code}`],
    detail: ['Cut ', { day: batch.cutOn }, ' and on no rack yet.'],
    act: actOf(context, 'stock.work', 'Place', `/stock/batches/${batch.id}`),
  };
}

function healedLately({ size, counts }: BatchStock, { today }: TodayContext): boolean {
  const since = daysBetween(size.healedOn, today);
  const isMeasured = size.measuredOn !== null && size.measuredOn >= size.healedOn;
  return counts.onRacks > 0 && since >= 0 && since < HEALED_FOR_DAYS && !isMeasured;
}

function healed(context: TodayContext, { batch, line, counts }: BatchStock): TodayEntry {
  return {
    id: `healed-${batch.id}`,
    tone: 'kelp',
    group: 'soon',
    title: [`Batch ${batch.code} has healed`],
    detail: [`${counts.onRacks} of ${line.tradeName}. Measure a few, so that their grade is known.`],
    act: actOf(context, 'stock.work', 'Measure', `/stock/batches/${batch.id}`),
  };
}

function withheld(db: Db, context: TodayContext, each: Withheld): TodayEntry {
  return {
    id: `withheld-${each.id}`,
    tone: 'ochre',
    group: 'soon',
    title: [`Withheld: ${each.scope} ${each.of}`],
    detail: [`${each.reason}. By ${each.startedBy}, ${ageWords(context.now - each.startedAt)}.`],
    act: { label: 'See', to: placeOf(db, each) },
  };
}

function ageWords(ageMs: number): string {
  const days = Math.floor(ageMs / 86_400_000);
  if (days === 0) return 'less than a day ago';
  return days === 1 ? 'a day ago' : `${days} days ago`;
}

/** The page of what is withheld; the record names it by its code. */
function placeOf(db: Db, { scope, of }: Withheld): string {
  if (scope === 'plug') return `/stock/plugs/${of}`;
  const table = scope === 'batch' ? batches : scope === 'rack' ? racks : systems;
  const id = db.select({ id: table.id }).from(table).where(eq(table.code, of)).get()?.id ?? '';
  return { batch: `/stock/batches/${id}`, rack: `/stock/racks/${id}`, system: `/water/systems/${id}` }[scope];
}

function isWanted({ colony, want }: CuttingChoice): boolean {
  return colony.rested && colony.health !== 'poor' && want !== null && want >= WANTED;
}

function mother({ colony, lineAlive, lineHeld, takenIn28Days }: CuttingChoice): TodayEntry {
  return {
    id: `mother-${colony.id}`,
    tone: 'slate',
    group: 'soon',
    title: [`Cut ${colony.line.tradeName} from ${colony.code}`],
    detail: [`Rested. Stores took ${takenIn28Days} in 28 days and wait for ${lineHeld}; ${lineAlive} are alive.`],
    act: { label: 'Start', to: `/cutting/log?colonyId=${colony.id}` },
  };
}
