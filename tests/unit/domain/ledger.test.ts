import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  ACCOUNT_KINDS,
  applyMovement,
  balanceOf,
  batchTotal,
  isEnd,
  livingPieces,
  LOSS_CAUSES,
  LOSS_SEEN,
  mayGoBelowZero,
  reverse,
  type Account,
  type AccountKind,
  type Balances,
  type Movement,
} from '../../../shared/domain/ledger.ts';
import { DomainError } from '../../../shared/errors.ts';
import { domainErrorOf } from '../../support/domain-error.ts';

const account = (kind: AccountKind, ref: string | null = null): Account => ({ kind, ref });
const cut = account('cut');
const rack = account('rack', 'R7');
const order = account('order', 'O1');

let made = 0;
function move(from: Account, to: Account, pieces: number, changes: Partial<Movement> = {}): Movement {
  made += 1;
  return { id: `m${made}`, batchId: 'b1', from, to, pieces, reverses: null, ...changes };
}

function after(...movements: Movement[]): Balances {
  return movements.reduce<Balances>(applyMovement, new Map());
}

describe('a movement', () => {
  it('takes pieces from one account to another', () => {
    const balances = after(move(cut, rack, 22), move(rack, order, 3), move(rack, account('lost', 'rtn'), 2));

    expect(balanceOf(balances, 'b1', cut)).toBe(-22);
    expect(balanceOf(balances, 'b1', rack)).toBe(17);
    expect(balanceOf(balances, 'b1', order)).toBe(3);
    expect(balanceOf(balances, 'b1', account('lost', 'rtn'))).toBe(2);
    expect(livingPieces(balances, 'b1')).toBe(20);
  });

  it('leaves the balances it was given as they were', () => {
    const before = after(move(cut, rack, 5));
    applyMovement(before, move(rack, order, 5));
    expect(balanceOf(before, 'b1', rack)).toBe(5);
  });

  it('when the rack holds fewer, is refused with the number that is there', () => {
    const balances = after(move(cut, rack, 2));
    const error = domainErrorOf(() => applyMovement(balances, move(rack, order, 3)));
    expect(error.code).toBe('stock.not_enough');
    expect(error.details).toMatchObject({ there: 2, wanted: 3 });
  });

  it('keeps batches and racks apart', () => {
    const balances = after(
      move(cut, rack, 2),
      move(cut, account('rack', 'R8'), 9),
      move(cut, rack, 9, { batchId: 'b2' }),
    );
    expect(domainErrorOf(() => applyMovement(balances, move(rack, order, 3))).code).toBe('stock.not_enough');
    expect(livingPieces(balances, 'b1')).toBe(11);
    expect(livingPieces(balances, 'b2')).toBe(9);
  });

  it('when a count finds more, the count account goes below zero', () => {
    const balances = after(move(cut, rack, 2), move(account('count'), rack, 1));
    expect(balanceOf(balances, 'b1', account('count'))).toBe(-1);
    expect(livingPieces(balances, 'b1')).toBe(3);
  });

  it.each([
    ['no pieces', move(cut, rack, 0)],
    ['a negative number', move(cut, rack, -1)],
    ['half a piece', move(cut, rack, 0.5)],
    ['not a number', move(cut, rack, Number.NaN)],
    ['the same place twice', move(rack, rack, 1)],
    ['back into the cut', move(rack, cut, 1)],
    ['out of what was sold', move(account('sold', 'O1'), rack, 1)],
    ['out of what was lost', move(account('lost', 'rtn'), rack, 1)],
  ])('of %s is refused', (_, movement) => {
    const balances = after(
      move(cut, rack, 9),
      move(rack, account('sold', 'O1'), 2),
      move(rack, account('lost', 'rtn'), 2),
    );
    expect(domainErrorOf(() => applyMovement(balances, movement)).code).toBe('rule.refused');
  });
});

describe('undoing a movement', () => {
  it('puts everything back and names what it undid', () => {
    const sale = move(order, account('sold', 'O1'), 2);
    const before = after(move(cut, rack, 5), move(rack, order, 2));

    const undo = reverse(sale, 'undo');
    const balances = applyMovement(applyMovement(before, sale), undo);

    expect(undo).toMatchObject({ id: 'undo', from: sale.to, to: sale.from, pieces: 2, reverses: sale.id });
    expect(balanceOf(balances, 'b1', order)).toBe(2);
    expect(balanceOf(balances, 'b1', account('sold', 'O1'))).toBe(0);
  });

  it('can undo the cut itself, but only while the pieces are still there', () => {
    const first = move(cut, rack, 5);
    expect(batchTotal(after(first, reverse(first, 'u')), 'b1')).toBe(0);
    const moved = after(first, move(rack, order, 1));
    expect(domainErrorOf(() => applyMovement(moved, reverse(first, 'u'))).code).toBe('stock.not_enough');
  });

  it('when it was undone before, is refused', () => {
    const loss = move(rack, account('lost', 'rtn'), 1);
    const undo = reverse(loss, 'u1');
    expect(domainErrorOf(() => reverse(loss, 'u2', [loss, undo])).code).toBe('stock.already_reversed');
  });

  it('when it is an undo itself, is refused', () => {
    const undo = reverse(move(cut, rack, 1), 'u1');
    expect(domainErrorOf(() => reverse(undo, 'u2')).code).toBe('rule.refused');
  });
});

