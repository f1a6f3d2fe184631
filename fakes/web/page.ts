import type { Response } from 'express';
import { html, type Markup } from './html.ts';

export interface Page {
  title: string;
  /** Name of the stand-in, shown in the bar on top. */
  place: string;
  /** One short note beside the name, so that nobody takes a stand-in for the real service. */
  note: string;
  body: Markup;
  /** Width of the content: a form is narrow, lists are wide. */
  width?: 'narrow' | 'wide';
}

/** Sends a whole page. No page of the stand-ins runs a script, so the policy forbids them. */
export function sendPage(res: Response, page: Page, status = 200): void {
  res
    .status(status)
    .set({
      'Content-Security-Policy':
        "default-src 'none'; style-src 'self'; font-src 'self'; img-src 'self' data:; frame-src 'self'; base-uri 'none'; frame-ancestors 'none'",
      'Cache-Control': 'no-store',
      'Referrer-Policy': 'no-referrer',
      'X-Content-Type-Options': 'nosniff',
    })
    .type('html')
    .send(layout(page).toString());
}

function layout({ title, place, note, body, width = 'wide' }: Page): Markup {
  return html`<!doctype html>
    <html lang="en">
      <head>
        <meta charset="utf-8" />
        <meta name="viewport" content="width=device-width, initial-scale=1" />
        <meta name="color-scheme" content="light dark" />
        <title>${title}</title>
        <link rel="icon" href="/_assets/mark.svg" type="image/svg+xml" />
        <link rel="stylesheet" href="/_assets/base.css" />
        <link rel="stylesheet" href="/_assets/parts.css" />
        <link rel="stylesheet" href="/_assets/places.css" />
      </head>
      <body>
        <a class="skip" href="#main">Skip to content</a>
        <header class="bar">
          <div class="bar-inside ${width}">
            <img src="/_assets/mark.svg" alt="" width="26" height="26" />
            <span class="place">${place}</span>
            <span class="note">${note}</span>
          </div>
        </header>
        <main id="main" class="${width}">${body}</main>
      </body>
    </html>`;
}

/** An instant as people read it; always UTC, so that it compares with logs. */
export function instantText(epochMs: number): string {
  return `${new Date(epochMs).toISOString().slice(0, 19).replace('T', ' ')} UTC`;
}
