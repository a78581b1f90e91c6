import { sortedJson } from '../../../shared/protocol/canonical-json';
import { compareShown } from '../../../shared/protocol/compare-shown';
import { type Frozen, freezeSteps } from '../../../shared/protocol/freeze';
import { sameContent } from '../../../shared/protocol/same-content';
import type { SaveVersion, VersionSummary } from '../../../shared/schemas';
import type { AuditEntry } from '../../audit/record-event';
import type { Transaction } from '../../db/database';
import { newId } from '../../db/new-id';
import { conflict, ProblemError, refused } from '../../errors';
import { requireRevision } from '../../http/revision';
import type { Reply, User } from '../../http/route';
import { betweenTurns } from '../../jobs';
import { findBench, type StoredBench } from '../benches';
import { findLab, type StoredLab } from '../labs';
import type { StoredProtocol } from './draft-store';
import { findVersion, insertVersion, type StoredVersion } from './version-store';

/** What either transaction knows of the request. */
interface Asking {
  readonly body: SaveVersion;
  readonly thing: StoredProtocol;
  readonly labId: string;
  readonly user: User;
  readonly now: Date;
  readonly transaction: Transaction;
  readonly expectedRevision: number | null;
}

/** All that a version is made of, as the first transaction read it. */
interface Asked {
  readonly asking: Omit<Asking, 'transaction'>;
  readonly lab: StoredLab;
  readonly bench: StoredBench;
  readonly latest: StoredVersion | null;
}

/** What must be unchanged when the version is kept: a number of it that moved would be in no draft, bench or plate. */
function basis({ lab, bench }: Pick<Asked, 'lab' | 'bench'>): string {
  return sortedJson({ name: lab.name, convention: lab.convention, bench });
}

async function labAndBench({ transaction, labId, thing }: Asking): Promise<Pick<Asked, 'lab' | 'bench'>> {
  const lab = await findLab(transaction, { labId });
  const bench = await findBench(transaction, { labId, benchId: thing.draft.content.benchId });
  if (lab === null || bench === null) throw new Error("a draft's lab and bench are there by foreign key");
  return { lab, bench };
}

/** Reads what is to be frozen, and refuses what can be refused at once. */
export async function readForVersion(asking: Asking): Promise<Asked> {
  const { transaction, labId, thing, expectedRevision } = asking;
  requireRevision(expectedRevision, thing.draft.revision, thing.draft);
  const { lab, bench } = await labAndBench(asking);
  if (bench.retiredAt !== null) {
    throw refused([{ path: 'benchId', message: `${bench.name} is retired. Choose a bench in use.` }]);
  }
  const { latestVersion } = thing;
  const latest =
    latestVersion === null
      ? null
      : await findVersion(transaction, { labId, protocolId: thing.id, number: latestVersion.number });
  return { asking, lab, bench, latest };
}

type Kept = Extract<Frozen, { ok: true }>;

/** Solves and freezes, a row between two turns of the event loop: many plates and rows take most of a minute. */
export async function frozenFor({ asking, lab, bench, latest }: Asked): Promise<Kept> {
  const { thing, body, now, user } = asking;
  const frozen = await betweenTurns(
    freezeSteps({
      lab,
      protocolId: thing.id,
      draft: thing.draft.content,
      bench,
      number: (latest?.summary.number ?? 0) + 1,
      parentHash: latest?.summary.contentHash ?? null,
      message: body.message,
      savedAt: now,
      savedBy: user,
    }),
  );
  if (!frozen.ok) throw refused(frozen.faults);
  if (latest !== null && sameContent(frozen.content, latest.content)) {
    throw conflict(
      'nothing-new',
      `Nothing that a version holds has changed since version ${latest.summary.number} was saved: neither the draft nor its bench, its plates or the convention.`,
    );
  }
  const differences = compareShown(frozen.content, body.shown);
  if (differences.length > 0) throw refused(differences);
  return frozen;
}

/** Keeps what was frozen, unless anything that it was made of has moved meanwhile. */
export async function keepVersion(
  last: Asking & { readonly audit: (entry: AuditEntry) => Promise<void> },
  asked: Asked,
  frozen: Kept,
): Promise<Reply & { readonly body: VersionSummary }> {
  const { transaction, thing, now, audit, expectedRevision } = last;
  requireRevision(expectedRevision, thing.draft.revision, thing.draft);
  if ((thing.latestVersion?.contentHash ?? null) !== (asked.latest?.summary.contentHash ?? null)) {
    throw conflict(
      'version-saved-meanwhile',
      'Someone else saved a version of this protocol while yours was worked out. Look at it, then save again if yours is still needed.',
    );
  }
  if (basis(await labAndBench(last)) !== basis(asked)) {
    throw conflict(
      'bench-changed-meanwhile',
      "The bench, one of its plates or the lab's convention changed while the version was worked out. Load the page again, look at the new numbers, then save.",
    );
  }
  const summary = await insertVersion(transaction, newId(now), frozen, thing.draft.revision);
  await audit({
    kind: 'version.saved',
    subjectId: summary.id,
    details: {
      protocolId: thing.id,
      number: summary.number,
      contentHash: summary.contentHash,
      message: summary.message,
    },
  });
  return { status: 201, body: summary };
}

/** Lets one piece of a person's work run at a time in this process: it holds a processor for as long as it takes. */
export function oneAtATime() {
  const working = new Set<string>();
  return async <Result>(userId: string, work: () => Promise<Result>): Promise<Result> => {
    if (working.has(userId)) {
      throw new ProblemError(
        'still-freezing',
        409,
        'Another version of yours is being worked out just now. Wait until it is saved, then save this one.',
        { headers: { 'Retry-After': '2' } },
      );
    }
    working.add(userId);
    try {
      return await work();
    } finally {
      working.delete(userId);
    }
  };
}
