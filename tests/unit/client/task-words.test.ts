import { describe, expect, it } from 'vitest';
import type { Task } from '@shared/contracts/tasks.ts';
import type { RepeatRule } from '@shared/domain/repeat-rule.ts';
import { draftOf, ruleOf } from '@/views/tasks/repeat-draft.ts';
import { minuteOf, clockOf, taskLine, usualTitle } from '@/views/tasks/task-words.ts';
import { tasksByDay } from '@/views/tasks/tasks-by-day.ts';

const TODAY = '2026-03-02';

function task(fields: Partial<Task>): Task {
  return {
    ...{
      id: `id ${fields.dueOn ?? ''}`,
      kind: 'other',
      title: 'Rinse',
      systemId: null,
      systemCode: null,
      systemName: null,
    },
    ...{ reservoirId: null, reservoirCode: null, parameter: null, repeat: null, startsOn: TODAY, dueOn: TODAY },
    ...{ dueMinute: null, lateFrom: null, assigneeId: null, assigneeName: null, assigneeRole: null, note: '' },
    ...{ last: null, ended: false, version: 1 },
    ...fields,
  };
}

describe('tasks by day', () => {
  it('late ones stand together, a week stands day by day, and the rest together', () => {
    const days = ['2026-02-20', '2026-03-01', TODAY, '2026-03-03', '2026-03-05', '2026-03-09', '2026-05-01'];

    const groups = tasksByDay(
      days.map((dueOn) => task({ dueOn })),
      TODAY,
    );

    expect(groups.map(({ title, tasks }) => [title, tasks.length])).toEqual([
      ['Late', 2],
      ['Today', 1],
      ['Tomorrow', 1],
      ['Thursday, 5 March', 1],
      ['Later', 2],
    ]);
  });

  it('within a day those of a set time come first, by the clock', () => {
    const [day] = tasksByDay(
      [null, 600, 480].map((dueMinute) => task({ dueMinute })),
      TODAY,
    );

    expect(day?.tasks.map(({ dueMinute }) => dueMinute)).toEqual([480, 600, null]);
  });
});

describe('the line of a task', () => {
  it('says how late, when, how often and for whom', () => {
    const line = taskLine(
      task({
        ...{ dueOn: '2026-02-27', dueMinute: 545, assigneeId: 'b', assigneeName: 'Tom' },
        repeat: { every: 'weeks', interval: 2, weekdays: [5] },
      }),
      TODAY,
      { id: 'a', role: 'grower' },
    );

    expect(line).toBe('due 3 days ago · at 09:05 · every 2 weeks on Friday · for Tom');
  });

  it('does not tell people that their own task is theirs', () => {
    expect(taskLine(task({ assigneeRole: 'grower' }), TODAY, { id: 'a', role: 'grower' })).toBe('once');
    expect(taskLine(task({ assigneeRole: 'grower' }), TODAY, { id: 'a', role: 'owner' })).toBe('once · for the grower');
  });

  it('names a task by its kind until someone names it otherwise', () => {
    expect(usualTitle('test', 'ph')).toBe('Test pH');
    expect(usualTitle('test', null)).toBe('Test the water');
    expect(usualTitle('other', null)).toBe('');
  });

  it('clock times go both ways', () => {
    for (const minute of [0, 545, 1439]) expect(minuteOf(clockOf(minute))).toBe(minute);
    expect(minuteOf('')).toBeNull();
  });
});

describe('the draft of a rule', () => {
  it.each<RepeatRule | null>([
    null,
    { every: 'days', interval: 3 },
    { every: 'weeks', interval: 2, weekdays: [1, 4] },
    { every: 'months', interval: 1, monthDay: 31 },
    { every: 'months_on', interval: 3, week: -1, weekday: 5 },
    { every: 'after_done', days: 14 },
    { every: 'dates', dates: ['2026-03-02', '2026-05-01'] },
  ])('gives the rule back as it was: %o', (rule) => {
    expect(ruleOf(draftOf(rule, TODAY))).toEqual(rule);
  });

  it('days of a list are sorted and named once; what is no day is left for the contract to refuse', () => {
    const draft = { ...draftOf(null, TODAY), way: 'dates' as const, dates: '2026-05-01\n2026-03-02, 2026-05-01' };

    expect(ruleOf(draft)).toEqual({ every: 'dates', dates: ['2026-03-02', '2026-05-01'] });
    expect(ruleOf({ ...draft, dates: 'soon' })).toEqual({ every: 'dates', dates: ['soon'] });
  });
});
