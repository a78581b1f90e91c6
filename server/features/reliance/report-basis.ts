import { SOLVER_VERSION } from '../../../shared/optics/solve-target';
import { contentHash, sortedJson } from '../../../shared/protocol/canonical-json';
import type { RelianceNow } from '../../../shared/protocol/reliance';
import type { VersionContent } from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { unseatedPlateIds } from '../beam-changes';
import { findBench } from '../benches';
import { findLab } from '../labs';

/** All that a report of one version is made from but the version itself, which never changes. */
export interface Basis extends RelianceNow {
  /** The same for the same basis: a report that was made from it still holds. */
  readonly signature: string;
}

export async function readBasis(
  transaction: Transaction,
  labId: string,
  content: VersionContent,
): Promise<Basis> {
  const lab = await findLab(transaction, { labId });
  const bench = await findBench(transaction, { labId, benchId: content.bench.id });
  if (lab === null || bench === null) throw new Error("a version's lab and bench are there by foreign key");
  const unseated = await unseatedPlateIds(transaction, labId, content);
  const { convention } = lab;
  return {
    bench,
    convention,
    unseatedPlateIds: unseated,
    signature: contentHash(
      sortedJson({ solver: SOLVER_VERSION, bench, convention, unseated: [...unseated] }),
    ),
  };
}
