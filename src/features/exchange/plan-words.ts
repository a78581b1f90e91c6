import { listed } from '../../../shared/words';
import type { ImportPlan } from '../../../shared/cabinet-document';
import { countChanges } from '../../../shared/cabinet-document/count-changes';

/** "1 plate", "12 plates". */
export function counted(count: number, one: string, many = `${one}s`): string {
  return `${count} ${count === 1 ? one : many}`;
}

const some = (count: number, one: string): string[] => (count === 0 ? [] : [counted(count, one)]);

/** What is new, as a list: "3 plates and 12 calibrations". Empty where nothing is. */
export function newWords(plan: ImportPlan): string {
  const counts = countChanges(plan);
  return listed([
    ...some(counts['mount-added'], 'mount'),
    ...some(counts['plate-added'], 'plate'),
    ...some(counts['seat-added'], 'seat'),
    ...some(counts['calibration-added'], 'calibration'),
  ]);
}

/** The verb of the one button: what comes in, or what is changed where nothing does. */
export function importVerb(plan: ImportPlan): string {
  const counts = countChanges(plan);
  const changed = listed([
    ...some(counts['mount-changed'], 'mount'),
    ...some(counts['plate-changed'], 'plate'),
  ]);
  const fresh = newWords(plan);
  if (fresh === '' && changed === '') return `End ${counted(counts['seat-ended'], 'seat')}`;
  if (fresh === '') return `Change ${changed}`;
  return changed === '' ? `Import ${fresh}` : `Import ${fresh}, change ${changed}`;
}

/** All that an import would do, in sentences. */
export function planSentences(plan: ImportPlan): readonly string[] {
  const counts = countChanges(plan);
  const fresh = newWords(plan);
  const changed = listed([
    ...some(counts['mount-changed'], 'mount'),
    ...some(counts['plate-changed'], 'plate'),
  ]);
  const ended = counts['seat-ended'];
  return [
    ...(fresh === '' ? [] : [`New: ${fresh}.`]),
    ...(changed === '' ? [] : [`Changed: ${changed}.`]),
    ...(ended === 0
      ? []
      : [
          `${counted(ended, 'seat')} ${ended === 1 ? 'ends' : 'end'}, and ${ended === 1 ? 'its zero is' : 'their zeros are'} void from then on.`,
        ]),
    ...(plan.refused.length === 0
      ? []
      : [`${counted(plan.refused.length, 'entry', 'entries')} of the file can’t be taken.`]),
    'Nothing is removed.',
  ];
}

/** "12 mounts, 3 plates, 4 seats and 9 calibrations". */
export function unchangedWords({ unchanged }: ImportPlan): string {
  return listed([
    ...some(unchanged.mounts, 'mount'),
    ...some(unchanged.plates, 'plate'),
    ...some(unchanged.seats, 'seat'),
    ...some(unchanged.calibrations, 'calibration'),
  ]);
}

/** Where a fault stands, from the server's path: `rows.3.retardance_deg`, or a path of JSON. */
export function faultPlace(path: string): { readonly row: string; readonly column: string } {
  const [head, row = '', ...rest] = path.split('.');
  if (head === 'rows') return { row, column: rest.join('.') };
  return { row: '', column: path };
}
