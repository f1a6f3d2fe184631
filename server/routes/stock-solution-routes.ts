import { DONE } from '../../shared/contracts/common.ts';
import { stockSolutionEndpoints } from '../../shared/contracts/stock-solutions.ts';
import type { Api } from '../http/api.ts';
import { listStockSolutions } from '../queries/stock-solutions.ts';
import { createStockSolution, makeSolution, undoSolutionBatch } from '../services/stock-solution-service.ts';

export function stockSolutionRoutes(api: Api): void {
  api.read(stockSolutionEndpoints.list, (db) => ({ items: listStockSolutions(db) }));
  api.write(stockSolutionEndpoints.create, (write, { body }) => createStockSolution(write, body));
  api.write(stockSolutionEndpoints.make, (write, { params, body }) => makeSolution(write, params.id, body));
  api.write(stockSolutionEndpoints.undoBatch, (write, { params }) => {
    undoSolutionBatch(write, params.id);
    return DONE;
  });
}
