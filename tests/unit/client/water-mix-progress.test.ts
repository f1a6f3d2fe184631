import { beforeEach, expect, it, vi } from 'vitest';
import { nextTick, ref } from 'vue';
import { useMixProgress } from '@/views/water/use-mix-progress.ts';

const AMOUNTS = { levelBeforeL: 10, waterL: 50, limeG: 40, vinegarMl: 0, temperatureC: 25 };
const HOUR = 3_600_000;

beforeEach(() => {
  localStorage.clear();
  vi.useFakeTimers({ toFake: ['Date'], now: Date.parse('2026-03-02T09:00:00Z') });
});

it('when the page is loaded again in the middle of a mix, its ticks and amounts are still there', async () => {
  const mix = useMixProgress(ref('lw-1'));
  mix.tick('protect', true, AMOUNTS);
  mix.tick('water', true, AMOUNTS);
  await nextTick();

  const again = useMixProgress(ref('lw-1'));

  expect(again.progress.value).toMatchObject({ done: ['protect', 'water'], amounts: AMOUNTS });
  expect(useMixProgress(ref('lw-2')).progress.value).toBeUndefined();
});

it('when a tick is taken back or an amount changed, that is what is kept', () => {
  const mix = useMixProgress(ref('lw-1'));
  mix.tick('protect', true, AMOUNTS);
  mix.tick('protect', false, AMOUNTS);
  mix.note({ ...AMOUNTS, limeG: 44 });

  expect(mix.progress.value).toMatchObject({ done: [], amounts: { limeG: 44 } });
});

it('when nothing is ticked, amounts alone begin no mix; a logged one is forgotten', () => {
  const mix = useMixProgress(ref('lw-1'));
  mix.note(AMOUNTS);
  expect(mix.progress.value).toBeUndefined();

  mix.tick('protect', true, AMOUNTS);
  mix.forget();
  expect(mix.progress.value).toBeUndefined();
});

it('when nobody went on with it for half a day, it is forgotten', () => {
  useMixProgress(ref('lw-1')).tick('protect', true, AMOUNTS);
  vi.setSystemTime(Date.now() + 12 * HOUR);

  expect(useMixProgress(ref('lw-1')).progress.value).toBeUndefined();
});
