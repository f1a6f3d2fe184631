import { spawn, type ChildProcess } from 'node:child_process';
import { createServer, type AddressInfo } from 'node:net';
import { startMail } from '../../../fakes/mail/server.ts';
import { startPayments } from '../../../fakes/payments/server.ts';
import { root } from '../../../server/tasks/prepare.mjs';
import { copyOf, removeFolder } from './template.ts';

const START_LIMIT = 60_000;

export interface RunningServer {
  url: string;
  mailUrl: string;
  close(): Promise<void>;
}

/** The real server as a process of its own on a copy of the template (or an empty farm), with its stand-ins. */
export async function startServer(template: string | null): Promise<RunningServer> {
  const dataDir = copyOf(template);
  const port = await freePort();
  const url = `http://127.0.0.1:${port}`;
  const mail = await startMail({ smtpPort: 0, webPort: 0 });
  const payments = await startPayments({ port: 0, webhookUrl: `${url}/api/webhooks/payments` });
  const server = spawn(process.execPath, ['--import', 'tsx', 'server/main.ts'], {
    cwd: root,
    stdio: ['ignore', 'inherit', 'inherit'],
    env: {
      ...process.env,
      NODE_ENV: 'production',
      HOST: '127.0.0.1',
      PORT: String(port),
      PUBLIC_URL: url,
      DATA_DIR: dataDir,
      DEMO: template ? '1' : '0',
      LOG_LEVEL: 'error',
      SMTP_URL: `smtp://127.0.0.1:${mail.ports.smtp}`,
      STRIPE_API_URL: payments.url,
    },
  });
  const close = async () => {
    await stop(server);
    await Promise.all([mail.close(), payments.close()]);
    removeFolder(dataDir);
  };
  try {
    await untilReady(url, server);
  } catch (error) {
    await close();
    throw error;
  }
  return { url, mailUrl: mail.url, close };
}

async function untilReady(url: string, server: ChildProcess): Promise<void> {
  const limit = Date.now() + START_LIMIT;
  while (server.exitCode === null && Date.now() < limit) {
    if (await isReady(url)) return;
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
  throw new Error(server.exitCode === null ? 'The server did not get ready.' : 'The server stopped while starting.');
}

async function isReady(url: string): Promise<boolean> {
  try {
    return (await fetch(`${url}/api/ready`)).ok;
  } catch {
    return false;
  }
}

async function stop(server: ChildProcess): Promise<void> {
  if (server.exitCode !== null) return;
  const ended = new Promise((resolve) => server.once('exit', resolve));
  server.kill('SIGTERM');
  await ended;
}

function freePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const probe = createServer().once('error', reject);
    probe.listen(0, '127.0.0.1', () => {
      const { port } = probe.address() as AddressInfo;
      probe.close(() => {
        resolve(port);
      });
    });
  });
}
