import { describe, expect, it } from 'vitest';
import { outboxMails } from '../../../server/db/schema/index.ts';
import { sendDueMails } from '../../../server/jobs/send-due-mails.ts';
import { startFarm, type TestFarm } from '../../support/start-farm.ts';

const HOUR = 3_600_000;

async function queued() {
  const farm = await startFarm();
  await farm.anyone().post('/api/password-resets').send({ email: 'grower@example.com' });
  const away = () => Promise.reject(new Error('connect ECONNREFUSED'));
  const works = farm.deps.mail.send;
  return {
    farm,
    serverIs: (state: 'away' | 'back') => {
      farm.deps.mail.send = state === 'away' ? away : works;
    },
  };
}

const rowOf = (farm: TestFarm) => farm.db.select().from(outboxMails).get();

/** Runs the job as often as it would over a time, hour by hour. */
async function hoursPass(farm: TestFarm, hours: number): Promise<void> {
  for (let hour = 0; hour < hours; hour += 1) {
    farm.wait(HOUR);
    await sendDueMails(farm.deps);
  }
}

describe('the outbox', () => {
  it('when the mail server is away for two days, the mail goes out once it is back, and once only', async () => {
    const { farm, serverIs } = await queued();
    serverIs('away');
    await sendDueMails(farm.deps);
    expect(rowOf(farm)).toMatchObject({ attempts: 1, sentAt: null, lastError: 'connect ECONNREFUSED' });
    await hoursPass(farm, 48);

    serverIs('back');
    await hoursPass(farm, 3);

    expect(farm.mails).toHaveLength(1);
    expect(rowOf(farm)?.sentAt).not.toBeNull();
  });

  it('when a mail fails, waits twice as long after each try, an hour at most', async () => {
    const { farm, serverIs } = await queued();
    serverIs('away');
    const waits: number[] = [];
    for (let tries = 0; tries < 12; tries += 1) {
      await sendDueMails(farm.deps);
      const wait = (rowOf(farm)?.nextAttemptAt ?? 0) - farm.deps.clock.now();
      waits.push(wait / 1000);
      farm.wait(wait);
    }

    expect(waits).toEqual([5, 10, 20, 40, 80, 160, 320, 640, 1280, 2560, 3600, 3600]);
  });

  it('when it could not be sent for three days, it is not tried any more', async () => {
    const { farm, serverIs } = await queued();
    serverIs('away');
    await hoursPass(farm, 73);

    serverIs('back');
    await hoursPass(farm, 5);

    expect(farm.mails).toEqual([]);
  });

  it('when the process ends between sending and noting it, the second mail bears the same id as the first', async () => {
    const { farm } = await queued();
    const before = rowOf(farm);
    await sendDueMails(farm.deps);
    farm.db
      .update(outboxMails)
      .set({ ...before })
      .run();

    await sendDueMails(farm.deps);

    const ids = farm.mails.map(({ id }) => id);
    expect(ids).toEqual([before?.id, before?.id]);
  });
});
