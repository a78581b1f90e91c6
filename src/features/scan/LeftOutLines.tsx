import { useState } from 'react';
import type { LeftOut } from '../../../shared/schemas/scans';
import { announce } from '../../components/live-region-store';
import { TextButton } from '../../components/TextLink';
import { LeaveOutReason, withLine } from './LeaveOutReason';
import { type FittedScan, plottedPoints } from './scan-points';
import { sigmaWords } from './scan-words';

/** Suspected rows that are listed; the rest is counted. */
const MOST_LISTED = 20;

interface LeftOutLinesProps {
  readonly scan: FittedScan;
  readonly leftOut: readonly LeftOut[];
  readonly onChange: (leftOut: readonly LeftOut[]) => void;
}

/** Rows that look wrong and rows left out. No fit leaves a row out: a person does, and writes why. */
export function LeftOutLines({ scan, leftOut, onChange }: LeftOutLinesProps) {
  const suspected = plottedPoints(scan).filter(({ isUsed, isSuspected }) => isUsed && isSuspected);
  const [asked, setAsked] = useState<number | 'other' | null>(null);
  const lines = new Set(scan.table.points.map(({ line }) => line));
  const leave = (row: LeftOut) => {
    setAsked(null);
    announce(`Line ${row.line} is left out.`);
    onChange(withLine(leftOut, row));
  };
  const problemOf = (line: number): string | null => {
    if (!lines.has(line)) return `Line ${line} holds no row of the scan. Look at the lines in the table.`;
    return leftOut.some((one) => one.line === line) ? `Line ${line} is left out already.` : null;
  };
  return (
    <section aria-label="Rows left out" className="mt-4">
      {suspected.length > 0 && (
        <>
          <p className="font-strong">
            {suspected.length === 1 ? 'One row looks' : `${suspected.length} rows look`} wrong, ringed above.
          </p>
          <ul>
            {suspected.slice(0, MOST_LISTED).map(({ line, dialDeg, residualSigmas }) => (
              <li key={line} className="border-hair border-b py-1.5">
                <span className="flex flex-wrap justify-between gap-x-4">
                  Line {line}, dial {dialDeg}: {sigmaWords(Math.abs(residualSigmas))}{' '}
                  {residualSigmas > 0 ? 'above' : 'below'} the curve
                  <TextButton
                    aria-expanded={asked === line}
                    onClick={() => setAsked(asked === line ? null : line)}
                  >
                    Leave line {line} out…
                  </TextButton>
                </span>
                {asked === line && (
                  <LeaveOutReason
                    line={line}
                    onLeave={leave}
                    onKeep={() => setAsked(null)}
                    problemOf={problemOf}
                  />
                )}
              </li>
            ))}
          </ul>
          {suspected.length > MOST_LISTED && (
            <p className="text-ink-2">And {suspected.length - MOST_LISTED} more: is it the right file?</p>
          )}
        </>
      )}
      <LeftOutList leftOut={leftOut} onChange={onChange} />
      <p className="mt-2">
        <TextButton
          aria-expanded={asked === 'other'}
          onClick={() => setAsked(asked === 'other' ? null : 'other')}
        >
          Leave {suspected.length > 0 ? 'another' : 'a'} line out…
        </TextButton>
      </p>
      {asked === 'other' && (
        <LeaveOutReason line={null} onLeave={leave} onKeep={() => setAsked(null)} problemOf={problemOf} />
      )}
    </section>
  );
}

/** What is left out and why, each to be put back. */
export function LeftOutList({ leftOut, onChange }: Omit<LeftOutLinesProps, 'scan'>) {
  if (leftOut.length === 0) return null;
  return (
    <>
      <p className="font-strong mt-3">Left out</p>
      <ul>
        {leftOut.map(({ line, why }) => (
          <li key={line} className="border-hair flex flex-wrap justify-between gap-x-4 border-b py-1.5">
            <span className="min-w-0 break-words">
              Line {line}: {why}
            </span>
            <TextButton onClick={() => onChange(leftOut.filter((one) => one.line !== line))}>
              Put line {line} back
            </TextButton>
          </li>
        ))}
      </ul>
    </>
  );
}
