import { systemEndpoints } from '../../shared/contracts/systems.ts';
import type { Api } from '../http/api.ts';
import { listSystems, showSystem } from '../queries/systems.ts';
import { withAlerts } from '../services/alert-service.ts';
import { createSystem, createTank, editSystem } from '../services/system-service.ts';

export function systemRoutes(api: Api): void {
  api.read(systemEndpoints.list, (db) => ({ items: listSystems(db) }));
  api.read(systemEndpoints.show, (db, { params }) => showSystem(db, params.id));
  api.write(systemEndpoints.create, (write, { body }) => {
    const made = createSystem(write, body);
    return withAlerts(write, made.id, made);
  });
  api.write(systemEndpoints.edit, (write, { params, body, ifMatch }) =>
    withAlerts(write, params.id, editSystem(write, params.id, ifMatch, body)),
  );
  api.write(systemEndpoints.createTank, (write, { body }) => createTank(write, body));
}
