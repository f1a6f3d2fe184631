import { spawn } from 'node:child_process';
import { statSync } from 'node:fs';
import { createServer, request, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import path from 'node:path';
import { describe, expect, it, onTestFinished, vi } from 'vitest';
import { finishRequests } from '../../../server/shut-down.ts';
import { root } from '../../../server/tasks/prepare.mjs';
import { tempFolder } from '../../support/temp-folder.ts';

/** Starting the real server compiles it first, which takes long on a busy machine. */
vi.setConfig({ testTimeout: 120_000 });

function listen(server: Server): Promise<number> {
  onTestFinished(() => void server.close());
  return new Promise((resolve) => {
    server.listen(0, '127.0.0.1', () => resolve((server.address() as AddressInfo).port));
  });
}

/** Runs the real server until it ends; `talk` sees what it says meanwhile. */
function runServer(env: Record<string, string>, talk: (said: string, kill: (signal: NodeJS.Signals) => void) => void) {
  const child = spawn(process.execPath, ['--import', 'tsx', 'server/main.ts'], {
    cwd: root,
    env: { ...process.env, NODE_ENV: 'production', HOST: '127.0.0.1', LOG_LEVEL: 'info', ...env },
  });
  onTestFinished(() => void child.kill('SIGKILL'));
  let said = '';
  const hear = (chunk: Buffer) => {
    said += chunk.toString('utf8');
    talk(said, (signal) => child.kill(signal));
  };
  child.stdout.on('data', hear);
  child.stderr.on('data', hear);
  return new Promise<{ code: number | null; said: string }>((resolve) => {
    child.once('close', (code) => resolve({ code, said }));
  });
}

async function freePort(): Promise<string> {
  const probe = createServer();
  const port = await listen(probe);
  await new Promise((resolve) => probe.close(resolve));
  return String(port);
}

describe('stopping', () => {
  it('when a request is under way on a connection that is kept open, it is answered, and then nothing keeps the server', async () => {
    let answer = () => {};
    const arrived = new Promise<void>((resolve) => {
      answer = resolve;
    });
    let finish = () => {};
    const server = createServer((_request, response) => {
      finish = () => response.end('late but whole');
      answer();
    });
    server.keepAliveTimeout = 0;
    const port = await listen(server);
    const body = new Promise<string>((resolve, reject) => {
      const call = request({ port, host: '127.0.0.1', headers: { Connection: 'keep-alive' } }, (response) => {
        let text = '';
        response.on('data', (chunk: Buffer) => (text += chunk.toString('utf8')));
        response.on('end', () => resolve(text));
      });
      call.on('error', reject).end();
    });
    await arrived;

    const finished = finishRequests(server);
    finish();

    expect(await body).toBe('late but whole');
    await finished;
    expect(server.listening).toBe(false);
  });

  it('when a terminal and a parent both send their signal, the server still ends well, and its folder is its own', async () => {
    const dataDir = path.join(tempFolder(), 'farm');
    let sent = false;

    const { code, said } = await runServer({ DATA_DIR: dataDir, PORT: await freePort() }, (text, kill) => {
      if (sent || !text.includes('Limestead answers at')) return;
      sent = true;
      kill('SIGINT');
      kill('SIGTERM');
    });

    expect(code, said).toBe(0);
    expect(said).toContain('Finishing what is under way');
    expect(statSync(dataDir).mode & 0o777).toBe(0o700);
  });
});

describe('a start that can not be', () => {
  it('when the port is taken, says so and what to do', async () => {
    const port = String(await listen(createServer()));

    const { code, said } = await runServer({ DATA_DIR: tempFolder(), PORT: port }, () => {});

    expect(code).toBe(1);
    expect(said).toContain(`Port ${port} is taken. Stop what uses it, or set PORT to another one.`);
  });

  it('when a setting is wrong, names it without a stack trace', async () => {
    const { code, said } = await runServer({ DATA_DIR: tempFolder(), PORT: 'x' }, () => {});

    expect([code, said.trim()]).toEqual([
      1,
      'These settings need attention:\n  PORT: Use a whole number from 1 to 65535.',
    ]);
  });
});
