import { ACCOUNTS } from '../../shared/domain/ledger.ts';
import { formatPlugCode } from '../../shared/domain/plug-code.ts';
import { DomainError } from '../../shared/errors.ts';
import type { Write } from '../db/write.ts';
import type { Db } from '../db/client.ts';
import type { PlacedPlug } from '../queries/find-plugs.ts';
import { openWithholds } from '../queries/withholds.ts';
import { stockAccount } from './stock-ledger.ts';

type AccountRow = ReturnType<typeof stockAccount>;

/**
 * The account that a plug is taken from: its rack, or the cut for one that waits on the bench.
 *
 * @throws {DomainError} `stock.not_there` for a plug that is picked for an order or has left the stock
 */
export function accountInStock(write: Write, plug: PlacedPlug): AccountRow {
  assertInStock(plug);
  return plug.rackId === null
    ? stockAccount(write, { kind: 'cut' })
    : stockAccount(write, { kind: 'rack', rackId: plug.rackId });
}

/** @throws {DomainError} `stock.not_there` for a plug that is neither on a rack nor on the bench */
export function assertInStock(plug: PlacedPlug): void {
  if (plug.undoneAt === null && (plug.kind === null || plug.kind === 'rack' || plug.kind === 'cut')) return;
  throw new DomainError('stock.not_there', whyNotThere(plug), {
    details: { code: plug.code, kind: plug.undoneAt === null ? plug.kind : 'undone' },
  });
}

/**
 * Refuses to take a plug away while something keeps it from sale. Picking for an order asks this too.
 *
 * @throws {DomainError} `stock.withheld`, with the reason
 */
export function assertNotWithheld(db: Db, plug: PlacedPlug): void {
  const [withhold] = openWithholds(db, { ...plug, plugCode: plug.code });
  if (!withhold) return;
  throw new DomainError(
    'stock.withheld',
    `${formatPlugCode(plug.code)} is withheld: ${withhold.reason}. Release it first, or leave it where it is.`,
    { details: { code: plug.code, withholdId: withhold.id, reason: withhold.reason } },
  );
}

function whyNotThere({ code, kind, undoneAt }: PlacedPlug): string {
  const shown = formatPlugCode(code);
  if (undoneAt !== null) return `${shown} belongs to a cut that was taken back.`;
  if (kind === 'order') return `${shown} is picked for an order. Put it back there first.`;
  const how = kind ? ACCOUNTS[kind].label.toLowerCase() : 'gone';
  return `${shown} has left the stock (${how}). Undo that step if it is still here.`;
}
