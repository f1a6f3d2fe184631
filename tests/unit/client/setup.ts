import { beforeEach } from 'vitest';

// jsdom has neither: both report what the tests set.
let isDesk = true;

class IdleObserver {
  observe(): void {
    /* jsdom lays nothing out, so sizes never change. */
  }
  unobserve(): void {
    this.observe();
  }
  disconnect(): void {
    this.observe();
  }
}
globalThis.ResizeObserver = IdleObserver;
window.matchMedia = (query: string): MediaQueryList =>
  Object.assign(new EventTarget(), {
    media: query,
    matches: query.includes('min-width') && isDesk,
    onchange: null,
    addListener: () => undefined,
    removeListener: () => undefined,
  });

export function setDesk(desk: boolean): void {
  isDesk = desk;
}

beforeEach(() => {
  setDesk(true);
  localStorage.clear();
});
