import type { BrowserContext, ConsoleMessage, Page, Request } from 'playwright-core';

/** What goes wrong in a browser without anyone noticing: kept until a test asks. */
export class Faults {
  private readonly seen: string[] = [];
  private readonly allowed: RegExp[] = [];

  /** Says that a test brings this about on purpose. */
  allow(...patterns: RegExp[]): void {
    this.allowed.push(...patterns);
  }

  /** What was seen since the last time, but for what was allowed. */
  take(): string[] {
    const faults = this.seen.filter((fault) => !this.allowed.some((pattern) => pattern.test(fault)));
    this.seen.length = 0;
    this.allowed.length = 0;
    return faults;
  }

  watch(context: BrowserContext): void {
    context.on('page', (page) => {
      this.watchPage(page);
    });
  }

  private watchPage(page: Page): void {
    page.on('console', (message) => {
      if (['error', 'warning'].includes(message.type())) this.seen.push(consoleText(message));
    });
    page.on('pageerror', (error) => this.seen.push(`page error: ${error.stack ?? error.message}`));
    page.on('request', (request) => {
      if (isElsewhere(request.url())) this.seen.push(`request to elsewhere: ${request.url()}`);
    });
    page.on('requestfailed', (request) => {
      const reason = request.failure()?.errorText ?? '';
      if (!isDropped(request, reason)) this.seen.push(`request failed: ${request.url()} ${reason}`);
    });
  }
}

function consoleText(message: ConsoleMessage): string {
  return `console ${message.type()}: ${message.text()} (${message.location().url})`;
}

function isElsewhere(url: string): boolean {
  const { protocol, hostname } = new URL(url);
  return /^(https?|wss?):$/.test(protocol) && !['127.0.0.1', 'localhost'].includes(hostname);
}

/** Leaving a page drops what it had asked for, and a download takes over from the page that asked. */
function isDropped(_request: Request, reason: string): boolean {
  return reason === 'net::ERR_ABORTED';
}
