import type { RouteRecordRaw } from 'vue-router';

/** Amounts that a plan may ask for in the address of the mixing page. */
const MIX_AMOUNTS = ['waterL', 'limeG', 'vinegarMl', 'limeGPerL', 'vinegarMlPerL'] as const;

function amountIn(text: unknown): number | undefined {
  const amount = typeof text === 'string' ? Number(text) : Number.NaN;
  return Number.isFinite(amount) && amount >= 0 ? amount : undefined;
}

export const waterRoutes: RouteRecordRaw[] = [
  {
    path: '/water',
    name: 'water',
    component: () => import('@/views/water/WaterView.vue'),
    meta: { title: 'Water', access: 'water.read', place: 'water' },
  },
  {
    path: '/water/systems/new',
    name: 'system-new',
    component: () => import('@/views/water/SystemFormView.vue'),
    meta: { title: 'New system', access: 'water.configure', place: 'water' },
  },
  {
    path: '/water/systems/:systemId',
    name: 'system',
    component: () => import('@/views/water/SystemView.vue'),
    props: true,
    meta: { title: 'System', access: 'water.read', place: 'water' },
  },
  {
    path: '/water/systems/:systemId/plan',
    name: 'system-plan',
    component: () => import('@/views/water/SystemPlanView.vue'),
    props: true,
    meta: { title: 'Dosing plan', access: 'water.read', place: 'water' },
  },
  {
    path: '/water/systems/:systemId/edit',
    name: 'system-edit',
    component: () => import('@/views/water/SystemFormView.vue'),
    props: true,
    meta: { title: 'Change system', access: 'water.configure', place: 'water' },
  },
  {
    path: '/water/log',
    name: 'log-readings',
    component: () => import('@/views/water/LogReadingsView.vue'),
    props: ({ query }) => ({ systemId: query.system }),
    meta: { title: 'Log readings', access: 'water.log', place: 'water' },
  },
  {
    path: '/water/mix',
    name: 'mix-limewater',
    component: () => import('@/views/water/MixLimewaterView.vue'),
    props: ({ query }) => ({
      ...{ systemId: query.system, reservoirId: query.reservoir },
      ...Object.fromEntries(MIX_AMOUNTS.map((name) => [name, amountIn(query[name])])),
    }),
    meta: { title: 'Mix limewater', access: 'water.log', place: 'water' },
  },
  {
    path: '/water/readings',
    name: 'readings',
    component: () => import('@/views/water/ReadingListView.vue'),
    meta: { title: 'Readings', access: 'water.read', place: 'water' },
  },
  {
    path: '/water/methods',
    name: 'test-methods',
    component: () => import('@/views/water/TestMethodsView.vue'),
    meta: { title: 'Test methods', access: 'water.read', place: 'water' },
  },
  {
    path: '/water/import',
    name: 'reading-import',
    component: () => import('@/views/water/ReadingImportView.vue'),
    meta: { title: 'Import readings', access: 'water.log', place: 'water' },
  },
  {
    path: '/water/reservoirs/:reservoirId',
    name: 'reservoir',
    component: () => import('@/views/water/ReservoirView.vue'),
    props: true,
    meta: { title: 'Reservoir', access: 'water.read', place: 'water' },
  },
  {
    path: '/water/bench',
    name: 'bench',
    component: () => import('@/views/water/bench/BenchView.vue'),
    meta: { title: 'Bench', access: 'water.read', place: 'water' },
  },
  {
    path: '/water/dosing',
    name: 'dosing',
    component: () => import('@/views/water/DosingView.vue'),
    meta: { title: 'Dosing', access: 'water.read', place: 'water' },
  },
  {
    path: '/water/changes',
    name: 'water-changes',
    component: () => import('@/views/water/WaterChangesView.vue'),
    meta: { title: 'Water changes', access: 'water.read', place: 'water' },
  },
  {
    path: '/water/make-up',
    name: 'make-up-water',
    component: () => import('@/views/water/MakeUpWaterView.vue'),
    meta: { title: 'Make-up water', access: 'water.read', place: 'water' },
  },
];
