// `npm start`: installs, builds, makes the demo farm on first use, starts the stand-ins and the server.
// `npm start -- --empty`: the same with a farm of one's own.
import { existsSync } from 'node:fs';
import path from 'node:path';
import { ensureBuilt, ensureFolder, ensureInstalled, root, runTask } from './prepare.mjs';
import { answers, startProcess, stopAll, stopOnSignals } from './processes.mjs';
import { serviceSettings } from './services.mjs';

const empty = process.argv.includes('--empty');
const settings = serviceSettings({ empty });
const dataDir = path.resolve(root, settings.dataDir);

ensureInstalled();
ensureBuilt();
ensureFolder(dataDir);
if (!empty && !existsSync(path.join(dataDir, 'limestead.sqlite'))) {
  runTask('server/demo/make-demo-farm.ts', [], { ...process.env, ...settings.server });
}

stopOnSignals();
if (settings.withFakes) startProcess('The stand-ins', ['--import', 'tsx', 'fakes/main.ts'], settings.fakes);
startProcess('The server', ['--import', 'tsx', 'server/main.ts'], { NODE_ENV: 'production', ...settings.server });

const address = `http://localhost:${settings.port}`;
if (await answers(`http://127.0.0.1:${settings.port}/api/ready`)) await announce();
else stopAll(1);

async function announce() {
  const session = await (await fetch(`http://127.0.0.1:${settings.port}/api/session`)).json();
  console.log(`\nLimestead is at ${address}`);
  if (session.needsSetup) console.log('The farm is empty: open the address to set it up.');
  if (session.demoSignIns.length > 0) {
    console.log('Demo people (also buttons on the sign-in page; password "demo reef by the weir"):');
    for (const person of session.demoSignIns) console.log(`  ${person.email.padEnd(28)} ${person.does}`);
  }
  if (settings.withFakes) {
    console.log(`Mail that the farm sends: ${settings.mailPage}`);
    console.log(`Payment events: ${settings.paymentEvents}`);
  }
}
