import { listed } from '../../../shared/words';
import type { ReactNode } from 'react';
import type { RelianceReport, RelianceTarget } from '../../../shared/schemas/reliance';
import { Scientific } from '../../components/Scientific';
import { formatAngle } from '../../lib/format';
import { voidReasons } from './void-reasons';

/** Targets that fall less short than this are reached, to whoever reads a tenth of a degree. */
const feltShortDeg = 0.05;
const mostNamed = 3;

/** What a version's dials make now, in one sentence, and what a re-solve would make, in another. */
export interface ReportWords {
  readonly now: ReactNode;
  readonly resolved: ReactNode;
  /** Whether something is not as its tolerance asks, or cannot be told. */
  readonly wrong: boolean;
}

export function reportWords(report: RelianceReport): ReportWords {
  return {
    now:
      report.voids.length > 0
        ? `Its dials are void: ${listed(voidReasons(report.voids))}.`
        : dialWords(report),
    resolved: resolvedWords(report),
    wrong: report.voids.length > 0 || (report.oldDials?.out ?? 0) > report.frozen.out,
  };
}

/** "R and L", or "5 targets" where there are more than one reads at a glance. */
function named(report: RelianceReport, which: (target: RelianceTarget) => boolean) {
  const names = report.targets.flatMap((target, index) =>
    which(target) ? [target.label === '' ? `row ${index + 1}` : target.label] : [],
  );
  return {
    count: names.length,
    words: names.length <= mostNamed ? listed(names) : `${names.length} targets`,
  };
}

function dialWords(report: RelianceReport): ReactNode {
  const { oldDials, toleranceInfidelity } = report;
  if (oldDials === null) return 'What its dials make cannot be told now.';
  const out = named(report, (target) => (target.oldDials ?? 0) > toleranceInfidelity);
  const worst = <Scientific value={oldDials.worst.infidelity} mono={false} />;
  if (out.count === 0) return <>As dialled every target stays within tolerance, the worst 1 − F {worst}.</>;
  return (
    <>
      As dialled {out.words} {out.count === 1 ? 'is' : 'are'} not within tolerance
      {out.count === 1 ? ', 1 − F ' : ', the worst 1 − F '}
      {worst}.
    </>
  );
}

function resolvedWords(report: RelianceReport): ReactNode {
  const { resolved, waits, toleranceInfidelity } = report;
  if (resolved === null) return waits[0] ?? 'It cannot be re-solved now.';
  const worst = <Scientific value={resolved.worst.infidelity} mono={false} />;
  const short = named(report, ({ shortfallDeg }) => (shortfallDeg ?? 0) >= feltShortDeg);
  if (short.count > 0) {
    const mostDeg = Math.max(...report.targets.map(({ shortfallDeg }) => shortfallDeg ?? 0));
    return (
      <>
        Re-solved {short.words} {short.count === 1 ? 'falls' : 'fall'} {formatAngle(mostDeg)} short, 1 − F{' '}
        {worst}.
      </>
    );
  }
  const out = named(report, (target) => (target.resolved ?? 0) > toleranceInfidelity);
  if (out.count > 0)
    return (
      <>
        Re-solved {out.words} {out.count === 1 ? 'is' : 'are'} still not within tolerance, 1 − F {worst}.
      </>
    );
  return <>Re-solved every target is within reach, the worst 1 − F {worst}.</>;
}
