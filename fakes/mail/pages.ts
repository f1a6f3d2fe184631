import { html, Markup, escapeHtml } from '../web/html.ts';
import { instantText, type Page } from '../web/page.ts';
import type { Mail } from './inbox.ts';

const FRAME = { place: 'Mail stand-in', note: 'nothing leaves this machine' };

export function inboxPage(mails: readonly Mail[]): Page {
  return {
    ...FRAME,
    title: 'Mail received: mail stand-in',
    body: html`
      ${pageHead(mails)}
      ${
        mails.length === 0
          ? html`<p class="sheet empty">No mail yet. It shows here as soon as some is sent; refresh to look again.</p>`
          : html`<div class="columns mail">
              ${mailList(mails, null)}
              <p class="sheet empty reading-only">Choose a mail to read it here.</p>
            </div>`
      }
    `,
  };
}

export function mailPage(mails: readonly Mail[], mail: Mail): Page {
  return {
    ...FRAME,
    title: `${mail.subject}: mail stand-in`,
    body: html`
      ${pageHead(mails)}
      <div class="columns mail reading">${mailList(mails, mail)} ${mailSheet(mail)}</div>
    `,
  };
}

export function missingPage(): Page {
  return {
    ...FRAME,
    title: 'No such mail',
    body: html`
      <h1>There is no such mail</h1>
      <p class="lead">It may have been deleted. <a href="/">Show all mails</a></p>
    `,
    width: 'narrow',
  };
}

/** Address of an attachment; the number is its place in the mail. */
export function attachmentUrl(mail: Mail, index: number): string {
  return `/messages/${mail.id}/attachments/${index}`;
}

/** Web addresses in a text. Marks that end a sentence are not part of them. */
export function linksIn(text: string): string[] {
  return text.match(/https?:\/\/[^\s<>"']*[^\s<>"'.,;:!?)\]]/g) ?? [];
}

function pageHead(mails: readonly Mail[]): Markup {
  return html`<div class="page-head">
    <h1>${mails.length === 1 ? '1 mail' : `${mails.length} mails`}</h1>
    <a class="button" href="/">Refresh</a>
    ${mails.length > 0 && html`<form method="post" action="/clear"><button type="submit">Delete all</button></form>`}
  </div>`;
}

function mailList(mails: readonly Mail[], current: Mail | null): Markup {
  return html`<nav class="sheet mail-list" aria-label="Mails, newest first">
    <ul>
      ${mails.map(
        (mail) =>
          html`<li>
            <a href="/messages/${mail.id}" ${mail === current && html`aria-current="page"`}>
              <span class="subject">${mail.subject}</span>
              <span class="small">${instantText(mail.receivedAt).slice(5, 16)}</span>
              <span class="people small">to ${mail.to || mail.recipients.join(', ')}</span>
            </a>
          </li>`,
      )}
    </ul>
  </nav>`;
}

function mailSheet(mail: Mail): Markup {
  return html`<article class="sheet" aria-labelledby="subject">
    <div class="mail-head">
      <p class="phone-only"><a class="button" href="/">All mails</a></p>
      <h2 id="subject">${mail.subject}</h2>
    </div>
    <dl class="facts">
      <dt>From</dt>
      <dd>${mail.from}</dd>
      <dt>To</dt>
      <dd>${mail.to || mail.recipients.join(', ')}</dd>
      ${
        mail.cc !== '' &&
        html`<dt>Copy</dt>
          <dd>${mail.cc}</dd>`
      }
      <dt>Received</dt>
      <dd>${instantText(mail.receivedAt)}</dd>
    </dl>
    ${attachmentRows(mail)}
    ${mail.html === null ? html`<div class="mail-text">${linked(mail.text)}</div>` : htmlParts(mail)}
  </article>`;
}

function attachmentRows(mail: Mail): Markup | null {
  if (mail.attachments.length === 0) return null;
  return html`<ul class="rows" aria-label="Attachments">
    ${mail.attachments.map(
      (attachment, index) =>
        html`<li>
          <span>
            ${attachment.filename ?? 'attachment'}
            <span class="small">${attachment.contentType}, ${sizeText(attachment.size)}</span>
          </span>
          <a class="button" href="${attachmentUrl(mail, index)}" download>
            Download<span class="hidden"> ${attachment.filename ?? 'attachment'}</span>
          </a>
        </li>`,
    )}
  </ul>`;
}

function htmlParts(mail: Mail): Markup {
  return html`
    <div class="mail-part">
      <iframe
        class="mail-html"
        title="The mail as its reader sees it"
        src="/messages/${mail.id}/html"
        sandbox="allow-popups allow-popups-to-escape-sandbox"
      ></iframe>
    </div>
    <details class="mail-part">
      <summary>Plain text</summary>
      <div class="mail-text">${linked(mail.text)}</div>
    </details>
  `;
}

/** The text with its web addresses as links. */
function linked(text: string): Markup {
  const links = linksIn(text);
  let rest = text;
  const parts = links.map((link) => {
    const start = rest.indexOf(link);
    const before = rest.slice(0, start);
    rest = rest.slice(start + link.length);
    const address = escapeHtml(link);
    return `${escapeHtml(before)}<a href="${address}" target="_blank" rel="noopener noreferrer">${address}</a>`;
  });
  return new Markup(parts.join('') + escapeHtml(rest));
}

function sizeText(bytes: number): string {
  if (bytes < 1000) return `${bytes} B`;
  if (bytes < 1_000_000) return `${Math.round(bytes / 1000)} kB`;
  return `${(bytes / 1_000_000).toFixed(1)} MB`;
}
