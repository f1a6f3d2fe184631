import { html, type Markup } from '../web/html.ts';
import { instantText, type Page } from '../web/page.ts';
import type { Attempt, StoredEvent } from './store.ts';

const STATE_LOOK = { delivered: 'good', waiting: 'watch', 'given up': 'bad' } as const;

export function eventsPage(events: readonly StoredEvent[], webhookUrl: string | null): Page {
  return {
    title: 'Webhook events: payments stand-in',
    place: 'Payments stand-in',
    note: 'webhook events',
    body: html`
      <h1>Webhook events</h1>
      <p class="lead">
        ${
          webhookUrl === null
            ? 'No webhook address is set, so nothing is sent.'
            : html`Events go to <span class="code">${webhookUrl}</span>, newest first below.`
        }
      </p>
      ${events.length === 0 ? html`<p class="sheet empty">No event yet. Pay or refund something.</p>` : events.map(eventSheet)}
    `,
  };
}

function eventSheet({ event, attempts, state }: StoredEvent): Markup {
  return html`
    <article class="sheet" aria-labelledby="${event.id}">
      <div class="event-head">
        <h2 id="${event.id}">${event.type}</h2>
        <span class="tag ${STATE_LOOK[state]}">${state}</span>
        <form method="post" action="/_events/${event.id}/resend">
          <button type="submit">Send again<span class="hidden"> ${event.type} ${event.id}</span></button>
        </form>
      </div>
      <dl class="facts">
        <dt>Event</dt>
        <dd class="code">${event.id}</dd>
        <dt>About</dt>
        <dd class="code">${event.data.object.id}</dd>
        <dt>Made</dt>
        <dd>${instantText(event.created * 1000)}</dd>
      </dl>
      ${
        attempts.length > 0 &&
        html`<ol class="attempts">
          ${attempts.map(attemptRow)}
        </ol>`
      }
    </article>
  `;
}

function attemptRow({ at, status, error }: Attempt): Markup {
  const answer = status === null ? `no answer: ${error ?? 'unknown reason'}` : `answered ${status}`;
  return html`<li>${instantText(at)}, ${answer}</li>`;
}