describe('the laws under any sequence', () => {
  const anyAccount = fc
    .tuple(fc.constantFrom(...ACCOUNT_KINDS), fc.constantFrom('1', '2'))
    .map(([kind, ref]) => account(kind, mayGoBelowZero(kind) ? null : ref));
  const step = fc.oneof(
    fc.record({
      kind: fc.constant('move' as const),
      from: anyAccount,
      to: anyAccount,
      pieces: fc.integer({ min: -1, max: 12 }),
      batchId: fc.constantFrom('b1', 'b2'),
    }),
    fc.record({
      kind: fc.constant('cut' as const),
      pieces: fc.integer({ min: 1, max: 20 }),
      batchId: fc.constantFrom('b1', 'b2'),
    }),
    fc.record({ kind: fc.constant('undo' as const), which: fc.nat({ max: 60 }) }),
  );

  type Step = typeof step extends fc.Arbitrary<infer Value> ? Value : never;

  function movementOf(each: Step, done: readonly Movement[], id: string): Movement | undefined {
    if (each.kind === 'cut')
      return { id, batchId: each.batchId, from: cut, to: account('rack', '1'), pieces: each.pieces, reverses: null };
    if (each.kind === 'move')
      return { id, batchId: each.batchId, from: each.from, to: each.to, pieces: each.pieces, reverses: null };
    const target = done[each.which % Math.max(1, done.length)];
    return target && reverse(target, id, done);
  }

  /** Plays the steps as a server would: what is refused changes nothing. */
  function play(steps: readonly Step[]): { balances: Balances; done: Movement[]; refusals: DomainError[] } {
    let balances: Balances = new Map();
    const done: Movement[] = [];
    const refusals: DomainError[] = [];
    for (const [index, each] of steps.entries()) {
      try {
        const movement = movementOf(each, done, `m${index}`);
        if (!movement) continue;
        balances = applyMovement(balances, movement);
        done.push(movement);
      } catch (error) {
        if (!(error instanceof DomainError)) throw error;
        refusals.push(error);
      }
    }
    return { balances, done, refusals };
  }

  const steps = fc.array(step, { maxLength: 60 });

  it('every batch adds up to zero', () => {
    fc.assert(
      fc.property(steps, (list) => {
        const { balances } = play(list);
        expect([batchTotal(balances, 'b1'), batchTotal(balances, 'b2')]).toEqual([0, 0]);
      }),
    );
  });

  it('nothing but a source falls below zero', () => {
    fc.assert(
      fc.property(steps, (list) => {
        for (const [key, pieces] of play(list).balances) {
          const kind = ACCOUNT_KINDS.find((each) => key.includes(`"${each}"`));
          if (kind && !mayGoBelowZero(kind)) expect(pieces).toBeGreaterThanOrEqual(0);
        }
      }),
    );
  });

  it('balances are just the movements added up', () => {
    fc.assert(
      fc.property(steps, (list) => {
        const { balances, done } = play(list);
        for (const { batchId, from, to } of done) {
          for (const place of [from, to]) {
            const same = (other: Account) => other.kind === place.kind && other.ref === place.ref;
            const expected = done
              .filter((movement) => movement.batchId === batchId)
              .reduce((sum, each) => sum + (same(each.to) ? each.pieces : 0) - (same(each.from) ? each.pieces : 0), 0);
            expect(balanceOf(balances, batchId, place)).toBe(expected);
          }
        }
      }),
    );
  });

  it('no movement is undone twice, and no undo is undone', () => {
    fc.assert(
      fc.property(steps, (list) => {
        const { done } = play(list);
        const undone = done.flatMap(({ reverses }) => (reverses === null ? [] : [reverses]));
        expect(new Set(undone).size).toBe(undone.length);
        const undos = new Set(done.filter(({ reverses }) => reverses !== null).map(({ id }) => id));
        expect(undone.filter((id) => undos.has(id))).toEqual([]);
      }),
    );
  });

  it('undoing everything, last first, empties every account', () => {
    fc.assert(
      fc.property(steps, (list) => {
        const { balances, done } = play(list);
        const undone = new Set(done.map(({ reverses }) => reverses));
        const open = done.filter(({ id, reverses }) => reverses === null && !undone.has(id)).reverse();
        // An early movement may stand before a later undo, so only the sum of all can be promised, not every order.
        const end = open.reduce<Map<string, number>>((sums, movement) => {
          const undo = reverse(movement, `u${movement.id}`, done);
          const key = (place: Account) => JSON.stringify([undo.batchId, place.kind, place.ref]);
          return sums
            .set(key(undo.from), (sums.get(key(undo.from)) ?? 0) - undo.pieces)
            .set(key(undo.to), (sums.get(key(undo.to)) ?? 0) + undo.pieces);
        }, new Map(balances));
        expect([...end.values()].every((pieces) => pieces === 0)).toBe(true);
      }),
    );
  });

  it('only refuses with a reason that people can act on', () => {
    fc.assert(
      fc.property(steps, (list) => {
        for (const { code, message } of play(list).refusals) {
          expect(['stock.not_enough', 'stock.already_reversed', 'rule.refused']).toContain(code);
          expect(message).toMatch(/\.$/);
        }
      }),
    );
  });
});

describe('account kinds and loss words', () => {
  it('only the cut and the count give out what they do not hold', () => {
    expect(ACCOUNT_KINDS.filter(mayGoBelowZero)).toEqual(['cut', 'count']);
  });

  it('what left the farm stays gone', () => {
    expect(ACCOUNT_KINDS.filter(isEnd)).toEqual(['sold', 'lost', 'culled', 'recut', 'given']);
  });

  it.each([
    ['seen', LOSS_SEEN],
    ['causes', LOSS_CAUSES],
  ])('loss %s: each code and label is given once', (_, words) => {
    expect(new Set(words.map(({ code }) => code)).size).toBe(words.length);
    expect(new Set(words.map(({ label }) => label)).size).toBe(words.length);
    for (const { code } of words) expect(code).toMatch(/^[a-z_]+$/);
  });
});
