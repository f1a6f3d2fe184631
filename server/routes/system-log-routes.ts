import { systemLogEndpoints } from '../../shared/contracts/system-log.ts';
import type { Api } from '../http/api.ts';
import { systemLog } from '../queries/system-log.ts';

export function systemLogRoutes(api: Api): void {
  api.read(systemLogEndpoints.list, (db, { params, query }) => systemLog(db, params.id, query));
}
