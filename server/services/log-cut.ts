import { eq, like, sql } from 'drizzle-orm';
import type { LogCut, LoggedCut } from '../../shared/contracts/stock.ts';
import { batchCodePrefix, nextBatchCode } from '../../shared/domain/batch-code.ts';
import { dayOf, startOfDay, type Day } from '../../shared/domain/days.ts';
import { isRested, nextCutFrom, paceOf } from '../../shared/domain/line-pace.ts';
import { freePositions } from '../../shared/domain/positions.ts';
import { DomainError } from '../../shared/errors.ts';
import { batches, colonies, cuts, lines } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { farmOf } from '../queries/farm.ts';
import { rackInUse } from '../queries/places.ts';
import { makePlugs } from './make-plugs.ts';
import { takenPositions } from './place-plugs.ts';
import { postMovements, stockAccount } from './stock-ledger.ts';
import { useSupply } from './supply-use.ts';

type ColonyRow = typeof colonies.$inferSelect;
type LineRow = typeof lines.$inferSelect;

const NOON_MS = 12 * 3_600_000;

/**
 * Logs the cutting of a mother: the cut, its batch, a labelled plug for each piece, their first places, and what plugs
 * and glue it took. All of it or nothing.
 *
 * @throws {DomainError} `rule.refused` at `restOverride` where the mother has not rested and no reason is given, or where
 *   the rack has too few free positions; `supply.not_enough`
 */
export function logCut(write: Write, input: LogCut): LoggedCut {
  const { colony, line } = motherInUse(write, input.colonyId);
  const { timeZone } = farmOf(write.tx);
  const today = dayOf(write.now, timeZone);
  assertCutDay(input.cutOn, today, colony);
  const note = noteWithOverride(colony, input);
  const positions = positionsFor(write, input);

  const cut = write.tx
    .insert(cuts)
    .values({
      id: write.newId(),
      colonyId: colony.id,
      cutOn: input.cutOn,
      pieces: input.pieces,
      failedPieces: input.failedPieces,
      minutes: input.minutes,
      tool: input.tool,
      by: write.actor.name,
      note,
      createdAt: write.now,
    })
    .returning()
    .get();
  const batch = write.tx
    .insert(batches)
    .values({
      id: write.newId(),
      code: newBatchCode(write, line.code, input.cutOn),
      lineId: line.id,
      cutId: cut.id,
      cutOn: input.cutOn,
      pieces: input.pieces,
      startMm: input.startMm ?? paceOf(line).startMm,
      createdAt: write.now,
    })
    .returning()
    .get();
  const codes = makePlugs(write, batch.id, input.pieces);
  const at = input.cutOn === today ? write.now : startOfDay(input.cutOn, timeZone) + NOON_MS;
  const groupId = placeFirst(write, batch.id, codes, positions, input, at);
  takeMounts(write, cut.id, input, at);
  markCut(write, colony, input.cutOn);

  write.audit({
    action: 'cut.logged',
    entity: 'cut',
    entityId: cut.id,
    after: { ...input, batchCode: batch.code, colonyCode: colony.code },
  });
  const plugs = codes.map((code, index) => ({ code, number: index + 1, position: positions[index] ?? null }));
  return { cutId: cut.id, batchId: batch.id, batchCode: batch.code, groupId, plugs };
}

function motherInUse(write: Write, colonyId: string): { colony: ColonyRow; line: LineRow } {
  const mother = write.tx
    .select({ colony: colonies, line: lines })
    .from(colonies)
    .innerJoin(lines, eq(lines.id, colonies.lineId))
    .where(eq(colonies.id, colonyId))
    .get();
  if (!mother) throw new DomainError('record.not_found', 'This mother is not known. Choose one from the list.');
  if (mother.colony.retiredAt === null) return mother;
  throw new DomainError('rule.refused', `${mother.colony.code} is retired. Choose another mother.`);
}

function assertCutDay(cutOn: Day, today: Day, colony: ColonyRow): void {
  const message =
    cutOn > today
      ? 'This day is still to come.'
      : cutOn < colony.acquiredOn
        ? `${colony.code} came to the farm on ${colony.acquiredOn}.`
        : null;
  if (message) throw new DomainError('input.invalid', message, { fields: [{ path: 'cutOn', message }] });
}

function noteWithOverride(colony: ColonyRow, { cutOn, restOverride, note }: LogCut): string {
  if (isRested(colony.lastCutOn, colony.restDays, cutOn)) return note;
  if (restOverride) return [`Cut before it had rested: ${restOverride}`, note].filter(Boolean).join('\n');
  const from = nextCutFrom(colony.lastCutOn, colony.restDays);
  const message = `${colony.code} rests until ${from}. Say why it is cut now, or choose another mother.`;
  throw new DomainError('rule.refused', message, {
    fields: [{ path: 'restOverride', message }],
    details: { nextCutFrom: from },
  });
}

function positionsFor({ tx }: Write, { target, pieces }: LogCut): string[] {
  if (target.kind === 'bench') return [];
  const { rack } = rackInUse(tx, target.rackId);
  return freePositions(rack, takenPositions(tx, rack.id), pieces, target.startPosition);
}

function newBatchCode({ tx }: Write, lineCode: string, cutOn: Day): string {
  const taken = tx
    .select({ code: batches.code })
    .from(batches)
    .where(like(batches.code, `${batchCodePrefix(lineCode, cutOn)}%`))
    .all();
  return nextBatchCode(
    lineCode,
    cutOn,
    taken.map(({ code }) => code),
  );
}

function placeFirst(
  write: Write,
  batchId: string,
  codes: readonly string[],
  positions: readonly string[],
  { target, note }: LogCut,
  at: number,
): string | null {
  if (target.kind === 'bench') return null;
  const from = stockAccount(write, { kind: 'cut' });
  const to = stockAccount(write, { kind: 'rack', rackId: target.rackId });
  return postMovements(
    write,
    codes.map((plugCode, index) => ({
      kind: 'cut',
      batchId,
      plugCode,
      from,
      to,
      toPosition: positions[index] ?? null,
      note,
      at,
    })),
  ).groupId;
}

function takeMounts(write: Write, cutId: string, input: LogCut, at: number): void {
  const { plugItemId, glueItemId, gluePerPiece, pieces } = input;
  const mounts = [
    { itemId: plugItemId, quantity: pieces },
    { itemId: glueItemId, quantity: gluePerPiece * pieces },
  ];
  for (const { itemId, quantity } of mounts) {
    if (itemId !== null) useSupply(write, { itemId, quantity, cause: 'cut', causeId: cutId, at });
  }
}

function markCut(write: Write, colony: ColonyRow, cutOn: Day): void {
  if (colony.lastCutOn !== null && colony.lastCutOn >= cutOn) return;
  write.tx
    .update(colonies)
    .set({ lastCutOn: cutOn, version: sql`${colonies.version} + 1` })
    .where(eq(colonies.id, colony.id))
    .run();
}
