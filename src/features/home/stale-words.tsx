import type { WaitingItem } from '../../../shared/schemas/home';
import { Scientific } from '../../components/Scientific';
import { formatChange, formatUncertain } from '../../lib/format';
import { countWord } from './count-words';
import type { WaitingWords } from './waiting-words';

type StaleItem = Extract<WaitingItem, { kind: 'stale-versions' }>;

/** Zeros closer than this are one to whoever dials. */
const felt = 0.005;

/** Versions that something they rely on has left behind: what changed, and what their dials make now. */
export function staleWords(item: StaleItem, base: string): WaitingWords {
  const { subject } = item;
  const to = subject.kind === 'plate' ? `${base}/cabinet/${subject.id}` : `${base}/bench`;
  return {
    title: `${versions(item.versionCount)} ${since(item)}`,
    reason: (
      <>
        {moved(subject)}
        {asDialled(item)}
        {voided(item)}
      </>
    ),
    way: { label: subject.kind === 'plate' ? 'See what a re-solve gives' : 'See the benches', to },
  };
}

function versions(count: number): string {
  return count === 1 ? 'One version' : `${countWord(count)} versions`;
}

function since({ subject, versionCount }: StaleItem): string {
  const one = versionCount === 1;
  if (subject.kind === 'bench')
    return `${one ? 'was' : 'were'} solved for other light on the ${subject.name}`;
  const { name, change, zeroShiftDeg } = subject;
  switch (change) {
    case 'seat-ended':
      return `${one ? 'holds' : 'hold'} angles from before ${name}’s new seat`;
    case 'not-in-beam':
      return `${one ? 'holds' : 'hold'} angles for a beam that ${name} stood in`;
    case 'recalibrated': {
      const what = Math.abs(zeroShiftDeg ?? 0) >= felt ? 'zero' : 'calibration';
      return `${one ? 'holds' : 'hold'} angles from before ${name}’s new ${what}`;
    }
  }
}

function moved(subject: StaleItem['subject']): string {
  if (subject.kind === 'bench' || subject.zeroShiftDeg === null || Math.abs(subject.zeroShiftDeg) < felt)
    return '';
  const { name, zeroShiftDeg, zeroShiftSigmaDeg } = subject;
  const shift =
    zeroShiftSigmaDeg === null || zeroShiftSigmaDeg === 0
      ? formatChange(zeroShiftDeg, 2)
      : formatUncertain(zeroShiftDeg, zeroShiftSigmaDeg);
  return `${name}’s zero moved by ${zeroShiftDeg > 0 && !shift.startsWith('+') ? '+' : ''}${shift}°. `;
}

function asDialled({ asDialled: told }: StaleItem) {
  if (told === null) return null;
  return (
    <>
      As dialled now the worst target, {told.worstLabel}, has 1 − F{' '}
      <Scientific value={told.worstInfidelity} mono={false} />;{' '}
      {told.outCount === 0
        ? 'all stay within tolerance.'
        : `${told.outCount === 1 ? 'one target is' : `${String(told.outCount)} targets are`} not within tolerance.`}{' '}
    </>
  );
}

function voided({ voidCount, versionCount }: StaleItem): string {
  if (voidCount === 0) return '';
  if (voidCount === versionCount)
    return versionCount === 1
      ? 'Its dials are void until it is re-solved.'
      : 'Their dials are void until they are re-solved.';
  return `The dials of ${voidCount === 1 ? 'one' : String(voidCount)} are void until re-solved.`;
}
