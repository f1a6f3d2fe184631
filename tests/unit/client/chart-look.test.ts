import { mount } from '@vue/test-utils';
import { createPinia } from 'pinia';
import { describe, expect, it } from 'vitest';
import { createMemoryHistory, createRouter } from 'vue-router';
import SeriesChart from '../../../src/components/charts/SeriesChart.vue';
import SeriesTable from '../../../src/components/charts/SeriesTable.vue';
import type { Lane, Panel } from '../../../src/components/charts/series.ts';
import { makeVuetify } from '../../../src/plugins/vuetify.ts';
import { setDesk } from './setup.ts';

const DAY = 86_400_000;
const START = Date.UTC(2026, 2, 1);
const at = (days: number) => START + days * DAY;

const panels: Panel[] = [
  {
    key: 'alkalinity',
    series: [
      {
        ...{ key: 'alkalinity', label: 'alkalinity', unit: 'dKH', tone: 'plum', decimals: 1 },
        points: Array.from({ length: 40 }, (_, day) => ({
          ...{ at: at(day), value: 8 + (day % 5) / 10, error: 0.3 },
          ...(day === 20 ? { flag: 'flagged' } : {}),
        })),
      },
    ],
    band: { min: 7.5, max: 9 },
  },
];
const lanes: Lane[] = [
  { key: 'changes', label: 'water change', tone: 'slate', shape: 'triangle', marks: [{ at: at(10), note: '130 L' }] },
];
const props = { title: 'Alkalinity', panels, lanes, timeZone: 'UTC' };

function mountWith() {
  const router = createRouter({ history: createMemoryHistory(), routes: [{ path: '/:any(.*)*', component: {} }] });
  return { global: { plugins: [createPinia(), router, makeVuetify(undefined)] } };
}
const chart = () => mount(SeriesChart, { props: { ...props, from: at(0), to: at(39) }, ...mountWith() });

describe('a chart', () => {
  it('when the keys choose a moment, says it in words, also for readers', async () => {
    const wrapper = chart();
    const keys = wrapper.get('input[type=range]');

    await keys.setValue(10);

    expect(wrapper.get('figcaption').text()).toContain('11 Mar 2026');
    expect(wrapper.get('figcaption').text()).toContain('alkalinity 8.0 ± 0.3');
    expect(wrapper.get('figcaption').text()).toContain('water change: 130 L');
    expect(keys.attributes('aria-valuetext')).toContain('water change: 130 L');
  });

  it('when looked at closer by buttons and keys, offers the whole period and goes back to it', async () => {
    const wrapper = chart();

    await wrapper.get('button[aria-label="Look closer"]').trigger('click');
    await wrapper.get('input[type=range]').trigger('keydown', { key: '+' });

    const span = wrapper.emitted<[[number, number]]>('update:view')?.at(-1)?.[0] ?? [0, 0];
    expect(span[1] - span[0]).toBeCloseTo((39 * DAY) / 4, 0);
    await wrapper.get('button[aria-label="Whole period"]').trigger('click');
    expect(wrapper.emitted('update:view')?.at(-1)).toEqual([null]);
  });

  it('when a reading is flagged, it stands apart with its word', () => {
    expect(chart().get('.chart-flag-word').text()).toBe('flagged');
  });

  it('draws a thousand readings as few elements', () => {
    const many = Array.from({ length: 1000 }, (_, day) => ({ at: at(day), value: 8 + (day % 7) / 10, error: 0.3 }));
    const [panel] = panels;
    const [series] = panel?.series ?? [];
    const wrapper = mount(SeriesChart, {
      props: {
        ...props,
        panels: [{ ...panel, key: 'many', series: series ? [{ ...series, points: many }] : [] }],
        from: at(0),
        to: at(999),
      },
      ...mountWith(),
    });

    expect(wrapper.findAll('svg *').length).toBeLessThan(80);
  });
});

describe('the table of a chart', () => {
  it('shows a month at first and more on demand, with the flag in words', async () => {
    setDesk(true);
    const wrapper = mount(SeriesTable, { props: { ...props, span: [at(0), at(39)] as const }, ...mountWith() });

    expect(wrapper.findAll('tbody tr')).toHaveLength(31);
    expect(wrapper.text()).toContain('8.0 ± 0.3 (flagged)');
    await wrapper.get('footer button').trigger('click');
    expect(wrapper.findAll('tbody tr')).toHaveLength(40);
  });
});
