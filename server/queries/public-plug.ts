import { eq } from 'drizzle-orm';
import type { PublicPlug } from '../../shared/contracts/public.ts';
import { monthOf } from '../../shared/domain/days.ts';
import { formatPlugCode, parsePlugCode } from '../../shared/domain/plug-code.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Db } from '../db/client.ts';
import { batches, lines, plugs } from '../db/schema/index.ts';
import { farmOf } from './farm.ts';

/**
 * The public side of a plug by its code in any spelling that people use.
 *
 * @throws {DomainError} `record.not_found`, with the code that was probably meant as `details.suggestion`
 */
export function publicPlug(db: Db, text: string): PublicPlug {
  const parsed = parsePlugCode(text);
  if (!('code' in parsed)) throw notKnown(parsed.suggestion);
  const found = db
    .select({
      code: plugs.code,
      lineCode: lines.code,
      tradeName: lines.tradeName,
      taxon: lines.taxon,
      publicText: lines.publicText,
      careText: lines.careText,
      cutOn: batches.cutOn,
    })
    .from(plugs)
    .innerJoin(batches, eq(batches.id, plugs.batchId))
    .innerJoin(lines, eq(lines.id, batches.lineId))
    .where(eq(plugs.code, parsed.code))
    .get();
  if (!found) throw notKnown();
  const { cutOn, ...shown } = found;
  return { ...shown, cutMonth: monthOf(cutOn), farmName: farmOf(db).name };
}

function notKnown(suggestion?: string): DomainError {
  return suggestion === undefined
    ? new DomainError('record.not_found', 'No plug of this farm has this code. Compare it with the label once more.')
    : new DomainError('record.not_found', `This code does not check out. Is it ${formatPlugCode(suggestion)}?`, {
        details: { suggestion },
      });
}
