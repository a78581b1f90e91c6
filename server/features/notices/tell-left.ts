import { z } from 'zod';
import { relianceReportSchema, type RelianceReport } from '../../../shared/schemas';
import type { Transaction } from '../../db/database';
import { queueMail } from '../../mail';
import { findLab } from '../labs';
import { leftMail } from './left-mail';
import { noteFirst } from './notice-store';
import { keepsCabinet, reachableMembers } from './recipients';
import type { Telling } from './tell-due';

const rowsOf = z.object({
  rows: z.array(
    z.object({
      left_by: z.string(),
      plate_id: z.string(),
      plate_name: z.string(),
      protocol_name: z.string(),
      number: z.number(),
      report: z.string(),
    }),
  ),
});

/** A version some of whose targets left tolerance by a calibration. */
export interface LeftVersion {
  readonly protocolName: string;
  readonly number: number;
  readonly report: RelianceReport;
}

/** Writes one mail to each lead and designer about the versions that a new calibration took out of tolerance. */
export async function tellWhoLeftTolerance(transaction: Transaction, telling: Telling): Promise<void> {
  const { labId, publicOrigin } = telling;
  const lab = await findLab(transaction, { labId });
  const found: unknown = await transaction.raw(
    `select r.left_by, p.id as plate_id, p.name as plate_name, v.protocol_name, v.number, r.report
      from reliance_reports r join versions v on v.lab_id = r.lab_id and v.id = r.version_id
      join calibrations c on c.lab_id = r.lab_id and c.id = r.left_by
      join seats s on s.lab_id = c.lab_id and s.id = c.seat_id
      join plates p on p.lab_id = s.lab_id and p.id = s.plate_id
      where r.lab_id = ? and not exists (select 1 from due_notices n
        where n.lab_id = r.lab_id and n.calibration_id = r.left_by and n.stage = 'left-tolerance')
      order by r.left_by, v.protocol_name, v.number`,
    [labId],
  );
  const { rows } = rowsOf.parse(found);
  const members = (await reachableMembers(transaction, labId)).filter(keepsCabinet);
  if (lab === null || members.length === 0) return;
  const first = await noteFirst(
    transaction,
    telling,
    'left-tolerance',
    rows.map(({ left_by }) => left_by),
  );
  for (const calibrationId of first) {
    const left = rows.filter(({ left_by }) => left_by === calibrationId);
    const [row] = left;
    if (row === undefined) continue;
    const plate = { id: row.plate_id, name: row.plate_name };
    const versions = left.map(({ protocol_name, number, report }): LeftVersion => ({
      protocolName: protocol_name,
      number,
      report: relianceReportSchema.parse(JSON.parse(report)),
    }));
    for (const { userId, mailbox } of members) {
      const mail = leftMail({ to: mailbox, lab, plate, versions, publicOrigin });
      await queueMail(transaction, telling, { toUserId: userId, to: mailbox, ...mail });
    }
  }
}
