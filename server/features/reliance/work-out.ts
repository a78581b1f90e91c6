import type { Knex } from 'knex';
import { relianceSteps } from '../../../shared/protocol/reliance';
import type { Bench, RelianceReport } from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { inTransaction } from '../../db/in-transaction';
import { betweenTurns } from '../../jobs';
import { findVersionById } from '../protocols';
import { readBasis } from './report-basis';
import { holdReport, nothingToDo, saveProgress, saveReport } from './report-store';

/** So often a page that looks sees another number. */
const progressMs = 250;

export interface WorkingOut {
  readonly database: Knex;
  readonly labId: string;
  readonly signal: AbortSignal;
}

/**
 * Makes the report of one version, with no transaction open while it solves. What moves meanwhile is seen before the
 * report is kept, and then it is made anew; a report that holds already is left as it is.
 */
export async function workOut({ database, labId, signal }: WorkingOut, versionId: string): Promise<void> {
  const within = <Result>(work: (transaction: Transaction) => Promise<Result>) =>
    inTransaction(database, { userId: null, labId }, work);
  const key = { labId, versionId };
  for (;;) {
    const asked = await within(async (transaction) => {
      const version = await findVersionById(transaction, labId, versionId);
      if (version === null) return null;
      const { content } = version;
      const basis = await readBasis(transaction, labId, content);
      const stored = await holdReport(transaction, key, content.targets.length);
      if (stored.signature === basis.signature) {
        await nothingToDo(transaction, key);
        return null;
      }
      return { content, basis };
    });
    if (asked === null) return;
    const { content, basis } = asked;
    let told = performance.now();
    const report = await betweenTurns(relianceSteps(content, basis), async (done) => {
      signal.throwIfAborted();
      if (performance.now() - told < progressMs) return;
      told = performance.now();
      await within((transaction) => saveProgress(transaction, key, done));
    });
    const kept = await within(async (transaction) => {
      const before = await holdReport(transaction, key, content.targets.length);
      const { signature } = await readBasis(transaction, labId, content);
      if (signature !== basis.signature) return false;
      const leftBy = calibrationLeftBy(report, before.report, basis.bench);
      await saveReport(transaction, key, { report, signature, leftBy, at: new Date() });
      return true;
    });
    if (kept) return;
    signal.throwIfAborted();
  }
}

/** The calibration by which more targets are out of tolerance at their old dials than were before it; null for none. */
function calibrationLeftBy(
  report: RelianceReport,
  before: RelianceReport | null,
  bench: Bench,
): string | null {
  const outBefore = (before?.oldDials ?? report.frozen).out;
  if (report.oldDials === null || report.oldDials.out <= outBefore) return null;
  const recalibrated = new Set(
    report.plates.filter(({ change }) => change === 'recalibrated').map(({ plateId }) => plateId),
  );
  const ids = bench.plates.filter(({ id }) => recalibrated.has(id)).map(({ calibration }) => calibration.id);
  // Ids rise with time: the last one recorded is what made the difference.
  return ids.sort().at(-1) ?? null;
}
