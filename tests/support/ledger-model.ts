import { applyMovement, reverse, type Account, type Balances, type Movement } from '../../shared/domain/ledger.ts';
import { positionsOf } from '../../shared/domain/positions.ts';

export interface Place {
  account: Account;
  position: string | null;
}
interface Step {
  code: string;
  movement: Movement;
  from: Place;
  to: Place;
}
export interface Act {
  groupId: string;
  steps: Step[];
  /** Set on cuts: what makes the batch untouched is that nothing but the cut stands. */
  cutBatch: string | null;
  undone: boolean;
}

export const BENCH: Account = { kind: 'cut', ref: null };
const SIZE = { rows: 2, columns: 4 };

/** What the farm's stock must be, kept without a database: the laws of shared/domain/ledger and first-free placing. */
export class LedgerModel {
  balances: Balances = new Map();
  readonly plugs = new Map<string, { batchId: string; place: Place }>();
  readonly acts: Act[] = [];
  private movements = 0;

  inStock(code: string): boolean {
    const kind = this.plugs.get(code)?.place.account.kind;
    return (kind === 'rack' || kind === 'cut') && !this.isUndone(code);
  }

  freeOn(rackId: string): string[] {
    const taken = new Set(
      [...this.plugs.values()].filter(({ place }) => place.account.ref === rackId).map(({ place }) => place.position),
    );
    return positionsOf(SIZE).filter((position) => !taken.has(position));
  }

  addBatch(groupId: string | null, batchId: string, codes: readonly string[], rackId: string | null): void {
    const free = rackId === null ? [] : this.freeOn(rackId);
    for (const code of codes) {
      this.plugs.set(code, { batchId, place: { account: BENCH, position: null } });
    }
    if (rackId === null || groupId === null) return;
    this.move(groupId, codes, (index) => ({ account: { kind: 'rack', ref: rackId }, position: free[index] ?? null }));
    const act = this.acts.at(-1);
    if (act) act.cutBatch = batchId;
  }

  move(groupId: string, codes: readonly string[], to: (index: number) => Place): void {
    const steps = codes.map((code, index) => this.step(code, to(index)));
    this.acts.push({ groupId, steps, cutBatch: null, undone: false });
  }

  mayUndo(act: Act): boolean {
    if (act.undone) return false;
    if (act.cutBatch !== null) return !this.acts.some((other) => other !== act && this.touches(other, act.cutBatch));
    return act.steps.every(({ code, from, to }) => {
      const place = this.plugs.get(code)?.place;
      const isThere = place && samePlace(place, to);
      const isFree =
        from.position === null ||
        (place && samePlace(place, from)) ||
        this.freeOn(from.account.ref ?? '').includes(from.position);
      return isThere && isFree;
    });
  }

  undo(act: Act): void {
    for (const { code, movement, from } of [...act.steps].reverse()) {
      this.movements += 1;
      this.post(reverse(movement, String(this.movements)));
      const plug = this.plugs.get(code);
      if (plug) plug.place = from;
    }
    act.undone = true;
  }

  /** A move within one rack changes no balance. */
  private post(movement: Movement): void {
    if (movement.from.kind === movement.to.kind && movement.from.ref === movement.to.ref) return;
    this.balances = applyMovement(this.balances, movement);
  }

  private touches(act: Act, batchId: string | null): boolean {
    return !act.undone && act.steps.some(({ movement }) => movement.batchId === batchId);
  }

  private isUndone(code: string): boolean {
    const batchId = this.plugs.get(code)?.batchId;
    return this.acts.some(({ cutBatch, undone }) => undone && cutBatch === batchId);
  }

  private step(code: string, to: Place): Step {
    const plug = this.plugs.get(code);
    if (!plug) throw new Error(`The model has no plug ${code}.`);
    this.movements += 1;
    const from = plug.place;
    const movement: Movement = {
      ...{ id: String(this.movements), batchId: plug.batchId, pieces: 1, reverses: null },
      ...{ from: from.account, to: to.account },
    };
    this.post(movement);
    plug.place = to;
    return { code, movement, from, to };
  }
}

function samePlace(a: Place, b: Place): boolean {
  return a.account.kind === b.account.kind && a.account.ref === b.account.ref && a.position === b.position;
}
