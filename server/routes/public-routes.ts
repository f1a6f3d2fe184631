import { publicEndpoints } from '../../shared/contracts/public.ts';
import type { Api } from '../http/api.ts';
import { publicPlug } from '../queries/public-plug.ts';

export function publicRoutes(api: Api): void {
  api.read(publicEndpoints.plug, (db, { params }) => publicPlug(db, params.code));
}
