import { createServer, type RequestListener } from 'node:http';
import type { AddressInfo, Server } from 'node:net';

/** A stand-in that is up: where to reach it and how to stop it. */
export interface RunningFake<PortName extends string> {
  url: string;
  ports: Record<PortName, number>;
  close(): Promise<void>;
}

export interface Listener {
  port: number;
  close(): Promise<void>;
}

/** Starts serving on a port; 0 takes any free one. */
export async function listenHttp(handler: RequestListener, host: string, port: number): Promise<Listener> {
  const server = createServer(handler);
  await listening(server, () => server.listen(port, host), port);

  return {
    port: portOf(server),
    close: () =>
      new Promise((resolve, reject) => {
        if (!server.listening) return resolve();
        server.close((error) => (error ? reject(error) : resolve()));
        server.closeAllConnections();
      }),
  };
}

/** Settles once the server listens, or fails with a sentence that says what to change. */
export function listening(server: Server, listen: () => void, port: number): Promise<void> {
  return new Promise((resolve, reject) => {
    const fail = (error: NodeJS.ErrnoException) => reject(explain(error, port));
    server.once('error', fail);
    server.once('listening', () => {
      server.off('error', fail);
      resolve();
    });
    listen();
  });
}

export function portOf(server: Server): number {
  // A server that listens on a host and a port always has an address of this shape; only pipes have a string.
  return (server.address() as AddressInfo).port;
}

/** Address of a server as a browser on the same machine can open it. */
export function browserUrl(host: string, port: number): string {
  const reachable = host === '0.0.0.0' || host === '::' ? '127.0.0.1' : host;
  return `http://${reachable.includes(':') ? `[${reachable}]` : reachable}:${port}`;
}

function explain(error: NodeJS.ErrnoException, port: number): Error {
  if (error.code === 'EADDRINUSE') {
    return new Error(`Port ${port} is taken. Stop the program that uses it or choose another port.`, { cause: error });
  }
  if (error.code === 'EACCES') {
    return new Error(`Port ${port} may not be used by this account. Choose a port above 1023.`, { cause: error });
  }
  return error;
}
