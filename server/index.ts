import { createServer } from 'node:http';
import path from 'node:path';
import { createApp } from './app';
import { ConfigError, loadConfig, type Config } from './config';
import { openDatabase, openSidePool } from './db/database';
import { makeLogger } from './http/request-log';
import { startJobs } from './jobs';
import { allWorkers } from './workers';

const shutdownMs = 10_000;

function settings(): Config {
  try {
    return loadConfig(process.env);
  } catch (error) {
    if (!(error instanceof ConfigError)) throw error;
    process.stderr.write(`${error.message}\n`);
    process.exit(1);
  }
}

const config = settings();
const logger = makeLogger(config.logLevel);
const database = openDatabase(config);
const sidePool = openSidePool(config, (error) => logger.warn({ err: error }, 'an idle connection ended'));
const readiness = { accepting: true };
const { app, close } = createApp({
  config,
  database,
  sidePool,
  logger,
  readiness,
  pagesDirectory: path.join(import.meta.dirname, '..', 'dist'),
  prunes: true,
});

const jobs = startJobs({ sidePool, database, logger, workers: allWorkers(config, database) });
if (config.mail === null) logger.warn('no SMTP_URL is set: mail is written and waits');

const server = createServer(app);
// Node's own limits leave a slow sender five minutes.
server.requestTimeout = 30_000;
server.headersTimeout = 15_000;
server.keepAliveTimeout = 5_000;

server.on('error', (error) => {
  logger.fatal({ err: error }, 'the server cannot listen');
  process.stderr.write(`The server cannot listen on ${config.host}:${config.port}: ${error.message}\n`);
  process.exit(1);
});
server.listen(config.port, config.host, () => {
  logger.info({ host: config.host, port: config.port, publicOrigin: config.publicOrigin }, 'listening');
});

let stopping = false;
async function shutDown(exitCode: number): Promise<void> {
  if (stopping) return;
  stopping = true;
  readiness.accepting = false;
  // Whatever happens below, the process is gone in time for whoever waits on it.
  setTimeout(() => process.exit(1), shutdownMs).unref();
  const closed = new Promise<void>((resolve) => {
    server.close(() => resolve());
  });
  // Answers under way are finished; connections that only wait are not waited for.
  const sweeping = setInterval(() => server.closeIdleConnections(), 100);
  server.closeIdleConnections();
  await Promise.all([closed, jobs.stop()]);
  clearInterval(sweeping);
  close();
  await Promise.allSettled([database.destroy(), sidePool.end()]);
  logger.info('stopped');
  process.exit(exitCode);
}

for (const signal of ['SIGTERM', 'SIGINT', 'SIGHUP'] as const) {
  process.on(signal, () => void shutDown(0));
}
// What reaches these is a mistake of ours: the state is unknown, so a fresh process takes over.
process.on('uncaughtException', (error) => {
  logger.fatal({ err: error }, 'an error nobody caught');
  void shutDown(1);
});
process.on('unhandledRejection', (reason) => {
  logger.fatal({ err: reason }, 'a rejection nobody caught');
  void shutDown(1);
});
