// `npm run dev`: Vite with hot reload, the server restarting on change, the stand-ins, and the demo farm.
import { existsSync } from 'node:fs';
import path from 'node:path';
import { ensureFolder, ensureInstalled, root, runTask } from './prepare.mjs';
import { startProcess, stopOnSignals } from './processes.mjs';
import { serviceSettings } from './services.mjs';

const settings = serviceSettings({ empty: process.argv.includes('--empty') });
const dataDir = path.resolve(root, settings.dataDir);

ensureInstalled();
ensureFolder(dataDir);
if (settings.server.DEMO === '1' && !existsSync(path.join(dataDir, 'limestead.sqlite'))) {
  runTask('server/demo/make-demo-farm.ts', [], { ...process.env, ...settings.server });
}

stopOnSignals();
const server = { NODE_ENV: 'development', ...settings.server, LOG_LEVEL: process.env.LOG_LEVEL ?? 'info' };
const vitePort = process.env.VITE_PORT ?? '5173';
startProcess('The stand-ins', ['--watch', '--import', 'tsx', 'fakes/main.ts'], settings.fakes);
startProcess('The server', ['--watch', '--import', 'tsx', 'server/main.ts'], {
  ...server,
  PUBLIC_URL: process.env.PUBLIC_URL ?? `http://localhost:${vitePort}`,
});
startProcess('Vite', ['node_modules/vite/bin/vite.js', '--port', vitePort, '--strictPort'], { PORT: settings.port });
