import type { CabinetPlate } from '../../../shared/schemas/cabinet';
import type { WaitingItem } from '../../../shared/schemas/home';
import { AgeRing } from '../../components/AgeRing';
import { RingDial } from '../../components/RingDial';
import { PausedRunSign, VernierStale } from '../../components/SmallSigns';
import { VersionSeal } from '../../components/VersionSeal';
import { calibrationAge, restingAxisDeg } from '../cabinet';

/** A point that is not within: the cross beside the bracket, on its axis. */
function NotWithinSign() {
  return (
    <svg viewBox="-24 -12 48 24" width={48} height={24} aria-hidden="true" fill="none">
      <path d="M-23 0H23M-23 -3V3M23 -3V3" className="stroke-rule" strokeWidth={0.8} />
      <path d="M-9 -4-1 4M-9 4-1 -4" className="stroke-fault" strokeWidth={2.2} />
      <path d="M9 -10H4V10H9" className="stroke-ink" strokeWidth={1.5} />
    </svg>
  );
}

/** What a waiting thing is, drawn; the sentence beside it says the same. */
export function WaitingSign(props: {
  readonly item: WaitingItem;
  readonly cabinet: readonly CabinetPlate[];
  readonly dueDays: number;
  readonly now: Date;
}) {
  const { item, cabinet, dueDays, now } = props;
  switch (item.kind) {
    case 'run-stands':
      return <PausedRunSign />;
    case 'draft-ahead':
      return <VersionSeal number={item.afterVersion} state="draft" radius={17} decorative />;
    case 'dialled-not-within':
      return <NotWithinSign />;
    case 'calibration-due': {
      const plate = cabinet.find(({ id }) => id === item.plateId);
      return (
        <AgeRing
          radius={13}
          fastAxisDeg={plate === undefined ? 0 : restingAxisDeg(plate)}
          ageDays={calibrationAge(item.measuredAt, dueDays, now).ageDays}
          dueDays={dueDays}
        />
      );
    }
    case 'plate-not-ready':
    case 'open-question': {
      const plate = cabinet.find(({ id }) => id === item.plateId);
      const axisDeg = plate === undefined ? null : restingAxisDeg(plate);
      return (
        <AgeRing
          radius={13}
          fastAxisDeg={axisDeg}
          ageDays={null}
          dueDays={dueDays}
          unsettled={item.kind === 'open-question'}
        />
      );
    }
    case 'calibrated-elsewhere':
    case 'stale-versions':
      return <VernierStale />;
    case 'no-plates':
    case 'no-bench':
    case 'no-protocol':
      return (
        <RingDial
          radius={15}
          kind="half"
          scale={{ offsetDeg: 0, direction: 1 }}
          readingDeg={0}
          state="empty"
        />
      );
  }
}
