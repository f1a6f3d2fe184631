import type { Sqlite } from '../db/client.ts';
import { inWrite, type Actor, type Write } from '../db/write.ts';
import type { Deps } from '../deps.ts';

export type Act = (write: Write) => void;

interface Entry {
  at: number;
  actor: Actor;
  act: Act;
}

/** What happens on the farm, in order of time. Acts may put later ones on it. */
export class Agenda {
  private readonly entries: Entry[] = [];
  private readonly deps: Deps;
  private readonly clock: { at: number };

  constructor(deps: Deps, clock: { at: number }) {
    this.deps = deps;
    this.clock = clock;
  }

  /** Acts of one instant keep the order in which they were put down. */
  put(at: number, actor: Actor, act: Act): void {
    const after = this.entries.findLastIndex((entry) => entry.at <= at);
    this.entries.splice(after + 1, 0, { at, actor, act });
  }

  /** Does everything up to an instant, in one transaction, with the clock at each act's own time. */
  runUntil(sqlite: Sqlite, until: number): void {
    sqlite.transaction(() => {
      for (let entry = this.entries[0]; entry && entry.at <= until; entry = this.entries[0]) {
        this.entries.shift();
        this.clock.at = entry.at;
        inWrite(this.deps, entry.actor, entry.act);
      }
    })();
  }
}
