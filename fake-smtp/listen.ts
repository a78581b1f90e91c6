import { createServer } from 'node:http';
import type { Server } from 'node:net';
import { SMTPServer } from 'smtp-server';
import { Mailbox } from './mailbox';
import { listPage, messagePage, missingPage } from './page';

const largestBytes = 1_000_000;

interface FakeSmtpOptions {
  /** 0 takes a free one. */
  readonly smtpPort: number;
  readonly httpPort: number;
  readonly host?: string;
}

export interface RunningFakeSmtp {
  readonly smtpUrl: string;
  readonly pageUrl: string;
  readonly mailbox: Mailbox;
  /** So many of the next messages are put off, as by a server that is too busy. */
  readonly putOff: (count: number) => void;
  readonly close: () => Promise<void>;
}

/** A mail server that keeps what it is given, and a page to read it on. Rejects when a port is taken. */
export async function startFakeSmtp(options: FakeSmtpOptions): Promise<RunningFakeSmtp> {
  const host = options.host ?? '127.0.0.1';
  const mailbox = new Mailbox();
  const busy = { left: 0 };
  const smtp = new SMTPServer({
    // Nobody has an account here, and on loopback nothing is worth encrypting.
    disabledCommands: ['AUTH', 'STARTTLS'],
    size: largestBytes,
    logger: false,
    onData: (stream, session, done) => {
      const chunks: Buffer[] = [];
      stream.on('data', (chunk: Buffer) => chunks.push(chunk));
      stream.on('end', () => {
        if (stream.sizeExceeded) {
          done(refusal(552, 'Message exceeds fixed maximum message size'));
          return;
        }
        if (busy.left > 0) {
          busy.left -= 1;
          done(refusal(451, 'Try again later'));
          return;
        }
        const { mailFrom, rcptTo } = session.envelope;
        mailbox.take(Buffer.concat(chunks), {
          from: mailFrom === false ? '' : mailFrom.address,
          to: rcptTo.map(({ address }) => address),
        });
        done();
      });
    },
  });
  const http = createServer((request, response) => {
    const { pathname } = new URL(request.url ?? '/', 'http://localhost');
    const number = /^\/messages\/(\d{1,9})$/.exec(pathname)?.[1];
    const message = number === undefined ? undefined : mailbox.find(Number(number));
    const found = pathname === '/' || message !== undefined;
    response.writeHead(found ? 200 : 404, {
      'Content-Type': 'text/html; charset=utf-8',
      'Content-Security-Policy':
        "default-src 'none'; style-src 'unsafe-inline'; img-src data:; base-uri 'none'; form-action 'none'; frame-ancestors 'none'",
      'Cache-Control': 'no-store',
    });
    response.end(
      pathname === '/'
        ? listPage(mailbox.messages)
        : message === undefined
          ? missingPage()
          : messagePage(message),
    );
  });
  const smtpPort = await listening(smtp.server, () => smtp.listen(options.smtpPort, host));
  // What goes wrong on one connection is that connection's own.
  smtp.on('error', () => undefined);
  const httpPort = await listening(http, () => http.listen(options.httpPort, host)).catch(
    (error: unknown) => {
      smtp.close();
      throw error;
    },
  );
  return {
    smtpUrl: `smtp://${host}:${smtpPort}`,
    pageUrl: `http://${host}:${httpPort}`,
    mailbox,
    putOff: (count) => {
      busy.left = count;
    },
    close: async () => {
      await Promise.all([
        new Promise<void>((closed) => smtp.close(() => closed())),
        new Promise<void>((closed) => {
          http.close(() => closed());
          http.closeAllConnections();
        }),
      ]);
    },
  };
}

/** An answer of SMTP other than "taken". */
function refusal(responseCode: number, message: string): Error {
  return Object.assign(new Error(message), { responseCode });
}

function listening(server: Pick<Server, 'once' | 'off' | 'address'>, listen: () => void): Promise<number> {
  return new Promise((resolve, reject) => {
    server.once('error', reject);
    server.once('listening', () => {
      server.off('error', reject);
      const address = server.address();
      resolve(typeof address === 'object' && address !== null ? address.port : 0);
    });
    listen();
  });
}
