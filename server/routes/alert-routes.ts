import { alertEndpoints } from '../../shared/contracts/alerts.ts';
import type { Api } from '../http/api.ts';
import { listAlerts, showAlert } from '../queries/alerts.ts';
import { acknowledgeAlert, unacknowledgeAlert } from '../services/alert-service.ts';

export function alertRoutes(api: Api): void {
  const { clock } = api.deps;
  api.read(alertEndpoints.list, (db, { query }) => listAlerts(db, query, clock.now()));
  api.write(alertEndpoints.acknowledge, (write, { params }) => {
    acknowledgeAlert(write, params.id);
    return showAlert(write.tx, params.id, write.now);
  });
  api.write(alertEndpoints.unacknowledge, (write, { params }) => {
    unacknowledgeAlert(write, params.id);
    return showAlert(write.tx, params.id, write.now);
  });
}
