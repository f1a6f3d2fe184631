import { expect, it } from 'vitest';
import type { Reservoir } from '@shared/contracts/reservoirs.ts';
import { reservoirStanding } from '@/views/water/reservoir-standing.ts';

const a = (code: string, state: Reservoir['state'], fields: Partial<Reservoir> = {}) => ({
  ...{ code, state, usableL: 40, strengthLow: false, alkalinityMeqL: 30 },
  ...fields,
});

it.each([
  [
    'one online, one ready',
    [a('LW-1', 'online'), a('LW-2', 'standby')],
    'LW-1 is online and LW-2 stands ready.',
    false,
  ],
  ['one settles', [a('LW-1', 'online'), a('LW-2', 'settling')], 'LW-1 is online; LW-2 settles to follow it.', false],
  [
    'no standby',
    [a('LW-1', 'online'), a('LW-2', 'spent')],
    'LW-1 is online and nothing stands ready to follow it. Mix the next one.',
    true,
  ],
  [
    'an empty standby',
    [a('LW-1', 'online'), a('LW-2', 'standby', { usableL: 0 })],
    'LW-1 is online and nothing stands ready to follow it. Mix the next one.',
    true,
  ],
  [
    'none online, one ready',
    [a('LW-1', 'standby')],
    'None is online, so it gets no limewater. LW-1 is ready: put it online.',
    true,
  ],
  ['none at all', [a('LW-1', 'spent')], 'None is online, so it gets no limewater. Mix one.', true],
  [
    'a weak one',
    [a('LW-1', 'online', { strengthLow: true }), a('LW-2', 'standby')],
    'LW-1 tested weak: mix a fresh one.',
    true,
  ],
])('when there is %s, says so and what to do', (_, reservoirs, text, off) => {
  expect(reservoirStanding(reservoirs)).toEqual({ text, off });
});

it('when a system has no reservoir, there is nothing to say', () => {
  expect(reservoirStanding([])).toBeNull();
});
