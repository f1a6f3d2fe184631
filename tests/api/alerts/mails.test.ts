import { describe, expect, it } from 'vitest';
import { outboxMails } from '../../../server/db/schema/index.ts';
import { raiseAlerts } from '../../../server/jobs/raise-alerts.ts';
import { sendAlertMails } from '../../../server/jobs/send-alert-mails.ts';
import { sendDigests } from '../../../server/jobs/send-digests.ts';
import { sendDueMails } from '../../../server/jobs/send-due-mails.ts';
import type { EditNotifications } from '../../../shared/contracts/notifications.ts';
import { MEQ_PER_DKH } from '../../../shared/domain/units.ts';
import { givenTask } from '../../support/given-tasks.ts';
import { givenReading, givenSystem } from '../../support/given-water.ts';
import { startFarm, type TestFarm } from '../../support/start-farm.ts';

const MINUTE = 60_000;
const HOUR = 60 * MINUTE;
const DAY = 24 * HOUR;
const BAND = [{ parameter: 'alkalinity' as const, low: 7.5 * MEQ_PER_DKH, high: 9 * MEQ_PER_DKH }];

async function choose(farm: TestFarm, choices: EditNotifications) {
  const grower = await farm.as('grower');
  const { version } = (await grower.get('/api/account/notifications')).body;
  const reply = await grower.patch('/api/account/notifications').set('If-Match', `"${version}"`).send(choices);
  expect(reply.status).toBe(200);
  return reply.body;
}

function givenLow(farm: TestFarm, code: string): string {
  const systemId = givenSystem(farm, { code, name: 'Saltings', bands: BAND });
  givenReading(farm, systemId, 7.1);
  return systemId;
}

/** What the jobs of one minute do. */
async function work(farm: TestFarm) {
  await raiseAlerts(farm.deps);
  sendAlertMails(farm.deps);
  sendDigests(farm.deps);
  await sendDueMails(farm.deps);
}

async function workThrice(farm: TestFarm) {
  await work(farm);
  await work(farm);
  await work(farm);
}

describe('alerts by e-mail', () => {
  it('when ten open within a minute, those who want them at once get one mail', async () => {
    const farm = await startFarm();
    await choose(farm, { alertsAtOnce: true });
    for (let count = 0; count < 10; count += 1) {
      givenLow(farm, `Q${count}`);
      farm.wait(5000);
      await work(farm);
    }
    farm.wait(MINUTE);
    await workThrice(farm);

    expect(farm.mails.map(({ to, subject }) => [to, subject])).toEqual([
      ['grower@example.com', '10 alerts: Q0 Saltings: alkalinity 7.1\u00a0dKH'],
    ]);
    expect(farm.mails[0]?.text).toContain('Below its band, which begins at 7.5\u00a0dKH. Test again, then correct.');
    expect(farm.mails[0]?.text).toContain('Change or end them under your account: http://farm.example.com/account');
  });

  it('when one is acknowledged, closed or muted before its minute is over, no mail is sent', async () => {
    const farm = await startFarm();
    await choose(farm, { alertsAtOnce: true, mutedKinds: ['test_overdue'] });
    const grower = await farm.as('grower');
    givenSystem(farm, { bands: BAND }); // never tested
    givenLow(farm, 'KNOWN');
    const endedId = givenLow(farm, 'ENDED');
    await raiseAlerts(farm.deps);
    const { items } = (await grower.get('/api/alerts')).body;
    const known = items.find((alert: { systemCode: string }) => alert.systemCode === 'KNOWN');
    await grower.post(`/api/alerts/${known.id}/acknowledgement`);
    farm.wait(MINUTE);
    givenReading(farm, endedId, 8.2);

    await work(farm);

    expect(farm.mails).toEqual([]);
  });

  it('when someone asks for them, what was open before is not sent after', async () => {
    const farm = await startFarm();
    givenLow(farm, 'OLD');
    await raiseAlerts(farm.deps);
    await choose(farm, { alertsAtOnce: true });
    farm.wait(2 * MINUTE);

    await work(farm);

    expect(farm.mails).toEqual([]);
  });

  it('when nobody chose anything, nobody hears anything', async () => {
    const farm = await startFarm();
    givenLow(farm, 'D');
    farm.wait(2 * DAY);

    await work(farm);

    expect(farm.mails).toEqual([]);
  });
});

