/**
 * Checks the chain of versions of every protocol of every lab in the database that DATABASE_OWNER_URL names, and fails
 * at the first version that is not what it was when it was saved: npm run verify
 */
import { withOwnersDatabase } from './lib/owners-database';
import { verifyVersions } from './lib/version-chains';

await withOwnersDatabase(async (database) => {
  const verdict = await verifyVersions(database);
  if (verdict.ok) {
    process.stdout.write(
      `${verdict.versions} versions of ${verdict.labs} labs are what they were when saved.\n`,
    );
    return;
  }
  const { labName, protocolName, number, reason } = verdict;
  process.stderr.write(`${labName}, ${protocolName}, version ${number}: ${reason}.\n`);
  process.exitCode = 1;
});
