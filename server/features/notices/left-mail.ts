import type { RelianceReport, RelianceTally } from '../../../shared/schemas';
import type { Mailbox } from '../../mail';
import type { LeftVersion } from './tell-left';
import { countOf, greeting, infidelityWords } from './words';

interface LeftMail {
  readonly to: Mailbox;
  readonly lab: { readonly id: string; readonly name: string };
  readonly plate: { readonly id: string; readonly name: string };
  readonly versions: readonly LeftVersion[];
  readonly publicOrigin: string;
}

/** Subject and text of the mail that names the versions that a new calibration took out of tolerance. */
export function leftMail({ to, lab, plate, versions, publicOrigin }: LeftMail) {
  const [only] = versions;
  const subject =
    versions.length === 1 && only !== undefined
      ? `${only.protocolName} ${only.number} is out of tolerance since ${plate.name} was calibrated`
      : `${countOf(versions.length, 'version')} are out of tolerance since ${plate.name} was calibrated`;
  const paragraphs = versions.map(({ protocolName, number, report }) =>
    [`${protocolName}, version ${number}`, oldDials(report), resolved(report)].join('\n'),
  );
  return {
    subject: shortened(subject),
    text: [
      greeting(to),
      `${plate.name} was calibrated anew in ${lab.name}. With the dials that these versions hold, targets of theirs are not within tolerance any more.`,
      ...paragraphs,
      `What relies on ${plate.name}, with one step to a new draft of each:\n${publicOrigin}/labs/${lab.id}/cabinet/${plate.id}`,
      '',
    ].join('\n\n'),
  };
}

function shortened(subject: string): string {
  return subject.length <= 200 ? subject : `${subject.slice(0, 199)}…`;
}

function oldDials({ oldDials: tally, targets, toleranceInfidelity }: RelianceReport): string {
  if (tally === null) return 'What its dials make cannot be told.';
  return `As dialled: ${tally.out} of ${countOf(targets.length, 'target')} not within ${infidelityWords(toleranceInfidelity)}, the worst ${worst(tally)}.`;
}

function resolved({ resolved: tally, targets }: RelianceReport): string {
  if (tally === null) return 'It cannot be re-solved until its bench is ready.';
  const within =
    tally.out === 0 ? 'every target within' : `${tally.out} of ${targets.length} still not within`;
  return `Re-solved: ${within}, the worst ${worst(tally)}.`;
}

function worst({ worst: { row, label, infidelity } }: RelianceTally): string {
  return `${label === '' ? `row ${row}` : label} with 1 - F ${infidelityWords(infidelity)}`;
}
