import type { Api } from '../http/api.ts';
import { sessionRoutes } from './session-routes.ts';

/** Every resource's routes, in one list. */
export function registerRoutes(api: Api): void {
  sessionRoutes(api);
}
