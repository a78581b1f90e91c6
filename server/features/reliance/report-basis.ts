import { z } from 'zod';
import { SOLVER_VERSION } from '../../../shared/optics/solve-target';
import { contentHash, sortedJson } from '../../../shared/protocol/canonical-json';
import type { RelianceNow } from '../../../shared/protocol/reliance';
import type { VersionContent } from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { findBench } from '../benches';
import { findLab } from '../labs';

const unseatedRows = z.object({ rows: z.array(z.object({ plate_id: z.string() })) });

/** All that a report of one version is made from but the version itself, which never changes. */
export interface Basis extends RelianceNow {
  /** The same for the same basis: a report that was made from it still holds. */
  readonly signature: string;
}

export async function readBasis(
  transaction: Transaction,
  labId: string,
  { bench: { id: benchId, plates } }: VersionContent,
): Promise<Basis> {
  const lab = await findLab(transaction, { labId });
  const bench = await findBench(transaction, { labId, benchId });
  if (lab === null || bench === null) throw new Error("a version's lab and bench are there by foreign key");
  const found: unknown = await transaction.raw(
    `select s.plate_id from calibrations c join seats s on s.lab_id = c.lab_id and s.id = c.seat_id
      where c.lab_id = ? and c.id = any(?) and s.left_at is not null order by s.plate_id`,
    [labId, plates.map(({ calibration }) => calibration.id)],
  );
  const unseated = unseatedRows.parse(found).rows.map(({ plate_id }) => plate_id);
  const { convention } = lab;
  return {
    bench,
    convention,
    unseatedPlateIds: new Set(unseated),
    signature: contentHash(sortedJson({ solver: SOLVER_VERSION, bench, convention, unseated })),
  };
}
