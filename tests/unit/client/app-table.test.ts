import { mount } from '@vue/test-utils';
import { createPinia } from 'pinia';
import { describe, expect, it } from 'vitest';
import { h, type VNode } from 'vue';
import { createMemoryHistory, createRouter } from 'vue-router';
import { unreachable } from '../../../src/api/api-error.ts';
import AppTable from '../../../src/components/AppTable.vue';
import { makeVuetify } from '../../../src/plugins/vuetify.ts';
import { setDesk } from './setup.ts';

interface Batch {
  id: string;
  code: string;
  alive: number;
}
const rows: Batch[] = [
  { id: '1', code: 'WIG-1', alive: 1204 },
  { id: '2', code: 'EMB-2', alive: 7 },
];
const columns = [
  { key: 'code', label: 'Batch', sortable: true, text: (row: Batch) => row.code },
  { key: 'alive', label: 'Alive', align: 'end' as const, deskOnly: true, text: (row: Batch) => row.alive },
];

function table(props: Record<string, unknown> = {}, slots: { phone?: (scope: { row: Batch }) => VNode } = {}) {
  const router = createRouter({ history: createMemoryHistory(), routes: [{ path: '/:any(.*)*', component: {} }] });
  return mount(AppTable<Batch>, {
    props: { caption: 'Batches', columns, rows, rowKey: (row: Batch) => row.id, ...props },
    slots,
    global: { plugins: [createPinia(), router, makeVuetify(undefined)] },
  });
}

describe('AppTable', () => {
  it('shows rows with grouped numbers and the first cell as the link', () => {
    const wrapper = table({ rowTo: (row: Batch) => `/batch-${row.id}` });

    expect(wrapper.findAll('tbody tr').map((row) => row.findAll('td').map((cell) => cell.text()))).toEqual([
      ['WIG-1', '1,204'],
      ['EMB-2', '7'],
    ]);
    expect(wrapper.find('tbody a').attributes('href')).toBe('/batch-1');
  });

  it('when a sorted head is pressed, asks for the other direction', async () => {
    const wrapper = table({ sort: { key: 'code', descending: false } });

    expect(wrapper.find('th').attributes('aria-sort')).toBe('ascending');
    await wrapper.find('th button').trigger('click');

    expect(wrapper.emitted('sort')).toEqual([[{ key: 'code', descending: true }]]);
  });

  it('when there is more, says how much and offers it', async () => {
    const wrapper = table({ total: 150, hasMore: true });

    expect(wrapper.find('footer').text()).toContain('2 of 150');
    await wrapper.find('footer button').trigger('click');

    expect(wrapper.emitted('more')).toHaveLength(1);
  });

  it('on a phone, leaves out what is for the desk and names the rest', () => {
    setDesk(false);

    const wrapper = table();

    expect(wrapper.findAll('tbody td')).toHaveLength(2);
    expect(wrapper.find('table').attributes('role')).toBe('table');
  });

  it('on a phone, draws rows the way that the page says', () => {
    setDesk(false);

    const wrapper = table({}, { phone: ({ row }) => h('li', `${row.code}: ${String(row.alive)}`) });

    expect(wrapper.find('table').exists()).toBe(false);
    expect(wrapper.find('ul').attributes('aria-label')).toBe('Batches');
    expect(wrapper.findAll('li').map((row) => row.text())).toEqual(['WIG-1: 1204', 'EMB-2: 7']);
  });

  it('on a desk, keeps the table though the page says how rows look on a phone', () => {
    const wrapper = table({}, { phone: () => h('li') });

    expect(wrapper.findAll('tbody tr')).toHaveLength(2);
    expect(wrapper.find('li').exists()).toBe(false);
  });

  it('when loading, empty or failed, shows that in place of rows', () => {
    expect(table({ loading: true, rows: [] }).find('[role=status]').text()).toBe('Loading Batches');
    expect(table({ rows: [], emptyTitle: 'No batches yet' }).text()).toContain('No batches yet');

    const failed = table({ error: unreachable(), retry: () => undefined });
    expect(failed.find('[role=alert]').text()).toContain('No connection to the farm');
    expect(failed.find('[role=alert] button').text()).toBe('Try again');
  });
});
