import { DomainError } from '../errors.ts';

export { LOSS_CAUSES, LOSS_SEEN } from './losses.ts';

export const ACCOUNT_KINDS = ['cut', 'rack', 'order', 'sold', 'lost', 'culled', 'recut', 'given', 'count'] as const;

export type AccountKind = (typeof ACCOUNT_KINDS)[number];

/**
 * What each kind of account is. Pieces begin at a source, live on stock accounts, and finish at an end. A source may go
 * below zero, because what it has given out stands elsewhere; nothing else may.
 */
export const ACCOUNTS: Readonly<Record<AccountKind, { role: 'source' | 'stock' | 'end'; label: string }>> = {
  cut: { role: 'source', label: 'Cut' },
  rack: { role: 'stock', label: 'On a rack' },
  order: { role: 'stock', label: 'Picked for an order' },
  sold: { role: 'end', label: 'Sold' },
  lost: { role: 'end', label: 'Lost' },
  culled: { role: 'end', label: 'Culled' },
  recut: { role: 'end', label: 'Cut again' },
  given: { role: 'end', label: 'Given away' },
  count: { role: 'source', label: 'Count difference' },
};

/** Where pieces of a batch stand. `ref` names the rack, the order or the cause; null where the kind needs none. */
export interface Account {
  kind: AccountKind;
  ref: string | null;
}

/** Whole pieces of one batch taken from one account to another; never edited, undone only by {@link reverse}. */
export interface Movement {
  id: string;
  batchId: string;
  from: Account;
  to: Account;
  pieces: number;
  /** The movement that this one undoes. */
  reverses: string | null;
}

/** Pieces by batch and account, under {@link balanceKey}. Accounts at zero may be missing. */
export type Balances = ReadonlyMap<string, number>;

/** Whether an account of this kind gives out pieces that it never held: the cut and count differences. */
export function mayGoBelowZero(kind: AccountKind): boolean {
  return ACCOUNTS[kind].role === 'source';
}

/** Whether pieces there have left the farm's stock for good. */
export function isEnd(kind: AccountKind): boolean {
  return ACCOUNTS[kind].role === 'end';
}

/** The key of a batch's pieces on an account, in {@link Balances}. */
export function balanceKey(batchId: string, { kind, ref }: Account): string {
  return JSON.stringify([batchId, kind, ref]);
}

/** Whole pieces of a batch on an account; zero where it was never named. */
export function balanceOf(balances: Balances, batchId: string, account: Account): number {
  return balances.get(balanceKey(batchId, account)) ?? 0;
}

/**
 * The balances after a movement; the given ones are left as they are.
 *
 * @throws {DomainError} `rule.refused` for a movement that makes no sense, `stock.not_enough` where the account it takes
 *   from would fall below zero
 */
export function applyMovement(balances: Balances, movement: Movement): Map<string, number> {
  assertMovement(movement);
  const { batchId, from, to, pieces } = movement;
  const there = balanceOf(balances, batchId, from);
  if (there < pieces && !mayGoBelowZero(from.kind)) {
    throw new DomainError('stock.not_enough', `Only ${there} of ${pieces} pieces are there. Count again and retry.`, {
      details: { batchId, account: from, there, wanted: pieces },
    });
  }
  return new Map(balances)
    .set(balanceKey(batchId, from), there - pieces)
    .set(balanceKey(batchId, to), balanceOf(balances, batchId, to) + pieces);
}

/**
 * The rules that a movement keeps by itself, whatever the balances: whole pieces, two different accounts, nothing put
 * back into "cut" or taken out of an end except to undo a mistake.
 *
 * @throws {DomainError} `rule.refused`
 */
export function assertMovement(movement: Movement): void {
  const { batchId, from, to, pieces, reverses } = movement;
  if (!(Number.isSafeInteger(pieces) && pieces > 0))
    throw refusal('Move one piece or more, in whole numbers.', movement);
  if (balanceKey(batchId, from) === balanceKey(batchId, to)) throw refusal('The pieces are already there.', movement);
  if (reverses !== null) return;
  if (to.kind === 'cut') throw refusal('Pieces cannot go back to the cut. Undo the cut instead.', movement);
  if (isEnd(from.kind)) throw refusal('These pieces have left the stock. Undo that step instead.', movement);
}

/**
 * The movement that undoes another.
 *
 * @param earlier movements already recorded, to see whether it was undone before
 * @throws {DomainError} `stock.already_reversed`; `rule.refused` for undoing an undo
 */
export function reverse(movement: Movement, id: string, earlier: Iterable<Movement> = []): Movement {
  if (movement.reverses !== null) throw refusal('An undo cannot be undone. Record the step again.', movement);
  for (const { reverses } of earlier) {
    if (reverses === movement.id) {
      throw new DomainError('stock.already_reversed', 'This step was already undone.', {
        details: { movementId: movement.id },
      });
    }
  }
  return { ...movement, id, from: movement.to, to: movement.from, reverses: movement.id };
}

/** All accounts of a batch added up: zero in a sound ledger. */
export function batchTotal(balances: Balances, batchId: string): number {
  return sumOf(balances, batchId, () => true);
}

/** Living pieces of a batch: on racks or picked for orders. */
export function livingPieces(balances: Balances, batchId: string): number {
  return sumOf(balances, batchId, (kind) => ACCOUNTS[kind].role === 'stock');
}

function sumOf(balances: Balances, batchId: string, wanted: (kind: AccountKind) => boolean): number {
  return ACCOUNT_KINDS.filter(wanted).reduce((sum, kind) => {
    const prefix = `${JSON.stringify([batchId, kind]).slice(0, -1)},`;
    return [...balances].reduce((part, [key, pieces]) => (key.startsWith(prefix) ? part + pieces : part), sum);
  }, 0);
}

function refusal(message: string, { id, batchId }: Movement): DomainError {
  return new DomainError('rule.refused', message, { details: { movementId: id, batchId } });
}
