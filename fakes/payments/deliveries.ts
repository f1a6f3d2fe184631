import { signatureHeader } from './signature.ts';
import type { Attempt, PaymentStore, StoredEvent } from './store.ts';

const ANSWER_TIMEOUT_MS = 10_000;

interface DeliveryOptions {
  url: string | null;
  secret: string;
  /** Pauses before the second, third, … try of an event, ms; afterwards it is given up. */
  retryDelaysMs: readonly number[];
  now: () => number;
}

/** Sends events to the webhook address until it answers with a 2xx status or the tries are used up. */
export class Deliveries {
  readonly #timers = new Map<string, NodeJS.Timeout>();
  readonly #stopping = new AbortController();
  #url: string | null;

  constructor(
    private readonly store: PaymentStore,
    private readonly options: DeliveryOptions,
  ) {
    this.#url = options.url;
    for (const stored of store.events.values()) {
      if (stored.state === 'waiting') this.schedule(stored, 0);
    }
  }

  get url(): string | null {
    return this.#url;
  }

  sendTo(url: string | null): void {
    this.#url = url;
  }

  schedule(stored: StoredEvent, delayMs: number): void {
    const { id } = stored.event;
    clearTimeout(this.#timers.get(id));
    this.#timers.set(
      id,
      setTimeout(() => void this.#try(stored), delayMs),
    );
  }

  /** Sends an event again at once, with a fresh set of tries. */
  async resend(stored: StoredEvent): Promise<void> {
    clearTimeout(this.#timers.get(stored.event.id));
    stored.tries = 0;
    stored.state = 'waiting';
    await this.#try(stored);
  }

  close(): void {
    this.#stopping.abort();
    for (const timer of this.#timers.values()) clearTimeout(timer);
    this.#timers.clear();
  }

  async #try(stored: StoredEvent): Promise<void> {
    this.#timers.delete(stored.event.id);
    const attempt = await this.#post(stored);
    if (this.#stopping.signal.aborted) return;

    stored.attempts.push(attempt);
    stored.tries += 1;
    if (attempt.status !== null && attempt.status >= 200 && attempt.status < 300) {
      stored.state = 'delivered';
      stored.event.pending_webhooks = 0;
    } else {
      this.#retryOrGiveUp(stored);
    }
    this.store.save();
  }

  #retryOrGiveUp(stored: StoredEvent): void {
    const delayMs = this.options.retryDelaysMs[stored.tries - 1];
    if (delayMs === undefined) stored.state = 'given up';
    else this.schedule(stored, delayMs);
  }

  async #post({ event }: StoredEvent): Promise<Attempt> {
    const at = this.options.now();
    if (this.#url === null) return { at, status: null, error: 'No webhook address is set.' };

    const payload = JSON.stringify(event, null, 2);
    try {
      const answer = await fetch(this.#url, {
        method: 'POST',
        headers: {
          'Content-Type': 'application/json; charset=utf-8',
          'Stripe-Signature': signatureHeader(payload, this.options.secret, Math.floor(at / 1000)),
          'User-Agent': 'payments-stand-in',
        },
        body: payload,
        redirect: 'manual',
        signal: AbortSignal.any([this.#stopping.signal, AbortSignal.timeout(ANSWER_TIMEOUT_MS)]),
      });
      await answer.body?.cancel();
      return { at, status: answer.status, error: null };
    } catch (error) {
      return { at, status: null, error: reasonOf(error) };
    }
  }
}

/** `fetch` hides the network's reason in the cause. */
function reasonOf(error: unknown): string {
  if (!(error instanceof Error)) return String(error);
  return error.cause instanceof Error ? error.cause.message : error.message;
}
