import { calibrationDue, WARNED_DAYS } from '../../../shared/calibration-due';
import type { Transaction } from '../../db/database';
import { queueMail } from '../../mail';
import { findPlatesInBeams } from '../cabinet';
import { findLab } from '../labs';
import { dueMail, type DuePlate } from './due-mail';
import { measurers, noteFirst } from './notice-store';
import { keepsCabinet, reachableMembers } from './recipients';

export interface Telling {
  readonly labId: string;
  /** Where the links of a mail lead. */
  readonly publicOrigin: string;
  readonly now: Date;
}

/**
 * Writes one mail to each lead and designer, and to whoever measured it last, about the plates in the beam of a bench in use
 * that fall due within the warned days or are overdue: once for each calibration and stage.
 */
export async function tellWhatIsDue(transaction: Transaction, telling: Telling): Promise<void> {
  const { labId, publicOrigin, now } = telling;
  const lab = await findLab(transaction, { labId });
  if (lab === null) return;
  const due = (await findPlatesInBeams(transaction, labId)).flatMap((plate) => {
    if (plate.calibration === null) return [];
    const { daysLeft, dueAt } = calibrationDue(plate.calibration.measuredAt, lab.calibrationDueDays, now);
    if (daysLeft > WARNED_DAYS) return [];
    const told: DuePlate = {
      plateId: plate.id,
      plateName: plate.name,
      measuredAt: new Date(plate.calibration.measuredAt),
      dueAt,
      daysLeft,
      benchNames: plate.benches.map(({ name }) => name),
    };
    return [{ calibrationId: plate.calibration.id, plate: told }];
  });
  const measuredBy = await measurers(
    transaction,
    labId,
    due.map(({ calibrationId }) => calibrationId),
  );
  const members = await reachableMembers(transaction, labId);
  const concerns = (member: (typeof members)[number], calibrationId: string) =>
    keepsCabinet(member) || measuredBy.get(calibrationId) === member.userId;
  // Where nobody can be written to, somebody may be tomorrow.
  const tellable = due.filter(({ calibrationId }) =>
    members.some((member) => concerns(member, calibrationId)),
  );
  const idsOf = (overdue: boolean) =>
    tellable.filter(({ plate }) => plate.daysLeft < 0 === overdue).map(({ calibrationId }) => calibrationId);
  const first = new Set([
    ...(await noteFirst(transaction, telling, 'due', idsOf(false))),
    ...(await noteFirst(transaction, telling, 'overdue', idsOf(true))),
  ]);
  for (const member of members) {
    const plates = tellable
      .filter(({ calibrationId }) => first.has(calibrationId) && concerns(member, calibrationId))
      .map(({ plate }) => plate)
      .sort((a, b) => a.daysLeft - b.daysLeft);
    if (plates.length === 0) continue;
    const mail = dueMail({ to: member.mailbox, lab, plates, publicOrigin });
    await queueMail(transaction, telling, { toUserId: member.userId, to: member.mailbox, ...mail });
  }
}
