/**
 * Runs the stand-in by itself: PORT, HOST, GITHUB_CLIENT_ID, GITHUB_CLIENT_SECRET, FAKE_OAUTH_CALLBACK_URL;
 * FAKE_OAUTH_FAULTS=1 opens /faults, and FAKE_OAUTH_FAULT=token:hang,… chooses faults for the whole process.
 */
import { setFaultsFromText } from './faults';
import { startFakeOAuth } from './listen';

const { env } = process;

function required(name: string): string {
  const value = env[name];
  if (value === undefined || value === '') throw new Error(`The stand-in for GitHub needs ${name}.`);
  return value;
}

if (env['NODE_ENV'] === 'production') {
  process.stderr.write(
    'The stand-in for GitHub lets anybody be anybody, so it does not run in production.\n',
  );
  process.exit(1);
}

const callbackUrl = env['FAKE_OAUTH_CALLBACK_URL'];
const faultControl = env['FAKE_OAUTH_FAULTS'] === '1';
const fake = await startFakeOAuth({
  port: Number(env['PORT'] ?? '4610'),
  host: env['HOST'] ?? '127.0.0.1',
  clientId: required('GITHUB_CLIENT_ID'),
  clientSecret: required('GITHUB_CLIENT_SECRET'),
  ...(callbackUrl === undefined ? {} : { callbackUrl }),
  faultControl,
});
if (faultControl) setFaultsFromText(fake.faults, env['FAKE_OAUTH_FAULT'] ?? '');
process.stdout.write(`The stand-in for GitHub listens on ${fake.url}\n`);

for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'] as const) {
  process.once(signal, () => void fake.close().then(() => process.exit(0)));
}
