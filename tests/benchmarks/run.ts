import { randomUUID } from 'node:crypto';
import path from 'node:path';
import { ensureBuilt, root } from '../../server/tasks/prepare.mjs';
import { copyOf, DATABASE, makeTemplate, removeFolder } from '../browser/support/template.ts';
import { startServer, type RunningServer } from '../browser/support/server.ts';
import { carbonateRates } from './chemistry.ts';
import { demandTimes } from './demand.ts';
import { firstLoad } from './first-load.ts';
import { medianOf } from './measure.ts';
import { openBenchFarm, type BenchFarm } from './farm.ts';
import { signedIn } from './client.ts';
import { recordSql, replayer } from './replay.ts';
import { inWrite } from '../../server/db/write.ts';
import { plugPage } from '../../server/queries/plug-page.ts';
import { placeOrder } from '../../server/services/place-order.ts';

const STARTS = 3;
const LOOK_UPS = 200;
const ORDERS = 40;

/** What the product costs where people wait for it. Prints a table; ratios compare with bare SQL on the same machine. */
async function main(): Promise<void> {
  ensureBuilt();
  const template = await makeTemplate();
  const folder = copyOf(template);
  const farm = openBenchFarm(path.join(folder, DATABASE));
  try {
    const rows = [
      ...(await startUp(template)),
      ...weights(),
      ...carbonateRates(),
      ...(await demandTimes(farm)),
      ...(await lookUpAndOrder(template, farm)),
    ];
    for (const [what, value] of rows) console.log(`${what.padEnd(46)} ${value.padStart(12)}`);
  } finally {
    farm.sqlite.close();
    removeFolder(folder);
    removeFolder(template);
  }
}

type Row = [what: string, value: string];
const ms = (value: number) => `${value.toFixed(value < 10 ? 2 : 0)} ms`;
const kb = (bytes: number) => `${(bytes / 1000).toFixed(0)} kB`;
const times = (value: number) => `${value.toFixed(1)} ×`;

async function startUp(template: string): Promise<Row[]> {
  const taken: number[] = [];
  for (let start = 0; start < STARTS; start += 1) {
    const began = performance.now();
    const server = await startServer(template);
    taken.push(performance.now() - began);
    await server.close();
  }
  return [['From start to ready', ms(taken.sort((a, b) => a - b)[Math.floor(STARTS / 2)] ?? Number.NaN)]];
}

function weights(): Row[] {
  const { scripts, styles } = firstLoad(path.join(root, 'dist'), 'src/views/account/SignInView.vue');
  return [
    ['Scripts of the first page, gzipped', kb(scripts)],
    ['Style sheets of the first page, gzipped', kb(styles)],
  ];
}

async function lookUpAndOrder(template: string, farm: BenchFarm): Promise<Row[]> {
  const server = await startServer(template);
  try {
    return [...(await lookUp(server, farm)), ...(await order(server, farm))];
  } finally {
    await server.close();
  }
}

async function lookUp({ url }: RunningServer, { sqlite, plugCodes, now }: BenchFarm): Promise<Row[]> {
  const viewer = { now, role: 'grower' } as const;
  const call = await signedIn(url, 'grower');
  const replays = plugCodes.map((code) =>
    replayer(
      sqlite,
      recordSql(sqlite, (db) => plugPage(db, code, viewer)),
    ),
  );
  const http = await medianOf(LOOK_UPS, (run) => call('GET', `/api/plugs/${plugCodes[run % plugCodes.length] ?? ''}`));
  const bare = await medianOf(LOOK_UPS, (run) => replays[run % replays.length]?.(run));
  return [
    ['Look up a scanned plug, over HTTP', ms(http)],
    ['The same SQL alone', ms(bare)],
    ['Ratio', times(http / bare)],
  ];
}

async function order({ url }: RunningServer, farm: BenchFarm): Promise<Row[]> {
  const { sqlite, deps, offer, lasts, buyer } = farm;
  // One was ordered to note the SQL; a tenth of the runs warms up.
  const runs = Math.min(ORDERS, Math.floor((lasts - 2) / 1.1));
  const input = { lines: [{ ...offer, quantity: 1 }], shipOn: null, note: '' };
  const call = await signedIn(url, 'buyer');
  const ids: string[] = [];
  const newId = () => {
    const id = randomUUID();
    ids.push(id);
    return id;
  };
  let number = 0;
  const statements = recordSql(sqlite, (db) => {
    ({ number } = inWrite({ ...deps, db, newId }, buyer, (write) => placeOrder(write, buyer.storeId, input)));
  });
  const replay = replayer(
    sqlite,
    statements.filter(({ sql }) => !/^(begin|commit|savepoint|release)/i.test(sql)),
    { ids, counted: [number] },
  );
  const http = await medianOf(runs, () => call('POST', '/api/shop/orders', input));
  const bare = await medianOf(runs, replay);
  return [
    [`Place an order, over HTTP (${runs} runs)`, ms(http)],
    ['The same SQL alone, committed', ms(bare)],
    ['Ratio', times(http / bare)],
  ];
}

await main();
