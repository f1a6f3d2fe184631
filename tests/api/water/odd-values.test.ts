import { expect, it } from 'vitest';
import { readingPhotos, readings } from '../../../server/db/schema/index.ts';
import { forgetLoosePhotos } from '../../../server/services/reading-photos.ts';
import { givenReading, givenSystem } from '../../support/given-water.ts';
import { startFarm } from '../../support/start-farm.ts';

const NOON = Date.parse('2026-03-01T12:00:00Z');
const DAY = 86_400_000;
const PNG = Buffer.from('89504e470d0a1a0a0000000d49484452', 'hex');

async function oddFarm() {
  const farm = await startFarm();
  const systemId = givenSystem(farm, { code: 'B' });
  givenReading(farm, systemId, 8.2, { takenAt: NOON - DAY });
  return { farm, systemId, grower: await farm.as('grower') };
}

it('when a point went astray, the value is refused with what was meant, even when it is confirmed', async () => {
  const { farm, systemId, grower } = await oddFarm();

  for (const confirmed of [false, true]) {
    const values = [{ parameter: 'alkalinity', value: 83, unit: 'dKH', confirmed }];
    const { status, body } = await grower.post('/api/readings').send({ systemId, takenAt: NOON, values });

    expect(status).toBe(400);
    expect(body.fields).toEqual([{ path: 'values.0.value', message: expect.stringMatching(/mean 8\.3 dKH\?/) }]);
    expect(body.details.questions[0]).toMatchObject({
      kind: 'impossible',
      suggestions: [{ parameter: 'alkalinity', value: 8.3, unit: 'dKH' }],
    });
  }
  expect(farm.db.select().from(readings).all()).toHaveLength(1);
});

it('when a value is far from the last, it is asked about, and stored once it is confirmed', async () => {
  const { systemId, grower } = await oddFarm();
  const send = (value: object) =>
    grower.post('/api/readings').send({
      ...{ systemId, takenAt: NOON },
      values: [{ parameter: 'alkalinity', value: 11.5, unit: 'dKH', ...value }],
    });

  const asked = await send({});
  const kept = await send({ confirmed: true });

  expect(asked.status).toBe(400);
  expect(asked.body.fields[0].message).toMatch(/far from the last, 8\.2 dKH.*Confirm it to keep it/);
  expect(kept.status).toBe(201);
});

it('when one of several tests is odd, its own field says so', async () => {
  const { systemId, grower } = await oddFarm();
  const values = [{ parameter: 'alkalinity', value: 8.2, repeats: [8.3, 82], unit: 'dKH' }];

  const { body } = await grower.post('/api/readings').send({ systemId, takenAt: NOON, values });

  expect(body.fields.map(({ path }: { path: string }) => path)).toEqual(['values.0.repeats.1']);
});

it('when a reading is corrected to an odd value, it is asked about too; other corrections keep its tests', async () => {
  const { systemId, grower } = await oddFarm();
  const values = [{ parameter: 'calcium', value: 430, repeats: [440], unit: 'mg/L' }];
  const logged = await grower.post('/api/readings').send({ systemId, takenAt: NOON, values });
  const [{ id }] = logged.body.items;
  const change = (version: number, body: object) =>
    grower.patch(`/api/readings/${id}`).set('If-Match', `"${version}"`).send(body);

  const noted = await change(1, { note: 'cloudy' });
  const odd = await change(2, { value: 4300 });
  const fresh = await change(2, { value: 433 });

  expect(noted.body).toMatchObject({ value: 435, repeats: [430, 440], note: 'cloudy' });
  expect(odd.body.fields[0]).toMatchObject({ path: 'value', message: expect.stringMatching(/mean 430 mg\/L\?/) });
  expect(fresh.body).toMatchObject({ value: 433, repeats: [] });
});

it('when another person tested, the reading has their name and the audit log the one who logged', async () => {
  const { farm, systemId, grower } = await oddFarm();
  const { body: sheet } = await grower.get(`/api/systems/${systemId}/log-sheet`);
  const owner = sheet.testers.find(({ name }: { name: string }) => name === 'Test owner');
  const values = [{ parameter: 'ph', value: 8.1, unit: 'pH' }];

  const { body } = await grower.post('/api/readings').send({ systemId, takenAt: NOON, values, testerId: owner.id });
  const buyer = await grower.post('/api/readings').send({ systemId, values, testerId: farm.storeIds[0] });

  expect(body.items[0].by).toBe('Test owner');
  expect((await grower.get('/api/readings?by=Test%20owner')).body.total).toBe(1);
  expect((await grower.get('/api/readings/people')).body.items).toContain('Test owner');
  expect(buyer.body.fields[0].path).toBe('testerId');
});

