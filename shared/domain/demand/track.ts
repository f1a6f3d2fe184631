import { MS_PER_DAY } from '../days.ts';
import type { Belief, Symmetric } from '../state-space/belief.ts';
import { advanceBank, glimpse, loosenBank, mixed, observeBank, startBank, type Bank, type Mixed } from './bank.ts';
import type { Model } from './models.ts';
import type { Node } from './moves.ts';

/** A reading this many standard deviations from what was expected is flagged and all but left out. */
const FLAG_BEYOND = 4;
/** Before so many readings nothing is expected firmly enough to doubt one. */
const TRUSTED_AFTER = 3;

/** What was known at a node from the data up to it, and how its reading was taken. */
export interface Tracked {
  node: Node;
  known: Mixed;
  /** Before its reading; null without one, or while the level was wholly unknown. */
  expected: Mixed | null;
  /** Measured − expected in standard deviations. */
  innovation: number | null;
  flagged: boolean;
  /** A step that nobody logged happened before it: this much uncertainty was added. */
  loosened: Symmetric | null;
}

interface Doubt {
  index: number;
  /** Before the doubted reading. */
  bank: Bank;
  gap: number;
}

/** Follows a level through its nodes, forward in time. */
export class Tracker {
  readonly tracked: Tracked[] = [];
  bank: Bank;
  readonly #models: readonly Model[];
  #doubt: Doubt | null = null;
  #trusted = 0;
  #trustedAt: number;

  constructor(models: readonly Model[], at: number, start: Belief) {
    this.#models = models;
    this.#trustedAt = at;
    this.bank = startBank(models, at, start);
  }

  take(node: Node): void {
    this.bank = advanceBank(this.bank, this.#models, node);
    const isKnown = this.bank.beliefs[0]?.diffuse === null;
    const before = mixed(this.bank.beliefs, this.bank.weights);
    const entry: Tracked = { node, known: before, expected: null, innovation: null, flagged: false, loosened: null };
    this.tracked.push(entry);
    const { reading } = node;
    if (!reading) return;
    const gap = reading.value - before.level;
    if (isKnown) {
      entry.expected = before;
      entry.innovation = gap / Math.sqrt(before.levelVariance + reading.sd ** 2);
    }
    const isDoubtful = Math.abs(entry.innovation ?? 0) > FLAG_BEYOND && this.#trusted >= TRUSTED_AFTER;
    if (!isDoubtful) this.#trust(node);
    else if (this.#doubt && this.#doubt.gap * gap > 0) this.#believe(this.#doubt, node);
    else {
      this.#doubt = { index: this.tracked.length - 1, bank: this.bank, gap };
      entry.flagged = true;
      this.bank = glimpse(this.bank, reading.value, gap ** 2);
    }
    entry.known = mixed(this.bank.beliefs, this.bank.weights);
  }

  #trust({ reading, at }: Node): void {
    if (!reading) return;
    this.bank = observeBank(this.bank, this.#models, reading, this.#trustedAt);
    this.#trustedAt = at;
    this.#trusted += 1;
    this.#doubt = null;
  }

  /** Two doubted readings in a row on the same side are no slips: something happened that nobody logged. */
  #believe({ index, bank, gap }: Doubt, node: Node): void {
    const [first, ...rest] = this.tracked.slice(index);
    if (!first) return;
    const days = Math.max(1, (first.node.at - this.#trustedAt) / MS_PER_DAY);
    first.flagged = false;
    first.loosened = { ll: gap ** 2, lr: 0, rr: (gap / days) ** 2 };
    this.bank = loosenBank(bank, first.loosened);
    this.#trust(first.node);
    for (const each of rest) this.bank = advanceBank(this.bank, this.#models, each.node);
    this.#trust(node);
  }
}
