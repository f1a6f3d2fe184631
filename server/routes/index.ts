import type { Api } from '../http/api.ts';

/** Every resource's routes, in one list. */
export function registerRoutes(_api: Api): void {}
