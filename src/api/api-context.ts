interface ApiContext {
  csrfToken: () => string;
  /** The session ended on the server: forget it and go to sign-in. */
  onSessionLost: () => void;
  /** Fetches a fresh token after the server refused the old one. */
  renewSession: () => Promise<void>;
}

let context: ApiContext = {
  csrfToken: () => '',
  onSessionLost: () => undefined,
  renewSession: () => Promise.resolve(),
};

/** Wired once at start, so that the API layer knows neither stores nor router. */
export function connectApi(connected: ApiContext): void {
  context = connected;
}

export function apiContext(): ApiContext {
  return context;
}
