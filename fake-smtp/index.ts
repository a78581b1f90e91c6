/**
 * Runs the mailbox by itself: SMTP_PORT and PORT are where it takes mail and where its page is, HOST the address of both.
 */
import { startFakeSmtp } from './listen';

const { env } = process;

if (env['NODE_ENV'] === 'production') {
  process.stderr.write('The fake mailbox keeps every mail to itself, so it does not run in production.\n');
  process.exit(1);
}

const fake = await startFakeSmtp({
  smtpPort: Number(env['SMTP_PORT'] ?? '4620'),
  httpPort: Number(env['PORT'] ?? '4621'),
  host: env['HOST'] ?? '127.0.0.1',
});
process.stdout.write(`The fake mailbox takes mail at ${fake.smtpUrl} and shows it at ${fake.pageUrl}\n`);

for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'] as const) {
  process.once(signal, () => void fake.close().then(() => process.exit(0)));
}
