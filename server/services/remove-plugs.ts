import type { z } from 'zod';
import type { CullPlugs, GivePlugs, RecordLoss, StockActDone } from '../../shared/contracts/stock.ts';
import type { Write } from '../db/write.ts';
import { findPlugs } from '../queries/find-plugs.ts';
import { actTime } from './act-time.ts';
import { accountInStock, assertNotWithheld } from './plug-rules.ts';
import { postMovements, stockAccount, type AccountName } from './stock-ledger.ts';

interface Removal {
  codes: readonly string[];
  kind: 'loss' | 'cull' | 'give';
  to: AccountName;
  seen?: string;
  note: string;
  at: number | undefined;
}

const DONE_WORDS: Record<Removal['kind'], string> = { loss: 'lost', cull: 'culled', give: 'given' };

/** Plugs that died or disappeared, with what was seen and the likely cause. */
export function recordLoss(write: Write, { codes, seen, cause, note, at }: RecordLoss): StockActDone {
  return removePlugs(write, { codes, kind: 'loss', to: { kind: 'lost', cause }, seen, note, at });
}

/** Plugs taken out as unfit. */
export function cullPlugs(write: Write, { codes, reason, at }: z.infer<typeof CullPlugs>): StockActDone {
  return removePlugs(write, { codes, kind: 'cull', to: { kind: 'culled' }, note: reason, at });
}

/** Plugs given away. Withheld ones stay. @throws {DomainError} `stock.withheld` */
export function givePlugs(write: Write, { codes, to, at }: z.infer<typeof GivePlugs>): StockActDone {
  for (const plug of findPlugs(write.tx, codes)) assertNotWithheld(write.tx, plug);
  return removePlugs(write, { codes, kind: 'give', to: { kind: 'given' }, note: to, at });
}

function removePlugs(write: Write, removal: Removal): StockActDone {
  const { kind, seen = '', note } = removal;
  const found = findPlugs(write.tx, removal.codes);
  const from = found.map((plug) => accountInStock(write, plug));
  const to = stockAccount(write, removal.to);
  const at = actTime(write, removal.at);
  const { groupId } = postMovements(
    write,
    found.map((plug, index) => ({
      kind,
      batchId: plug.batchId,
      plugCode: plug.code,
      from: from[index] ?? to,
      to,
      seen,
      note,
      at,
    })),
  );
  write.audit({
    action: `stock.${DONE_WORDS[kind]}`,
    entity: 'stock_act',
    entityId: groupId,
    before: found.map(({ code, rackCode, position }) => ({ code, rackCode, position })),
    after: { to: removal.to, seen, note, at },
  });
  return { groupId, pieces: found.length, plugs: found.map(({ code }) => ({ code, position: null })) };
}
