import { listed } from '../../../shared/words';
import type { Mailbox } from '../../mail';
import { countOf, dateWords, greeting } from './words';

/** A plate that falls due or is overdue, as a mail tells of it. */
export interface DuePlate {
  readonly plateId: string;
  readonly plateName: string;
  readonly measuredAt: Date;
  readonly dueAt: Date;
  /** Whole days until it falls due; below 0 when it is overdue. */
  readonly daysLeft: number;
  readonly benchNames: readonly string[];
}

interface DueMail {
  readonly to: Mailbox;
  readonly lab: { readonly id: string; readonly name: string; readonly calibrationDueDays: number };
  readonly plates: readonly DuePlate[];
  readonly publicOrigin: string;
}

function standing({ plateName, daysLeft, dueAt }: DuePlate): string {
  if (daysLeft < 0) return `${plateName} is ${days(-daysLeft)} past its calibration`;
  if (daysLeft === 0) return `${plateName} is due for calibration today`;
  return `${plateName} is due for calibration on ${dateWords(dueAt)}`;
}

const days = (count: number) => (count === 1 ? 'one day' : `${count} days`);

/** Subject and text of the mail that says which plates have to be measured again. */
export function dueMail({ to, lab, plates, publicOrigin }: DueMail) {
  const [first] = plates;
  const subject =
    plates.length === 1 && first !== undefined
      ? standing(first)
      : `${countOf(plates.length, 'plate')} of ${lab.name} are due for calibration`;
  const paragraphs = plates.map((plate) =>
    [
      `${standing(plate)}.`,
      `Last measured ${dateWords(plate.measuredAt)}; it stands in the beam of ${listed(plate.benchNames)}.`,
      `${publicOrigin}/labs/${lab.id}/cabinet/${plate.plateId}`,
    ].join('\n'),
  );
  const closing = `In ${lab.name} a calibration is due ${days(lab.calibrationDueDays)} after it was measured. You are told once when one falls due and once when it is overdue.`;
  return { subject, text: [greeting(to), ...paragraphs, closing, ''].join('\n\n') };
}
