import { batches, colonies, cuts, lines, plugs, racks, systems, tanks } from '../../server/db/schema/index.ts';
import { postMovements, stockAccount } from '../../server/services/stock-ledger.ts';
import { makePlugCode } from '../../shared/domain/plug-code.ts';
import type { TestFarm } from './start-farm.ts';

export interface LabelledBatch {
  batchId: string;
  batchCode: string;
  cutId: string;
  lineCode: string;
  rackCode: string;
  codes: string[];
}

/** A batch of plugs that were cut on the day given and stand on a rack, written through the ledger. */
export function givenLabelledBatch(
  farm: TestFarm,
  { pieces = 5, lineCode = 'WIG', cutOn = '2026-02-26' }: { pieces?: number; lineCode?: string; cutOn?: string } = {},
): LabelledBatch {
  return farm.write((write) => {
    const { tx, newId, now } = write;
    const [systemId, tankId, rackId, lineId] = [newId(), newId(), newId(), newId()];
    const [colonyId, cutId, batchId] = [newId(), newId(), newId()];
    const rackCode = `R-${lineCode}`;
    const batchCode = `${lineCode}-2609-1`;
    const row = { createdAt: now };
    tx.insert(systems)
      .values({ id: systemId, code: `S-${lineCode}`, name: 'Long bench', kind: 'growout', netVolumeL: 900, ...row })
      .run();
    tx.insert(tanks)
      .values({ id: tankId, systemId, code: `T-${lineCode}`, name: 'First tank', ...row })
      .run();
    tx.insert(racks)
      .values({ id: rackId, tankId, code: rackCode, rows: 26, columns: 20, ...row })
      .run();
    tx.insert(lines)
      .values({
        ...{ id: lineId, code: lineCode, tradeName: 'Wicket Green', taxon: 'Acropora sp.', growthForm: 'branching' },
        ...{ publicText: 'Grown here since its first cutting.', careText: 'Strong light, strong flow.', ...row },
      })
      .run();
    tx.insert(colonies)
      .values({
        ...{ id: colonyId, code: `M-${lineCode}`, lineId, rackId, sizeMm: 180, restDays: 42 },
        ...{ acquiredOn: '2024-05-01', ...row },
      })
      .run();
    tx.insert(cuts)
      .values({ id: cutId, colonyId, cutOn, pieces, by: 'Test grower', ...row })
      .run();
    tx.insert(batches)
      .values({ id: batchId, code: batchCode, lineId, cutId, cutOn, pieces, startMm: 18, ...row })
      .run();
    const codes = Array.from({ length: pieces }, () => makePlugCode(write.randomInt));
    codes.forEach((code, index) => {
      tx.insert(plugs)
        .values({ code, batchId, number: index + 1, ...row })
        .run();
    });
    const [from, to] = [stockAccount(write, { kind: 'cut' }), stockAccount(write, { kind: 'rack', rackId })];
    postMovements(
      write,
      codes.map((plugCode) => ({ kind: 'cut' as const, batchId, plugCode, from, to, at: now })),
    );
    return { batchId, batchCode, cutId, lineCode, rackCode, codes };
  });
}