it('when a person has tested before, the sheet remembers their unit, method and kit lot', async () => {
  const { farm, systemId, grower } = await oddFarm();
  const { body: methods } = await grower.post('/api/test-methods/usual').send({});
  const titration = methods.items.find(
    ({ parameter, name }: { parameter: string; name: string }) => parameter === 'alkalinity' && name === 'Titration',
  );
  const { body: lot } = await grower.post(`/api/test-methods/${titration.id}/kit-lots`).send({ code: 'L-1' });
  const kit = { methodId: titration.id, kitLotId: lot.id };
  const values = [{ parameter: 'alkalinity', value: 2.95, unit: 'meq/L', ...kit }];
  await grower.post('/api/readings').send({ systemId, takenAt: NOON, values });
  const rowOf = async (role: 'grower' | 'owner') => {
    const { body } = await (await farm.as(role)).get(`/api/systems/${givenSystem(farm)}/log-sheet`);
    return body.parameters.find(({ parameter }: { parameter: string }) => parameter === 'alkalinity');
  };

  expect(await rowOf('grower')).toMatchObject({ unit: 'meq/L', ...kit, last: null });
  expect(await rowOf('owner')).toMatchObject({ unit: '', methodId: null });
});

it('when days are asked for, they are days of the farm', async () => {
  const { farm, systemId, grower } = await oddFarm();
  // Half past midnight in Lisbon's summer is still the day before in UTC.
  givenReading(farm, systemId, 8.4, { takenAt: Date.parse('2025-07-01T23:30:00Z') });

  expect((await grower.get('/api/readings?from=2025-07-02&to=2025-07-02')).body.total).toBe(1);
  expect((await grower.get('/api/readings?from=2025-07-01&to=2025-07-01')).body.total).toBe(0);
  expect((await grower.get('/api/readings?from=yesterday')).status).toBe(400);
});

it('when a slip is photographed, it is shown with its readings; what is no picture is refused', async () => {
  const { farm, systemId, grower } = await oddFarm();
  const send = (content: Buffer, contentType: string) =>
    grower.post('/api/reading-photos').attach('photo', content, { filename: 'slip.png', contentType });
  const values = [{ parameter: 'ph', value: 8.1, unit: 'pH' }];

  const { body: photo } = await send(PNG, 'image/png');
  const logged = await grower.post('/api/readings').send({ systemId, takenAt: NOON, values, photoId: photo.id });
  const shown = await grower.get(`/api/reading-photos/${photo.id}`);
  const page = await send(Buffer.from('<html>'), 'image/png');
  const text = await send(PNG, 'text/plain');
  const stranger = await (
    await farm.as('owner')
  )
    .post('/api/readings')
    .send({ systemId, takenAt: NOON + 1, values, photoId: photo.id });

  expect(logged.body.items[0].photoId).toBe(photo.id);
  expect(shown.headers['content-type']).toBe('image/png');
  expect(shown.headers['content-disposition']).toContain('inline');
  expect(Buffer.compare(shown.body as Buffer, PNG)).toBe(0);
  expect([page.status, text.status]).toEqual([415, 415]);
  expect(stranger.body.fields[0].path).toBe('photoId');
});

it('when a photo is named by no reading for a day, it is forgotten; one that is named stays', async () => {
  const { farm, systemId, grower } = await oddFarm();
  const add = async () => {
    const { body } = await grower
      .post('/api/reading-photos')
      .attach('photo', PNG, { filename: 'a.png', contentType: 'image/png' });
    return String(body.id);
  };
  const [named] = [await add(), await add()];
  const values = [{ parameter: 'ph', value: 8.1, unit: 'pH' }];
  await grower.post('/api/readings').send({ systemId, takenAt: NOON, values, photoId: named });

  forgetLoosePhotos(farm.deps);
  expect(farm.db.select().from(readingPhotos).all()).toHaveLength(2);
  farm.wait(2 * DAY);
  forgetLoosePhotos(farm.deps);

  expect(
    farm.db
      .select()
      .from(readingPhotos)
      .all()
      .map(({ id }) => id),
  ).toEqual([named]);
});
