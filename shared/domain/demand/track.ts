import { MS_PER_DAY } from '../days.ts';
import type { Belief, Symmetric } from '../state-space/belief.ts';
import {
  advanceBank,
  copyBank,
  glimpse,
  loosenBank,
  mixed,
  observeBank,
  startBank,
  type Bank,
  type Mixed,
} from './bank.ts';
import type { LevelReading } from './inputs.ts';
import type { Model } from './models.ts';
import type { Node } from './moves.ts';

/** A reading this many standard deviations from what was expected is flagged and all but left out. */
const FLAG_BEYOND = 4;
/** Before so many readings nothing is expected firmly enough to doubt one. */
const TRUSTED_AFTER = 3;
/** Evidence for a model fades with this time, so that a farm that changes its ways is learnt anew. */
const MEMORY_DAYS = 730;

/** What was known at a node from the data up to it, and how its reading was taken. */
export interface Tracked {
  node: Node;
  known: Mixed;
  /** Before its reading; null without one, and at the first. */
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
  #doubt: Doubt | null = null;
  #trusted = 1;
  #trustedAt: number;

  /** @param first node, with the first reading */
  constructor(models: readonly Model[], start: Belief, first: Node & { reading: LevelReading }) {
    this.bank = startBank(models, start, first.reading);
    this.#trustedAt = first.at;
    const known = mixed(this.bank);
    this.tracked.push({ node: first, known, expected: null, innovation: null, flagged: false, loosened: null });
  }

  take(node: Node): void {
    advanceBank(this.bank, node.move);
    const known = mixed(this.bank);
    const entry: Tracked = { node, known, expected: null, innovation: null, flagged: false, loosened: null };
    this.tracked.push(entry);
    const { reading } = node;
    if (!reading) return;
    const gap = reading.value - known.level;
    entry.expected = known;
    entry.innovation = gap / Math.sqrt(known.levelVariance + reading.sd ** 2);
    const isDoubtful = Math.abs(entry.innovation) > FLAG_BEYOND && this.#trusted >= TRUSTED_AFTER;
    if (!isDoubtful) this.#trust(reading);
    else if (this.#doubt && this.#doubt.gap * gap > 0) this.#believe(this.#doubt, reading);
    else {
      this.#doubt = { index: this.tracked.length - 1, bank: copyBank(this.bank), gap };
      entry.flagged = true;
      glimpse(this.bank, reading.value, gap ** 2);
    }
    entry.known = mixed(this.bank);
  }

  #trust(reading: LevelReading): void {
    const days = (reading.at - this.#trustedAt) / MS_PER_DAY;
    observeBank(this.bank, reading, Math.exp(-days / MEMORY_DAYS));
    this.#trustedAt = reading.at;
    this.#trusted += 1;
    this.#doubt = null;
  }

  /** Two doubted readings in a row on the same side are no slips: something happened that nobody logged. */
  #believe({ index, bank, gap }: Doubt, reading: LevelReading): void {
    const [first, ...rest] = this.tracked.slice(index);
    if (!first?.node.reading) return;
    const days = Math.max(1, (first.node.at - this.#trustedAt) / MS_PER_DAY);
    first.flagged = false;
    first.loosened = { ll: gap ** 2, lr: 0, rr: (gap / days) ** 2 };
    this.bank = bank;
    loosenBank(bank, first.loosened);
    this.#trust(first.node.reading);
    for (const { node } of rest) advanceBank(bank, node.move);
    this.#trust(reading);
  }
}
