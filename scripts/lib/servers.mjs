/**
 * The servers that `npm start` runs: the product's own and, without the real services, stand-ins for GitHub and for a mail server.
 */
import path from 'node:path';
import { freePortFrom, isPortFree } from './ports.mjs';
import { Failure } from './say.mjs';
import { PortTaken, startService } from './service.mjs';
import { keepSecret, randomSecret, readPort } from './settings.mjs';

const APP_PORT = 4600;
const FAKE_PORT = 4610;
const FAKE_SMTP_PORT = 4620;

/**
 * @typedef {object} Place what all servers share
 * @property {string} root
 * @property {string} dataDirectory
 * @property {import('./settings.mjs').Environment} settings
 * @property {string} publicUrl
 * @property {import('./stoppers.mjs').Stoppers} stoppers
 * @property {(error: unknown) => void} onGivenUp
 */

/** @typedef {{ url: string, clientId: string, clientSecret: string }} Fake */
/** @typedef {{ smtpUrl: string, pageUrl: string }} FakeMailbox */

/**
 * The port asked for, which must be free, or the first free one from 4600.
 * @param {import('./settings.mjs').Environment} settings
 */
export async function choosePort(settings) {
  const asked = readPort(settings['PORT'], 'PORT');
  if (asked === undefined) return freePortFrom(APP_PORT);
  if (await isPortFree(asked)) return asked;
  throw new Failure(
    `PORT asks for ${asked}, and another program listens there.`,
    'Set PORT to another number, or leave it out to get the next free one.',
  );
}

/**
 * @param {Place} place
 * @returns {Promise<Fake>}
 */
export async function startFake({ root, dataDirectory, settings, publicUrl, stoppers, onGivenUp }) {
  const fake = { clientId: 'quarterturn-local', clientSecret: randomSecret() };
  for (let port = await freePortFrom(FAKE_PORT); ; port = await freePortFrom(port + 1)) {
    const url = `http://127.0.0.1:${port}`;
    try {
      await startService({
        ...{ root, stoppers, onGivenUp },
        name: 'The stand-in for GitHub',
        entry: 'fake-oauth/index.ts',
        env: {
          ...settings,
          HOST: '127.0.0.1',
          PORT: String(port),
          GITHUB_CLIENT_ID: fake.clientId,
          GITHUB_CLIENT_SECRET: fake.clientSecret,
          FAKE_OAUTH_CALLBACK_URL: `${publicUrl}/`,
        },
        logFile: path.join(dataDirectory, 'fake-oauth.log'),
        readyUrl: `${url}/demo-people`,
      });
      return { ...fake, url };
    } catch (error) {
      if (!(error instanceof PortTaken)) throw error;
    }
  }
}

/**
 * @param {Place} place
 * @returns {Promise<FakeMailbox>}
 */
export async function startFakeMailbox({ root, dataDirectory, settings, stoppers, onGivenUp }) {
  for (let port = await freePortFrom(FAKE_SMTP_PORT); ; port = await freePortFrom(port + 1)) {
    const smtpPort = await freePortFrom(port + 1);
    const pageUrl = `http://127.0.0.1:${port}`;
    try {
      await startService({
        ...{ root, stoppers, onGivenUp },
        name: 'The fake mailbox',
        entry: 'fake-smtp/index.ts',
        env: { ...settings, HOST: '127.0.0.1', PORT: String(port), SMTP_PORT: String(smtpPort) },
        logFile: path.join(dataDirectory, 'fake-smtp.log'),
        readyUrl: `${pageUrl}/`,
      });
      return { smtpUrl: `smtp://127.0.0.1:${smtpPort}`, pageUrl };
    } catch (error) {
      if (!(error instanceof PortTaken)) throw error;
    }
  }
}

/**
 * @param {Place} place
 * @param {{ port: number, databaseUrl: string, fake: Fake | null, mailbox: FakeMailbox | null }} parts
 */
export async function startServer(
  { root, dataDirectory, settings, publicUrl, stoppers, onGivenUp },
  { port, databaseUrl, fake, mailbox },
) {
  const host = settings['HOST'] ?? '127.0.0.1';
  const reach = host === '0.0.0.0' || host === '::' ? '127.0.0.1' : host;
  const isProduction = settings['NODE_ENV'] === 'production';
  // In production a secret must come from whoever runs the service; the server refuses to start without it.
  const secret =
    settings['SESSION_SECRET'] ??
    (isProduction ? undefined : keepSecret(path.join(dataDirectory, 'session-secret'), randomSecret));
  try {
    await startService({
      ...{ root, stoppers, onGivenUp },
      name: 'The server',
      entry: 'server/index.ts',
      env: {
        ...settings,
        NODE_ENV: settings['NODE_ENV'] ?? 'development',
        HOST: host,
        PORT: String(port),
        DATABASE_URL: databaseUrl,
        // The owner's password is for migrations; the server has no business with it.
        DATABASE_OWNER_URL: undefined,
        PUBLIC_URL: publicUrl,
        SESSION_SECRET: secret,
        ...(mailbox === null ? {} : { FAKE_SMTP_URL: mailbox.smtpUrl }),
        ...(fake === null
          ? {}
          : {
              FAKE_GITHUB_URL: fake.url,
              GITHUB_CLIENT_ID: fake.clientId,
              GITHUB_CLIENT_SECRET: fake.clientSecret,
            }),
      },
      // In production the log belongs to whatever runs this command.
      logFile: isProduction ? null : path.join(dataDirectory, 'server.log'),
      readyUrl: `http://${reach.includes(':') ? `[${reach}]` : reach}:${port}/readyz`,
    });
  } catch (error) {
    if (!(error instanceof PortTaken)) throw error;
    throw new Failure(
      `Another program took port ${port} at the same moment.`,
      'Start again: the next free port will be used.',
    );
  }
}
