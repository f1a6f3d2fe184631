import { describe, expect, it } from 'vitest';
import { calibrationRules } from '../../../shared/domain/label-fit.ts';
import { LABEL_SHEETS } from '../../../shared/domain/label-sheets.ts';
import { givenLabelledBatch } from '../../support/given-labels.ts';
import { sheetOf } from '../../support/label-sheet.ts';
import { startFarm } from '../../support/start-farm.ts';

/** A grid of an own make: 3 by 4 on A4. */
const grid = {
  ...{ name: 'Freezer film', paper: 'A4', shape: 'rectangle', width: 50, height: 30, columns: 3, rows: 4 },
  ...{ left: 20, top: 20, pitchX: 55, pitchY: 35, cutLines: true },
};

describe('own label stocks', () => {
  it('when one is added, it stands before those of the product and can be printed on', async () => {
    const farm = await startFarm();
    const { batchId } = givenLabelledBatch(farm, { pieces: 2 });
    const grower = await farm.as('grower');

    const added = await grower.post('/api/label-stocks').send(grid);
    const list = await grower.get('/api/label-stocks');
    const printed = await grower
      .post('/api/labels/prints')
      .send({ subject: { batchId }, stockId: added.body.id, start: 12 });

    expect([added.status, printed.status]).toEqual([201, 201]);
    expect(added.body).toMatchObject({ ...grid, shipped: false, retired: false, version: 1 });
    expect(list.body.items.map(({ id }: { id: string }) => id)).toEqual([
      added.body.id,
      ...LABEL_SHEETS.map(({ id }) => id),
    ]);
  });

  it('when its labels leave the paper, is refused at the field', async () => {
    const farm = await startFarm();
    const grower = await farm.as('grower');

    const reply = await grower.post('/api/label-stocks').send({ ...grid, columns: 4 });

    expect([reply.status, reply.body.fields[0].path]).toEqual([400, 'pitchX']);
  });

  it('when the name is taken, is refused; once that one is retired, the name is free', async () => {
    const farm = await startFarm();
    const grower = await farm.as('grower');
    const { body } = await grower.post('/api/label-stocks').send(grid);

    const twice = await grower.post('/api/label-stocks').send(grid);
    await grower.patch(`/api/label-stocks/${body.id}`).set('If-Match', '"1"').send({ retired: true });
    const later = await grower.post('/api/label-stocks').send(grid);

    expect([twice.status, twice.body.fields[0].path, later.status]).toEqual([409, 'name', 201]);
  });

  it('when changed, only by who saw the latest, and only within the paper', async () => {
    const farm = await startFarm();
    const grower = await farm.as('grower');
    const { body } = await grower.post('/api/label-stocks').send(grid);
    const change = (ifMatch: number, fields: object) =>
      grower.patch(`/api/label-stocks/${body.id}`).set('If-Match', `"${ifMatch}"`).send(fields);

    const changed = await change(1, { rows: 7 });
    const stale = await change(1, { rows: 6 });
    const outside = await change(2, { rows: 9 });

    expect([changed.status, changed.body.rows, changed.body.version]).toEqual([200, 7, 2]);
    expect([stale.status, outside.status]).toEqual([412, 400]);
  });
});

describe('what a printer needs', () => {
  const rules = calibrationRules(sheetOf('a4-65'));

  it('when measured twice, the later is kept; once forgotten, none', async () => {
    const farm = await startFarm();
    const grower = await farm.as('grower');
    const measure = (left: number) =>
      grower.put('/api/label-fits').send({ stockId: 'a4-65', printer: 'Wet room', ...rules, left });

    await measure(22);
    const later = await measure(21);
    const kept = await grower.get('/api/label-stocks');
    const forget = () => grower.delete('/api/label-fits?stockId=a4-65&printer=Wet%20room');
    const [gone, again] = [await forget(), await forget()];

    expect(later.body).toMatchObject({ shiftX: -1, shiftY: 0, scaleX: 1, by: 'Test grower' });
    expect(kept.body.fits).toEqual([later.body]);
    expect([gone.status, again.status]).toEqual([200, 404]);
  });

  it('when the page was shrunk to fit, is refused with what to do', async () => {
    const farm = await startFarm();
    const grower = await farm.as('grower');

    const fit = { stockId: 'a4-65', printer: 'Wet room', ...rules, across: 140, down: 140 };
    const reply = await grower.put('/api/label-fits').send(fit);

    expect([reply.status, reply.body.fields[0].path]).toEqual([400, 'across']);
    expect(reply.body.fields[0].message).toContain('without fitting to the page');
  });

  it('when the stock is unknown, there is no calibration page', async () => {
    const farm = await startFarm();
    const grower = await farm.as('grower');

    expect((await grower.get('/api/label-stocks/napkin/calibration')).status).toBe(404);
  });
});
