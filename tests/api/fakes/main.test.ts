import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { createServer } from 'node:net';
import type { AddressInfo } from 'node:net';
import { expect, it, onTestFinished, vi } from 'vitest';
import { readEnvironment } from '../../../fakes/config.ts';

it('when started on free ports, names its addresses and stops cleanly at SIGTERM', async () => {
  const fakes = startFakes({});
  await vi.waitFor(() => expect(fakes.output()).toContain('Mail stand-in: http://'), { timeout: 20_000 });

  fakes.process.kill('SIGTERM');

  expect(await fakes.exitCode).toBe(0);
}, 30_000);

it('when a port is taken, says which and which variable to change, and exits with an error', async () => {
  const taken = createServer().listen(0, '127.0.0.1');
  await once(taken, 'listening');
  onTestFinished(() => void taken.close());
  // A server that listens on a host and a port has an address of this shape.
  const { port } = taken.address() as AddressInfo;

  const fakes = startFakes({ FAKE_SMTP_PORT: String(port) });

  expect(await fakes.exitCode).toBe(1);
  expect(fakes.output()).toContain(`Port ${port} is taken.`);
  expect(fakes.output()).toContain('FAKE_SMTP_PORT');
}, 30_000);

it('when variables are wrong, every one of them is named', () => {
  expect(() => readEnvironment({ FAKE_MAIL_PORT: 'eighty', FAKE_WEBHOOK_URL: 'nowhere' })).toThrow(
    /FAKE_MAIL_PORT[^]*FAKE_WEBHOOK_URL/,
  );
});

it('when nothing is set, the stand-ins listen on this machine only', () => {
  expect(readEnvironment({})).toMatchObject({ FAKE_HOST: '127.0.0.1', FAKE_PAYMENTS_PORT: 4242, FAKE_MAIL_PORT: 8025 });
});

function startFakes(env: Record<string, string>) {
  const child = spawn(process.execPath, ['--import', 'tsx', 'fakes/main.ts'], {
    env: { ...process.env, FAKE_PAYMENTS_PORT: '0', FAKE_SMTP_PORT: '0', FAKE_MAIL_PORT: '0', ...env },
  });
  onTestFinished(() => void child.kill('SIGKILL'));
  let text = '';
  child.stdout.on('data', (chunk: Buffer) => (text += chunk.toString()));
  child.stderr.on('data', (chunk: Buffer) => (text += chunk.toString()));
  return {
    process: child,
    output: () => text,
    exitCode: once(child, 'close').then(([code]: unknown[]) => code),
  };
}
