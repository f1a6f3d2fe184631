import type { Page } from 'playwright-core';
import type { Site } from './site.ts';

const DAY = 86_400_000;
const DKH = 0.356652;

/** A system that a grower has tested and fed from a reservoir for some days, up to now. */
export interface TendedSystem {
  id: string;
  code: string;
  /** The reservoir that feeds it, and one beside it that stands empty. */
  online: { id: string; code: string };
  spare: { id: string; code: string };
}

export interface Tending {
  code: string;
  days: number;
  /** Alkalinity at the start, and what goes of it in a day, dKH. */
  level: number;
  fallsADay: number;
  /** So many days of tests are logged at once, all when left out. */
  testedDays?: number;
}

interface Made {
  id: string;
  code: string;
}

/** Makes a system of 1,000 L with its history: a test each morning, 5 L of limewater a day read off the reservoir. */
export async function tendSystem(site: Site, page: Page, tending: Tending): Promise<TendedSystem> {
  const { code, days } = tending;
  const bands = [{ parameter: 'alkalinity', low: 6.8 * DKH, high: 9.5 * DKH }];
  const system = await site.post<Made>(page, '/api/systems', {
    ...{ code, name: `Bay ${code}`, kind: 'growout', netVolumeL: 1000, bands },
  });
  const [online, spare] = await Promise.all(
    ['1', '2'].map((end) =>
      site.post<Made>(page, '/api/reservoirs', {
        ...{ code: `LW-${code}${end}`, systemId: system.id, volumeL: 250, covered: true },
      }),
    ),
  );
  if (!online || !spare) throw new Error('The reservoirs were not made.');
  const start = Date.now() - days * DAY - 3_600_000;
  const full = 240;
  await site.post(page, `/api/reservoirs/${online.id}/refills`, {
    ...{ waterL: full, limeG: 120, vinegarMl: 0, temperatureC: 25, at: start },
  });
  await site.post(page, `/api/reservoirs/${online.id}/changeovers`, { at: start + 60_000 });
  for (let day = 1; day <= days; day += 1) {
    const at = start + day * DAY;
    await site.post(page, `/api/reservoirs/${online.id}/levels`, { levelL: full - 5 * day, at });
  }
  await logTests(site, page, system.id, tending, [0, tending.testedDays ?? days]);
  return { ...system, online, spare };
}

/** Logs the tests of some of the days; a little off in turn, as tests are. */
export async function logTests(
  site: Site,
  page: Page,
  systemId: string,
  { days, level, fallsADay }: Tending,
  [first, last]: readonly [number, number],
): Promise<void> {
  const start = Date.now() - days * DAY - 3_600_000;
  for (let day = first; day < last; day += 1) {
    const off = [0.1, -0.1, 0, 0.1, -0.1][day % 5] ?? 0;
    const value = Number((level - fallsADay * day + off).toFixed(2));
    await site.post(page, '/api/readings', {
      ...{ systemId, takenAt: start + day * DAY, method: 'photometer' },
      values: [{ parameter: 'alkalinity', value, unit: 'dKH' }],
    });
  }
}
