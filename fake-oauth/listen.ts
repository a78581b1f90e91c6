import { createServer } from 'node:http';
import { createFakeOAuth, type FakeOAuthOptions } from './app';
import type { Faults } from './faults';

export interface RunningFakeOAuth {
  readonly url: string;
  readonly faults: Faults;
  /** Stops at once, also in the middle of an answer that hangs. */
  readonly close: () => Promise<void>;
}

/** Starts the stand-in on a loopback port; 0 takes a free one. Rejects when the port is taken. */
export function startFakeOAuth(
  options: FakeOAuthOptions & { readonly port: number; readonly host?: string },
): Promise<RunningFakeOAuth> {
  const { app, faults } = createFakeOAuth(options);
  const server = createServer(app);
  const host = options.host ?? '127.0.0.1';
  return new Promise((resolve, reject) => {
    server.once('error', reject);
    server.listen(options.port, host, () => {
      const address = server.address();
      const port = typeof address === 'object' && address !== null ? address.port : options.port;
      resolve({
        url: `http://${host}:${port}`,
        faults,
        close: () =>
          new Promise((closed) => {
            server.close(() => closed());
            server.closeAllConnections();
          }),
      });
    });
  });
}
