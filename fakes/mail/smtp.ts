import { simpleParser } from 'mailparser';
import { SMTPServer } from 'smtp-server';
import { listening, portOf, type Listener } from '../web/listen.ts';
import type { Inbox } from './inbox.ts';

const LARGEST_MAIL = 25 * 1024 * 1024;
const GOODBYE_MS = 500;

export interface Credentials {
  user: string;
  pass: string;
}

/** Receives mail in plain SMTP. With credentials, only who signs in with them may send; otherwise anyone may. */
export async function listenSmtp(
  inbox: Inbox,
  { host, port, credentials, now }: { host: string; port: number; credentials: Credentials | null; now: () => number },
): Promise<Listener> {
  const server = new SMTPServer({
    disabledCommands: ['STARTTLS'],
    allowInsecureAuth: true,
    authOptional: credentials === null,
    disableReverseLookup: true,
    size: LARGEST_MAIL,
    closeTimeout: GOODBYE_MS,
    onAuth(auth, _session, callback) {
      const right = credentials === null || (auth.username === credentials.user && auth.password === credentials.pass);
      callback(
        right ? null : new Error('The user name or the password is wrong.'),
        right ? { user: auth.username ?? '' } : undefined,
      );
    },
    onData(stream, session, callback) {
      simpleParser(stream).then(
        (parsed) => {
          if (stream.sizeExceeded) {
            callback(Object.assign(new Error('The mail is larger than 25 MB.'), { responseCode: 552 }));
            return;
          }
          inbox.add(
            parsed,
            session.envelope.rcptTo.map(({ address }) => address),
            now(),
          );
          callback(null);
        },
        (error: unknown) => callback(error instanceof Error ? error : new Error(String(error))),
      );
    },
  });
  // Without a listener a client that drops its connection would stop the program. A failure to listen is told below.
  server.on('error', (error) => {
    if (server.server.listening) console.error(`Mail stand-in: ${error.message}`);
  });
  await listening(server.server, () => server.listen(port, host), port);

  return {
    port: portOf(server.server),
    close: () => new Promise((resolve) => server.close(() => resolve())),
  };
}
