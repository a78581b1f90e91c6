import type { RelianceReport, WaitingItem } from '../../../shared/schemas';
import type { StaleVersion } from '../reliance';

type StaleItem = Extract<WaitingItem, { kind: 'stale-versions' }>;
type Subject = StaleItem['subject'];

/** One item for each plate that left versions behind, and for each bench whose light or beam did without one. */
export function staleItems(stale: readonly StaleVersion[]): StaleItem[] {
  const bySubject = new Map<string, { readonly subject: Subject; readonly reports: RelianceReport[] }>();
  for (const { bench, report } of stale) {
    for (const subject of subjectsOf(bench, report)) {
      const known = bySubject.get(subject.id);
      if (known === undefined) bySubject.set(subject.id, { subject, reports: [report] });
      else known.reports.push(report);
    }
  }
  return [...bySubject.values()].map(({ subject, reports }) => ({
    kind: 'stale-versions',
    subject,
    versionCount: reports.length,
    asDialled: asDialled(reports),
    voidCount: reports.filter(({ oldDials }) => oldDials === null).length,
  }));
}

function subjectsOf(bench: StaleVersion['bench'], { plates }: RelianceReport): Subject[] {
  const changed = plates.flatMap((plate): Subject[] =>
    plate.change === 'same'
      ? []
      : [
          {
            kind: 'plate',
            id: plate.plateId,
            name: plate.plateName,
            change: plate.change,
            zeroShiftDeg: plate.zeroShiftDeg,
            zeroShiftSigmaDeg: plate.zeroShiftSigmaDeg,
          },
        ],
  );
  return changed.length > 0 ? changed : [{ kind: 'bench', ...bench }];
}

function asDialled(reports: readonly RelianceReport[]): StaleItem['asDialled'] {
  const told = reports.map(({ oldDials }) => oldDials).filter((tally) => tally !== null);
  const [first, ...others] = told;
  if (first === undefined) return null;
  const { worst } = others.reduce(
    (most, tally) => (tally.worst.infidelity > most.worst.infidelity ? tally : most),
    first,
  );
  return {
    outCount: told.reduce((sum, { out }) => sum + out, 0),
    worstInfidelity: worst.infidelity,
    worstLabel: worst.label === '' ? `row ${worst.row}` : worst.label,
  };
}
