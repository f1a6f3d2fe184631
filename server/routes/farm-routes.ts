import { farmEndpoints } from '../../shared/contracts/farm.ts';
import type { Api } from '../http/api.ts';
import { farmSettings } from '../queries/farm-settings.ts';
import { changeFarm } from '../services/farm-service.ts';

export function farmRoutes(api: Api): void {
  api.read(farmEndpoints.show, (db) => farmSettings(db));
  api.write(farmEndpoints.change, (write, { body, ifMatch }) => changeFarm(write, body, ifMatch));
}
