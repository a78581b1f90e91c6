import type { VersionContent } from '../../../shared/schemas/versions';
import { Scientific } from '../../components/Scientific';
import { parseTypedNumber } from '../../lib/format';
import { dialCost, wantedDials } from './dial-cost';
import { dialText } from './move-words';

export type ReadDial =
  { readonly ok: true; readonly dialDeg: number } | { readonly ok: false; readonly fault: string };

/** What a dial says as it was typed, or one sentence on what to write instead. 360 is the same mark as 0. */
export function readDial(text: string): ReadDial {
  const typed = parseTypedNumber(text);
  if (!typed.ok) {
    if (typed.fault === 'empty') return { ok: false, fault: 'Write the number under the index.' };
    if (typed.fault === 'comma') return { ok: false, fault: 'Write a point for decimals, as in 83.4.' };
    return { ok: false, fault: 'That is not a number. Write it as on the dial, as in 83.4.' };
  }
  if (typed.value < 0 || typed.value > 360) {
    return { ok: false, fault: 'A dial reads from 0 to below 360. Write the number under the index.' };
  }
  return { ok: true, dialDeg: typed.value === 360 ? 0 : typed.value };
}

interface DialAnswerProps {
  readonly content: VersionContent;
  readonly settingIndex: number;
  readonly plateIndex: number;
  readonly typedDeg: number;
  readonly fromDeg: number | null;
  readonly dialsDeg: readonly number[];
}

/** What it costs to keep a number that is not the wanted one. */
export function DialAnswer({
  content,
  settingIndex,
  plateIndex,
  typedDeg,
  fromDeg,
  dialsDeg,
}: DialAnswerProps) {
  const plate = content.bench.plates[plateIndex];
  const wantedDeg = wantedDials(content, settingIndex)[plateIndex];
  if (plate === undefined || wantedDeg === undefined) return null;
  const resolutionDeg = plate.mount.resolutionDeg;
  const typed = dialText(typedDeg, resolutionDeg);
  const wanted = dialText(wantedDeg, resolutionDeg);
  const cost = dialCost({ content, settingIndex, plateIndex, typedDeg, fromDeg, dialsDeg });
  if (cost === null)
    return (
      <p>
        This page cannot work out what {typed} costs. Turn to {wanted}, or keep what you dialled.
      </p>
    );
  if (cost.offDeg < 1e-9) return <p className="bench-answer-head">{wanted} is what the version wants.</p>;
  const change = cost.typedInfidelity - cost.wantedInfidelity;
  return (
    <>
      <p className="bench-answer-head">
        {typed} is {dialText(cost.offDeg, resolutionDeg)}° {cost.side} {wanted}.
      </p>
      <p>
        {change > 0 ? (
          <>
            That costs 1 − F <Scientific value={change} mono={false} />.{' '}
          </>
        ) : (
          <>
            1 − F does not grow: it is <Scientific value={cost.typedInfidelity} mono={false} />.{' '}
          </>
        )}
        {!cost.within && (
          <>
            1 − F is then <Scientific value={cost.typedInfidelity} mono={false} />, not within{' '}
            <Scientific value={content.toleranceInfidelity} mono={false} />.{' '}
          </>
        )}
        Turn once more, or keep what you dialled.
      </p>
    </>
  );
}
