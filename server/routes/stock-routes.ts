import { DONE } from '../../shared/contracts/common.ts';
import { stockEndpoints } from '../../shared/contracts/stock.ts';
import type { Api } from '../http/api.ts';
import { batchPage } from '../queries/batch-page.ts';
import { listBatches, listBatchPlugs } from '../queries/batches.ts';
import { cuttingChoices, listColonies, showColony } from '../queries/colonies.ts';
import { listCuts } from '../queries/cuts.ts';
import { listLines, showLine, stockSummary } from '../queries/lines.ts';
import { lossPatterns } from '../queries/loss-patterns.ts';
import { plugPage } from '../queries/plug-page.ts';
import { listRacks, listTanks, rackPage } from '../queries/racks.ts';
import { survivalGroups } from '../queries/survival-groups.ts';
import { listWithholds } from '../queries/withholds.ts';
import { createColony, editColony } from '../services/colony-service.ts';
import { createLine, editLine } from '../services/line-service.ts';
import { logCut } from '../services/log-cut.ts';
import { measureStock, undoMeasurement } from '../services/measure-stock.ts';
import { placePlugs } from '../services/place-plugs.ts';
import { createRack, editRack, moveRack } from '../services/rack-service.ts';
import { cullPlugs, givePlugs, recordLoss } from '../services/remove-plugs.ts';
import { undoAct, undoCut } from '../services/undo-stock.ts';
import { releaseStock, withholdStock } from '../services/withhold-stock.ts';

export function stockRoutes(api: Api): void {
  recordRoutes(api);
  batchRoutes(api);
  actRoutes(api);
}

function recordRoutes(api: Api): void {
  const now = () => api.deps.clock.now();
  api.read(stockEndpoints.listLines, (db, { query }) => listLines(db, query, now()));
  api.write(stockEndpoints.createLine, (write, { body }) => createLine(write, body));
  api.read(stockEndpoints.showLine, (db, { params }) => showLine(db, params.id, now()));
  api.write(stockEndpoints.editLine, (write, { params, body, ifMatch }) => editLine(write, params.id, ifMatch, body));
  api.read(stockEndpoints.summary, (db) => stockSummary(db, now()));

  api.read(stockEndpoints.survival, (db, { query }) => survivalGroups(db, query.by, now()));
  api.read(stockEndpoints.lossPatterns, (db) => lossPatterns(db, now()));

  api.read(stockEndpoints.listColonies, (db, { query }) => listColonies(db, query, now()));
  api.write(stockEndpoints.createColony, (write, { body }) => createColony(write, body));
  api.read(stockEndpoints.showColony, (db, { params }) => showColony(db, params.id, now()));
  api.write(stockEndpoints.editColony, (write, { params, body, ifMatch }) =>
    editColony(write, params.id, ifMatch, body),
  );
  api.read(stockEndpoints.cuttingChoices, (db) => ({ items: cuttingChoices(db, now()) }));

  api.read(stockEndpoints.listRacks, (db, { query }) => ({ items: listRacks(db, query) }));
  api.write(stockEndpoints.createRack, (write, { body }) => createRack(write, body));
  api.read(stockEndpoints.showRack, (db, { params }) => rackPage(db, params.id, now()));
  api.write(stockEndpoints.editRack, (write, { params, body, ifMatch }) => editRack(write, params.id, ifMatch, body));
  api.write(stockEndpoints.moveRack, (write, { params, body }) => moveRack(write, params.id, body));
  api.read(stockEndpoints.listTanks, (db) => ({ items: listTanks(db) }));
}

function batchRoutes(api: Api): void {
  const now = () => api.deps.clock.now();
  api.write(stockEndpoints.logCut, (write, { body }) => logCut(write, body));
  api.read(stockEndpoints.listCuts, (db, { query }) => listCuts(db, query, now()));
  api.write(stockEndpoints.undoCut, (write, { params, body }) => undoCut(write, params.id, body.note));
  api.read(stockEndpoints.listBatches, (db, { query }) => listBatches(db, query, now()));
  api.read(stockEndpoints.showBatch, (db, { params, caller }) =>
    batchPage(db, params.id, { now: now(), role: caller.role }),
  );
  api.read(stockEndpoints.listBatchPlugs, (db, { params }) => ({ items: listBatchPlugs(db, params.id) }));
  api.read(stockEndpoints.showPlug, (db, { params, caller }) =>
    plugPage(db, params.code, { now: now(), role: caller.role }),
  );
}

function actRoutes(api: Api): void {
  api.write(stockEndpoints.placePlugs, (write, { body }) => placePlugs(write, body));
  api.write(stockEndpoints.recordLoss, (write, { body }) => recordLoss(write, body));
  api.write(stockEndpoints.cullPlugs, (write, { body }) => cullPlugs(write, body));
  api.write(stockEndpoints.givePlugs, (write, { body }) => givePlugs(write, body));
  api.write(stockEndpoints.undoAct, (write, { params, body }) => undoAct(write, params.groupId, body.note));
  api.write(stockEndpoints.measure, (write, { body }) => measureStock(write, body));
  api.write(stockEndpoints.undoMeasurement, (write, { params }) => {
    undoMeasurement(write, params.id);
    return DONE;
  });
  api.write(stockEndpoints.withhold, (write, { body }) => withholdStock(write, body));
  api.write(stockEndpoints.release, (write, { params }) => releaseStock(write, params.id));
  api.read(stockEndpoints.listWithholds, (db) => ({ items: listWithholds(db) }));
}
