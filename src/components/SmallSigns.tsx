import type { ReactNode } from 'react';
import { classNames } from './class-names';
import { arc } from './polar';

interface SignProps {
  readonly className?: string | undefined;
}

/** A sign never stands without its word, so all of them are silent. */
function Sign({
  width = 24,
  className,
  children,
}: SignProps & { readonly width?: number; readonly children: ReactNode }) {
  return (
    <svg
      aria-hidden="true"
      viewBox={`${-width / 2} -12 ${width} 24`}
      width={width}
      height="24"
      fill="none"
      className={classNames('inline-block shrink-0 overflow-visible', className)}
    >
      {children}
    </svg>
  );
}

/** Angles are fresh: the two scales' lines meet. */
export function VernierFresh({ className }: SignProps) {
  return (
    <Sign width={36} className={className}>
      <path d="M-17 0H17" className="stroke-ink" strokeWidth="0.9" />
      <path d="M-14 -7V7M-7 -7V7M7 -7V7M14 -7V7" className="stroke-ink" strokeWidth="0.9" />
      <path d="M0 -11V11" className="stroke-ink" strokeWidth="2.2" />
    </Sign>
  );
}

/** Angles are stale: the lines miss. */
export function VernierStale({ className }: SignProps) {
  return (
    <Sign width={36} className={className}>
      <path d="M-17 0H17" className="stroke-ink" strokeWidth="0.9" />
      <path d="M-14 -7V0M-7 -7V0M7 -7V0M14 -7V0" className="stroke-ink" strokeWidth="0.9" />
      <path d="M0 -11V0" className="stroke-ink" strokeWidth="2.2" />
      <path d="M-11 0V7M-4 0V7M10 0V7M17 0V7" className="stroke-fault" strokeWidth="1" />
      <path d="M3 0V11" className="stroke-fault" strokeWidth="2.2" />
    </Sign>
  );
}

/** This solution is held. */
export function HeldSign({ className }: SignProps) {
  return (
    <Sign className={className}>
      <path d="M-8 -8H8L0 3Z" className="fill-ink" />
      <path d="M-8 7H8" className="stroke-ink" strokeWidth="2.4" />
    </Sign>
  );
}

/** Out of reach: an arc that doesn't close. */
export function OutOfReachSign({ className }: SignProps) {
  return (
    <Sign width={32} className={className}>
      <g transform="translate(0 9)">
        <path d={arc(15, 165, -62)} className="stroke-fault" strokeWidth="2.2" />
        <path d={arc(15, 77, -62)} className="stroke-fault" strokeWidth="2.2" />
      </g>
    </Sign>
  );
}

/** Someone is in this row: their initials in a plate. */
export function SomeoneHere({
  initials,
  name,
  className,
}: SignProps & { readonly initials: string; readonly name: string }) {
  return (
    <span
      title={`${name} is here`}
      className={classNames(
        'inline-flex h-5.5 min-w-7 items-center justify-center border border-ink px-1 text-xs font-strong text-ink',
        className,
      )}
    >
      <span aria-hidden="true">{initials}</span>
      <span className="sr-only">{name} is here</span>
    </span>
  );
}

/** Taken out and seated anew: every angle from before is void. */
export function NewSeatSign({ className }: SignProps) {
  return (
    <Sign className={className}>
      <path d="M-6 -8H6" className="stroke-ink" strokeWidth="2.6" />
      <path d="M-2 -8V9M2 -8V9" className="stroke-ink" strokeWidth="1.2" />
    </Sign>
  );
}

/** A scan of a plate, on a time axis. */
export function ScanSign({ className }: SignProps) {
  return (
    <Sign className={className}>
      <path d="M-10 0H10M-6 -4V4M6 -4V4" className="stroke-ink" strokeWidth="1.2" />
      <path d="M0 -8V8" className="stroke-ink" strokeWidth="2" />
    </Sign>
  );
}

/** A run that stands paused at a setting. */
export function PausedRunSign({ className }: SignProps) {
  return (
    <Sign width={40} className={className}>
      <path d="M-19 5H19" className="stroke-ink" strokeWidth="1" />
      <path d="M-17.5 -9V5M-14 -9V5M-10.5 -9V5M-7 -9V5" className="stroke-ink" strokeWidth="2.4" />
      <path
        d="M-3 -1V5M0 -1V5M3 -1V5M6 -1V5M9 -1V5M12 -1V5M15 -1V5M18 -1V5"
        className="stroke-ink"
        strokeWidth="0.9"
      />
      <path d="M-9 7.5H-1L-5 13Z" className="fill-lit stroke-ink" strokeWidth="1" />
    </Sign>
  );
}

/** Which axis is the fast one isn't settled. */
export function UnsettledSign({ className }: SignProps) {
  return (
    <Sign width={36} className={className}>
      <circle r="15.5" className="fill-glass stroke-ink" strokeWidth="1.2" />
      <path d="M-10.8 10.8L-4.5 4.5M4.5 -4.5L10.8 -10.8" className="stroke-ink" strokeWidth="1.7" />
      <path
        d="M-10.8 -10.8L-4.5 -4.5M4.5 4.5L10.8 10.8"
        className="stroke-ink"
        strokeWidth="1.7"
        strokeDasharray="3 2.4"
      />
      <text
        textAnchor="middle"
        dominantBaseline="central"
        fontSize="12"
        className="fill-ink font-mono font-section"
        stroke="none"
      >
        ?
      </text>
    </Sign>
  );
}

/** The one sign that isn't ours: the usual triangle of a caution. */
export function CautionSign({ className }: SignProps) {
  return (
    <Sign className={className}>
      <path d="M0 -9.5L10.5 8.5H-10.5Z" strokeWidth="1.6" strokeLinejoin="round" className="stroke-ink" />
      <path d="M0 -3.6V3" className="stroke-ink" strokeWidth="2" />
      <path d="M0 5V7" className="stroke-ink" strokeWidth="2" />
    </Sign>
  );
}
