import type { Knex } from 'knex';
import type { Config } from './config';
import { lookWorkers } from './features/notices';
import { relianceWorker } from './features/reliance';
import type { Worker } from './jobs';
import { mailWorker } from './mail';

/** Everything that this process does besides answering. Without a mail server, mail waits until one is set. */
export function allWorkers(
  { mail, publicOrigin }: Pick<Config, 'mail' | 'publicOrigin'>,
  database: Knex,
): readonly Worker[] {
  return [
    ...lookWorkers({ database, publicOrigin }),
    relianceWorker({ database, publicOrigin }),
    ...(mail === null ? [] : [mailWorker({ database, mail })]),
  ];
}
