import { classNames } from './class-names';
import { arc, radial } from './polar';

export type SealState =
  'draft' | 'saved' | 'in-review' | 'changes-asked' | 'released' | 'superseded' | 'withdrawn';

/** What each seal is called. */
export const sealWords: Readonly<Record<SealState, string>> = {
  draft: 'draft',
  saved: 'saved',
  'in-review': 'in review',
  'changes-asked': 'changes asked',
  released: 'released',
  superseded: 'superseded',
  withdrawn: 'withdrawn',
};

interface VersionSealProps {
  /** A draft has no number yet. */
  readonly number: number | null;
  readonly state: SealState;
  readonly radius?: number;
  /** Beside words that already say which version in which state. */
  readonly decorative?: boolean;
  readonly className?: string | undefined;
}

/** A version's place in its life. A quarter arc is a version that waits for approval; approval closes the circle. */
export function VersionSeal({ number, state, radius = 17, decorative = false, className }: VersionSealProps) {
  const extent = radius * 1.34;
  const gone = state === 'withdrawn';
  const accessible = decorative
    ? { 'aria-hidden': true }
    : { role: 'img', 'aria-label': number === null ? 'draft' : `version ${number}, ${sealWords[state]}` };
  return (
    <svg
      {...accessible}
      viewBox={`${-extent} ${-extent} ${2 * extent} ${2 * extent}`}
      width={2 * extent}
      height={2 * extent}
      className={classNames('shrink-0 overflow-visible', className)}
    >
      <SealRings {...{ state, radius }} />
      <text
        textAnchor="middle"
        dominantBaseline="central"
        fontSize={radius * 0.79}
        className={classNames('font-mono font-section', gone ? 'fill-ink-3' : 'fill-ink')}
      >
        {number ?? '–'}
      </text>
      {gone && (
        <path
          d={radial(0, radius * 1.3, 45) + radial(0, radius * 1.3, 225)}
          className="stroke-fault"
          strokeWidth="1.6"
        />
      )}
    </svg>
  );
}

function SealRings({ state, radius }: { readonly state: SealState; readonly radius: number }) {
  const thick = radius * 0.2;
  switch (state) {
    case 'draft':
      return (
        <circle r={radius} fill="none" className="stroke-ink" strokeWidth="1.2" strokeDasharray="3 2.4" />
      );
    case 'saved':
    case 'withdrawn':
      return (
        <circle
          r={radius}
          fill="none"
          className={state === 'saved' ? 'stroke-ink' : 'stroke-ink-3'}
          strokeWidth="1.2"
        />
      );
    case 'in-review':
      return (
        <g fill="none">
          <circle r={radius} className="stroke-ink" strokeWidth="1.2" />
          <path d={arc(radius + thick * 0.3, 90, -90)} className="stroke-beam" strokeWidth={thick} />
          <path
            d={radial(radius * 0.8, radius * 1.22, 90) + radial(radius * 0.76, radius * 1.22, 0)}
            className="stroke-ink"
            strokeWidth="1.2"
          />
        </g>
      );
    case 'changes-asked':
      return (
        <g fill="none">
          <circle r={radius} className="stroke-ink" strokeWidth="1.2" />
          <path
            d={arc(radius, 2, -92)}
            className="stroke-fault"
            strokeWidth={thick}
            strokeDasharray={`${radius * 0.2} ${radius * 0.1}`}
          />
        </g>
      );
    case 'released':
      return (
        <g fill="none" className="stroke-ink">
          <circle r={radius} strokeWidth="2" />
          <circle r={radius * 0.78} strokeWidth="0.8" />
          <path
            d={Array.from({ length: 12 }, (_, index) => radial(radius, radius * 1.22, index * 30)).join('')}
            strokeWidth="1.2"
          />
        </g>
      );
    case 'superseded':
      return (
        <g fill="none" className="stroke-ink">
          <circle r={radius} strokeWidth="1.1" />
          <circle r={radius * 0.79} strokeWidth="0.7" />
        </g>
      );
  }
}