describe('the daily mail', () => {
  it('when its hour comes, it is sent exactly once, with alerts, tasks and how to end it', async () => {
    const farm = await startFarm({ now: '2026-03-02T05:00:00Z' });
    await choose(farm, { digestHour: 6 });
    givenLow(farm, 'D');
    givenTask(farm, { title: 'Rinse the filter socks', startsOn: '2026-02-28' });
    await work(farm);
    const early = farm.mails.length;
    farm.wait(HOUR);
    await workThrice(farm);
    farm.wait(10 * HOUR);
    await work(farm);

    expect(early).toBe(0);
    expect(farm.mails.map(({ to, subject }) => [to, subject])).toEqual([
      ['grower@example.com', 'Today: 1 open alert and 1 task due'],
    ]);
    expect(farm.mails[0]?.text).toContain('D Saltings: alkalinity 7.1\u00a0dKH. Below its band');
    expect(farm.mails[0]?.text).toContain('Rinse the filter socks: for 2 days');
    expect(farm.mails[0]?.html).toContain('Today at Test Farm');
  });

  it('when somebody knows of an alert, it is counted and not told again', async () => {
    const farm = await startFarm({ now: '2026-03-02T05:00:00Z' });
    await choose(farm, { digestHour: 6 });
    givenLow(farm, 'KNOWN');
    await raiseAlerts(farm.deps);
    const grower = await farm.as('grower');
    const { items } = (await grower.get('/api/alerts')).body;
    await grower.post(`/api/alerts/${items[0].id}/acknowledgement`);
    givenTask(farm, { startsOn: '2026-03-02' });
    farm.wait(HOUR);

    await work(farm);

    expect(farm.mails[0]?.subject).toBe('Today: 1 task due');
    expect(farm.mails[0]?.text).toContain('1 more alert is known, and quiet until worse.');
    expect(farm.mails[0]?.text).not.toContain('KNOWN Saltings');
  });

  it('when nothing is open, the day passes without one', async () => {
    const farm = await startFarm({ now: '2026-03-02T05:00:00Z' });
    await choose(farm, { digestHour: 6 });
    farm.wait(HOUR);
    await work(farm);
    givenLow(farm, 'D');
    farm.wait(HOUR);
    await work(farm);

    expect(farm.mails).toEqual([]);
  });

  it('when its hour has passed as it is chosen, it begins tomorrow, by the farm’s clock', async () => {
    const farm = await startFarm({ now: '2026-03-28T09:00:00Z' });
    await choose(farm, { digestHour: 7 });
    givenLow(farm, 'D');
    await work(farm);
    // The clocks go forward in the night: seven o'clock is six in UTC.
    farm.wait(20 * HOUR + 59 * MINUTE);
    await work(farm);
    const before = farm.mails.length;
    farm.wait(MINUTE);
    await work(farm);

    expect(before).toBe(0);
    expect(farm.mails).toHaveLength(1);
  });

  it('when the mail server is away, it is queued once all the same', async () => {
    const farm = await startFarm({ now: '2026-03-02T05:00:00Z' });
    await choose(farm, { digestHour: 6 });
    givenLow(farm, 'D');
    farm.deps.mail.send = () => Promise.reject(new Error('The mail server is away.'));
    farm.wait(HOUR);
    await workThrice(farm);

    expect(farm.db.select().from(outboxMails).all()).toHaveLength(1);
  });
});

describe('choices of notifications', () => {
  it('when two devices change them, the second is told', async () => {
    const farm = await startFarm();
    const grower = await farm.as('grower');
    const change = () =>
      grower
        .patch('/api/account/notifications')
        .set('If-Match', '"1"')
        .send({ digestHour: 7, mutedKinds: ['drifting'] });

    const first = await change();
    const second = await change();

    expect(first.body).toMatchObject({ digestHour: 7, mutedKinds: ['drifting'], alertsAtOnce: false, version: 2 });
    expect(second.status).toBe(412);
    expect((await (await farm.as('buyer')).get('/api/account/notifications')).status).toBe(403);
  });
});
