import { sql } from 'drizzle-orm';
import type { SaleableForecast } from '../../shared/contracts/stock.ts';
import { addDays, dayOf, daysBetween, type Day } from '../../shared/domain/days.ts';
import { GRADES, gradeOf, isHealed, type Grade } from '../../shared/domain/growth.ts';
import { paceOf, SMALLEST_SOLD } from '../../shared/domain/line-pace.ts';
import { lossRates } from '../../shared/domain/loss-rates.ts';
import { saleableCount, type SaleableCount } from '../../shared/domain/saleable.ts';
import type { Db } from '../db/client.ts';
import type { BatchStock } from './batch-stock.ts';
import { farmOf } from './farm.ts';
import { genusOf, lineCurve, linePaces } from './growth.ts';
import { plugFates } from './plug-fates.ts';

const WEEKS_AHEAD = 26;
/** The day that is named: most of the pieces are expected to be ready then. */
const MOST = 5 / 8;
/** How pieces of a batch differ until they were measured: standard deviation by the mean (from memory). */
const USUAL_VARIATION = 0.15;
/** How far off the size at the cut may be, by itself (from memory). */
const START_ERROR = 0.08;
const LEAST_SAMPLE = 3;

interface Sample {
  mm: number;
  variation: number;
  pieces: number;
  on: Day;
}

/** How many of a batch's living pieces will reach their next sale grade, and by when; null where none lives or none is left to reach. */
export function saleableForecast(db: Db, stock: BatchStock, today: Day): SaleableForecast | null {
  const { alive } = stock.counts;
  if (alive === 0 || stock.cut.undoneAt !== null) return null;
  const sample = newestSample(db, stock);
  const growth = growthOf(db, stock, sample);
  const rates = lossRates(lineLives(db, stock.line.id, today));
  const age = daysBetween(stock.batch.cutOn, today);
  const countOn = (day: Day, grade: Grade): SaleableCount => {
    const ahead = daysBetween(stock.batch.cutOn, day);
    const survival = Math.exp(-rates.expected(stock.line.id, age, ahead));
    const pieces = {
      alive,
      variation: growth.variation,
      survival,
      isHealed: isHealed(stock.batch.cutOn, growth.healDays, day),
    };
    return saleableCount({ ...pieces, ...growth.meanOn(day) }, grade.minMm);
  };
  const isSoldNow = countOn(today, SMALLEST_SOLD).expected >= MOST * alive;
  const grade = isSoldNow ? gradeAbove(growth.meanOn(today).meanMm) : SMALLEST_SOLD;
  if (!grade) return null;
  const points = Array.from({ length: WEEKS_AHEAD + 1 }, (_, week) => addDays(today, 7 * week)).map((day) => ({
    day,
    ...countOn(day, grade),
  }));
  const on = dayOfMost(points, alive, (day) => countOn(day, grade).expected);
  return {
    ...{ grade: grade.code, isFirstSale: !isSoldNow, of: alive, on, ...countOn(on, grade), points },
    basis: { ...growth.basis, variation: growth.variation, sampled: sample?.pieces ?? 0 },
  };
}

/** The first day on which most are expected to be ready, else the last day that is looked at. */
function dayOfMost(points: SaleableForecast['points'], alive: number, expectedOn: (day: Day) => number): Day {
  const week = points.findIndex(({ expected }) => expected >= MOST * alive);
  const last = points.at(week)?.day ?? '';
  if (week <= 0) return last;
  const days = Array.from({ length: 7 }, (_, back) => addDays(last, back - 6));
  return days.find((day) => expectedOn(day) >= MOST * alive) ?? last;
}

function gradeAbove(mm: number): Grade | undefined {
  return GRADES[GRADES.findIndex(({ code }) => code === gradeOf(mm).code) + 1];
}

/** The mean size on a coming day: from the newest sample, or the cut, on by the line's curve or its pooled pace. */
function growthOf(db: Db, { batch, line }: BatchStock, sample: Sample | null) {
  const usual = paceOf(line);
  const pace = linePaces(db).of(line.id, genusOf(line.taxon));
  const curve = lineCurve(db, line.id);
  const variation = sample?.variation ?? USUAL_VARIATION;
  const from = sample ?? { mm: batch.startMm, on: batch.cutOn, pieces: 0 };
  const fromSd = sample ? (from.mm * variation) / Math.sqrt(sample.pieces) : from.mm * START_ERROR;
  const fromAge = daysBetween(batch.cutOn, from.on);
  const grownTo = (age: number) =>
    curve && curve.code !== 'linear'
      ? curve.sizeAt(age) - curve.sizeAt(fromAge)
      : (usual.mmPerWeek * pace.ratio * (age - fromAge)) / 7;
  return {
    variation,
    healDays: usual.healDays,
    basis: { ratio: pace.ratio, ratioSd: pace.sd, batches: pace.batches, curve: curve?.code ?? null },
    meanOn: (day: Day) => {
      const grown = Math.max(0, grownTo(daysBetween(batch.cutOn, day)));
      return { meanMm: from.mm + grown, meanSdMm: Math.hypot(fromSd, (grown * pace.sd) / pace.ratio) };
    },
  };
}

function newestSample(db: Db, { batch }: BatchStock): Sample | null {
  const { timeZone } = farmOf(db);
  const rows = db.all<{ mm: number; at: number }>(sql`
    SELECT size_mm AS mm, at FROM size_reading WHERE batch_id = ${batch.id} AND plug_code IS NULL
      AND at = (SELECT max(at) FROM size_reading WHERE batch_id = ${batch.id} AND plug_code IS NULL)`);
  const [first] = rows;
  if (!first || rows.length < LEAST_SAMPLE) return null;
  const mm = rows.reduce((sum, row) => sum + row.mm, 0) / rows.length;
  const variance = rows.reduce((sum, row) => sum + (row.mm - mm) ** 2, 0) / (rows.length - 1);
  const variation = Math.max(0.02, Math.sqrt(variance) / mm);
  return { mm, variation, pieces: rows.length, on: dayOf(first.at, timeZone) };
}

function lineLives(db: Db, lineId: string, today: Day) {
  const { timeZone } = farmOf(db);
  return plugFates(db, sql`b.line_id = ${lineId}`, today, timeZone).map(({ day, lost }) => ({
    ...{ line: lineId, fromDay: 0, toDay: day, lost },
  }));
}
