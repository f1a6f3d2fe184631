import { mkdirSync, readFileSync, renameSync, writeFileSync } from 'node:fs';
import { dirname } from 'node:path';
import type { Charge, Event, Intent, LineItem, Refund, Session } from './objects.ts';
import type { CreateSession } from './params.ts';

export interface StoredSession {
  session: Session;
  lines: LineItem[];
  /** Given at creation, put on the payment intent when the customer first tries to pay. */
  intentData: CreateSession['payment_intent_data'];
}

export interface Attempt {
  at: number;
  /** HTTP status of the receiver, or null where no answer came. */
  status: number | null;
  error: string | null;
}

export interface StoredEvent {
  event: Event;
  attempts: Attempt[];
  /** Tries since the event was made or sent again by hand; decides the next pause. */
  tries: number;
  state: 'waiting' | 'delivered' | 'given up';
}

interface StoredAnswer {
  fingerprint: string;
  status: number;
  body: object;
}

interface Snapshot {
  sessions: StoredSession[];
  intents: Intent[];
  charges: Charge[];
  refunds: Refund[];
  events: StoredEvent[];
  answers: [string, StoredAnswer][];
}

/** Everything the stand-in knows: in memory, and in one JSON file when it is given one. */
export class PaymentStore {
  readonly sessions = new Map<string, StoredSession>();
  readonly intents = new Map<string, Intent>();
  readonly charges = new Map<string, Charge>();
  readonly refunds = new Map<string, Refund>();
  readonly events = new Map<string, StoredEvent>();
  readonly answers = new Map<string, StoredAnswer>();

  constructor(private readonly file: string | null) {
    if (file !== null) this.load(file);
  }

  /** Writes the file anew and swaps it in, so that a stop half-way leaves the old one whole. */
  save(): void {
    if (this.file === null) return;
    const snapshot: Snapshot = {
      sessions: [...this.sessions.values()],
      intents: [...this.intents.values()],
      charges: [...this.charges.values()],
      refunds: [...this.refunds.values()],
      events: [...this.events.values()],
      answers: [...this.answers],
    };
    mkdirSync(dirname(this.file), { recursive: true });
    writeFileSync(`${this.file}.new`, JSON.stringify(snapshot));
    renameSync(`${this.file}.new`, this.file);
  }

  private load(file: string): void {
    let text: string;
    try {
      text = readFileSync(file, 'utf8');
    } catch (error) {
      if (error instanceof Error && 'code' in error && error.code === 'ENOENT') return;
      throw error;
    }
    // Only save() writes this file, so its shape is known.
    const snapshot = JSON.parse(text) as Snapshot;
    for (const each of snapshot.sessions) this.sessions.set(each.session.id, each);
    for (const each of snapshot.intents) this.intents.set(each.id, each);
    for (const each of snapshot.charges) this.charges.set(each.id, each);
    for (const each of snapshot.refunds) this.refunds.set(each.id, each);
    for (const each of snapshot.events) this.events.set(each.event.id, each);
    for (const [key, answer] of snapshot.answers) this.answers.set(key, answer);
  }
}
