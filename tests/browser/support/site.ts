import { randomUUID } from 'node:crypto';
import { chromium, type Browser, type BrowserContext, type Page } from 'playwright-core';
import type { Session } from '../../../shared/contracts/session.ts';
import type { Role } from '../../../shared/permissions.ts';
import { Faults } from './faults.ts';
import { startServer, type RunningServer } from './server.ts';

export const DEVICES = {
  phone: { viewport: { width: 390, height: 844 }, hasTouch: true, isMobile: true },
  desktop: { viewport: { width: 1300, height: 900 } },
} as const;
export type Device = keyof typeof DEVICES;
export type Theme = 'light' | 'dark';

const FLAGS = [
  ...['--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run', '--disable-background-networking'],
  ...['--disable-component-update', '--disable-sync', '--lang=en-GB'],
];

export interface Visit {
  /** A demo person of this role signs in first; without it nobody is signed in. */
  as?: Role;
  device?: Device;
  theme?: Theme;
  /** Another browser than the site's own, like one with a camera. */
  browser?: Browser;
}
export interface Mail {
  id: string;
  to: string;
  subject: string;
  text: string;
  links: string[];
}

/** The product running for real, and a browser to use it with. */
export class Site {
  readonly faults = new Faults();
  private readonly server: RunningServer;
  private readonly browsers: Browser[] = [];

  private constructor(server: RunningServer) {
    this.server = server;
  }

  /** @param template folder with the database to copy; null starts an empty farm */
  static async start(template: string | null): Promise<Site> {
    const site = new Site(await startServer(template));
    await site.openBrowser();
    return site;
  }

  get url(): string {
    return this.server.url;
  }

  get mailUrl(): string {
    return this.server.mailUrl;
  }

  async openBrowser(flags: readonly string[] = []): Promise<Browser> {
    const browser = await chromium.launch({ executablePath: '/usr/bin/chromium', args: [...FLAGS, ...flags] });
    this.browsers.push(browser);
    return browser;
  }

  async newPage({ as, device = 'desktop', theme = 'light', browser }: Visit = {}): Promise<Page> {
    const context = await this.newContext(browser ?? this.browsers[0], device, theme);
    if (as) await this.signIn(context, as);
    const page = await context.newPage();
    page.setDefaultTimeout(45_000);
    return page;
  }

  /** Asks the server as whoever is signed in on the page. */
  async get<T>(page: Page, path: string): Promise<T> {
    const reply = await page.request.get(this.url + path);
    if (!reply.ok()) throw new Error(`GET ${path} answered ${reply.status()}: ${await reply.text()}`);
    return (await reply.json()) as T;
  }

  /** Does something through the API as whoever is signed in on the page: for what happened before a test begins. */
  async post<T>(page: Page, path: string, data: unknown): Promise<T> {
    const { csrfToken } = await this.get<{ csrfToken: string }>(page, '/api/session');
    const headers = { 'X-CSRF-Token': csrfToken, 'Idempotency-Key': randomUUID() };
    const reply = await page.request.post(this.url + path, { data, headers });
    if (!reply.ok()) throw new Error(`POST ${path} answered ${reply.status()}: ${await reply.text()}`);
    return (await reply.json()) as T;
  }

  /** Waits until a mail to this address has arrived, and gives the newest. */
  async mailTo(address: string, subject: RegExp): Promise<Mail> {
    const limit = Date.now() + 30_000;
    while (Date.now() < limit) {
      const { messages } = (await (await fetch(`${this.mailUrl}/api/messages`)).json()) as { messages: Mail[] };
      const mail = messages.find(({ to, subject: text }) => to.includes(address) && subject.test(text));
      if (mail) return mail;
      await new Promise((resolve) => setTimeout(resolve, 100));
    }
    throw new Error(`No mail about ${subject} came to ${address}.`);
  }

  async close(): Promise<void> {
    await Promise.all(this.browsers.map((browser) => browser.close()));
    await this.server.close();
  }

  private async newContext(browser: Browser | undefined, device: Device, theme: Theme): Promise<BrowserContext> {
    if (!browser) throw new Error('The site is closed.');
    const context = await browser.newContext({
      ...DEVICES[device],
      ...{ baseURL: this.url, colorScheme: theme, locale: 'en-GB', timezoneId: 'Europe/Lisbon' },
      reducedMotion: 'reduce',
    });
    this.faults.watch(context);
    return context;
  }

  private async signIn(context: BrowserContext, role: Role): Promise<void> {
    const { demoSignIns } = (await (await context.request.get('/api/session')).json()) as Session;
    const person = demoSignIns.find((each) => each.role === role);
    if (!person) throw new Error(`The demo has no ${role}.`);
    const reply = await context.request.post('/api/session/demo', { data: { email: person.email } });
    if (!reply.ok()) throw new Error(`Signing in as ${role} answered ${reply.status()}.`);
  }
}
