/**
 * npm test: sets up what is missing, then every check and every test. `npm test -- optics` runs only the test files whose path holds "optics".
 */
import { fileURLToPath } from 'node:url';
import { refuseOldNode } from './lib/node-version.mjs';

refuseOldNode();
const { test } = await import('./lib/test.mjs');
process.exit(await test(fileURLToPath(new URL('..', import.meta.url)), process.argv.slice(2)));
