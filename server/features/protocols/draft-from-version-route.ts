import { draftFromVersion, sameIntent } from '../../../shared/protocol/draft-from-version';
import {
  type DraftContent,
  draftFromVersionSchema,
  draftSchema,
  type VersionContent,
} from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { ProblemError, refused } from '../../errors';
import { requireRevision } from '../../http/revision';
import { nothing, type Route, route } from '../../http/route';
import { findBench } from '../benches';
import { findLab } from '../labs';
import { findProtocolToChange, type StoredProtocol, updateDraft } from './draft-store';
import { protocolParams } from './protocol-params';
import { findVersion } from './version-store';

/** One step from a version to a draft that is solved with the calibrations of now. */
export function draftFromVersionRoute(): Route {
  return route({
    method: 'post',
    path: '/labs/:labId/protocols/:protocolId/draft/from-version',
    access: { kind: 'member', action: 'protocols.write', thing: findProtocolToChange },
    params: protocolParams,
    query: nothing,
    body: draftFromVersionSchema,
    response: draftSchema,
    needsMatch: true,
    handler: async ({ body, thing, labId, user, transaction, audit, now, expectedRevision }) => {
      requireRevision(expectedRevision, thing.draft.revision, thing.draft);
      const { number, replace } = body;
      const version = await findVersion(transaction, { labId, protocolId: thing.id, number });
      if (version === null) {
        throw refused([{ path: 'number', message: `This protocol has no version ${number}.` }]);
      }
      const wanted = await asDraft(transaction, labId, thing.draft.content, version.content);
      if (sameIntent(wanted, thing.draft.content)) {
        return { body: thing.draft, revision: thing.draft.revision, unchanged: true };
      }
      if (!replace) await requireNothingLost(transaction, labId, thing, number);
      const draft = await updateDraft(transaction, { labId, user, now }, thing, wanted);
      await audit({
        kind: 'draft.begun-from-version',
        subjectId: thing.id,
        details: {
          number,
          contentHash: version.summary.contentHash,
          revision: draft.revision,
          replaced: thing.draft.content,
        },
      });
      return { body: draft, revision: draft.revision };
    },
  });
}

/** @throws ProblemError 422 where the version's bench is retired. */
async function asDraft(
  transaction: Transaction,
  labId: string,
  draft: DraftContent,
  version: VersionContent,
): Promise<DraftContent> {
  const lab = await findLab(transaction, { labId });
  const bench = await findBench(transaction, { labId, benchId: version.bench.id });
  if (lab === null || bench === null) throw new Error("a version's lab and bench are there by foreign key");
  if (bench.retiredAt !== null) {
    throw refused([
      {
        path: 'number',
        message: `${bench.name}, the bench of this version, is retired. Return it to use first.`,
      },
    ]);
  }
  const plateIds = bench.order.filter(({ part }) => part === 'preparation').map(({ plateId }) => plateId);
  return draftFromVersion(version, { draft, convention: lab.convention, plateIds });
}

/** @throws ProblemError 409 naming both sides, where the draft holds what no version does. */
async function requireNothingLost(
  transaction: Transaction,
  labId: string,
  { id: protocolId, draft, latestVersion }: StoredProtocol,
  number: number,
): Promise<void> {
  const newest =
    latestVersion === null
      ? null
      : await findVersion(transaction, { labId, protocolId, number: latestVersion.number });
  if (newest !== null) {
    const asNewest = await asDraft(transaction, labId, draft.content, newest.content);
    if (sameIntent(asNewest, draft.content)) return;
  }
  throw new ProblemError(
    'draft-moved-on',
    409,
    `The draft of ${draft.content.name}, saved by ${draft.savedBy}, holds changes that are in no version. Version ${number} would take their place. Open the draft and save a version of it, or say that it may be replaced.`,
    { current: draft },
  );
}
