import { AgeRing } from './AgeRing';
import { polar } from './polar';

/** How far a plate can be trusted. */
type Health =
  'calibrated' | 'due' | 'overdue' | 'open-question' | 'not-calibrated' | 'not-seated' | 'retired';

const radius = 8;

/** Of a due time of 100 days: what the arc shows. */
const ages: Readonly<Record<Health, number | null>> = {
  calibrated: 34,
  due: 96,
  overdue: 130,
  'open-question': 34,
  'not-calibrated': null,
  'not-seated': null,
  retired: null,
};

/** A plate's health as a small mount, for a list: each state has a shape of its own, and its word stands beside it. */
export function HealthSign({ health, className }: { readonly health: Health; readonly className?: string }) {
  const struck = polar(radius * 1.35, 45);
  return (
    <span className={`relative inline-flex shrink-0 items-center justify-center ${className ?? ''}`}>
      <AgeRing
        radius={radius}
        fastAxisDeg={health === 'not-seated' || health === 'not-calibrated' ? null : 24}
        dashed={health === 'not-seated'}
        ageDays={ages[health]}
        dueDays={100}
        unsettled={health === 'open-question'}
      />
      {health === 'retired' && (
        <svg
          aria-hidden="true"
          viewBox="-12 -12 24 24"
          width="24"
          height="24"
          className="absolute overflow-visible"
        >
          <path
            d={`M${-struck[0]} ${-struck[1]}L${struck[0]} ${struck[1]}`}
            className="stroke-ink"
            strokeWidth="1.6"
          />
        </svg>
      )}
    </span>
  );
}
