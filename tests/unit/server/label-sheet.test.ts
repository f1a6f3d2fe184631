import { describe, expect, it } from 'vitest';
import { renderLabelSheet } from '../../../server/services/label-sheet.ts';
import { NO_FIT } from '../../../shared/domain/label-fit.ts';
import { sheetOf } from '../../support/label-sheet.ts';

const label = { qrText: 'HTTPS://FARM.EXAMPLE.COM/P/B00017J', code: 'B00-017J', glyphCode: 'WIG', rows: ['WIG 1'] };

function runOf(labels: number) {
  const run = {
    labels: Array.from({ length: labels }, () => label),
    start: 1,
    fit: NO_FIT,
    edges: false,
    title: 'Run',
  };
  return { sheet: sheetOf('a4-65'), ...run };
}

describe('making the PDF of a long run', () => {
  it('when it is watched, tells ever more labels up to all of them', async () => {
    const told: number[] = [];

    const pdf = await renderLabelSheet(runOf(2000), {
      onDrawn: (labels) => told.push(labels),
      signal: new AbortController().signal,
    });

    expect(told).toEqual([...told].sort((a, b) => a - b));
    expect([told.length > 10, told.at(-1)]).toEqual([true, 2000]);
    // 31 sheets of 65.
    expect(pdf.toString('latin1')).toContain('/Count 31');
  });

  it('when it is stopped, draws no more and gives no file', async () => {
    const stopper = new AbortController();
    const told: number[] = [];
    const onDrawn = (labels: number) => {
      told.push(labels);
      stopper.abort();
    };

    await expect(renderLabelSheet(runOf(2000), { onDrawn, signal: stopper.signal })).rejects.toThrow('stopped');
    expect(told).toHaveLength(1);
  });

  it('when others wait, lets them in between', async () => {
    let turns = 0;
    let isMaking = true;
    const count = () => {
      turns += 1;
      if (isMaking) setImmediate(count);
    };
    setImmediate(count);

    await renderLabelSheet(runOf(200));
    isMaking = false;

    expect(turns).toBeGreaterThan(5);
  });
});
