/**
 * npm start: everything from a fresh clone to a running Quarterturn.
 */
import { fileURLToPath } from 'node:url';
import { refuseOldNode } from './lib/node-version.mjs';

refuseOldNode();
const { start } = await import('./lib/start.mjs');
process.exit(await start(fileURLToPath(new URL('..', import.meta.url))));
