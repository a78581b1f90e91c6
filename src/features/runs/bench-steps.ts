import { type DialDirection, dialDecimals } from '../../../shared/optics/dial';
import { wrapSigned } from '../../../shared/optics/units';
import { type SeenMove, seenMove, type ViewedFrom } from '../../components/dial-words';

/** What a step needs of a plate's mount. */
export interface StepMount {
  /** +1: the numbers rise as the mount is turned counter-clockwise, seen by the receiver. */
  readonly direction: DialDirection;
  readonly resolutionDeg: number;
}

/**
 * What one plate has to do at one setting.
 * now: the one to turn; waits: turned after it; dialled: confirmed at this setting; stays: already reads what is wanted.
 */
export type PlateState = 'now' | 'waits' | 'dialled' | 'stays';

export interface PlateStep {
  readonly plateIndex: number;
  readonly state: PlateState;
  readonly wantedDeg: number;
  /** What the dial says now, as far as anyone has said. */
  readonly standsDeg: number | null;
  /** The turn as the person sees it from where they stand; null where nobody has said how the dial stands. */
  readonly move: SeenMove | null;
}

/** Does a dial that says this already show the wanted mark, to half the finest step it can be set to? */
export function alreadyReads(standsDeg: number, wantedDeg: number, resolutionDeg: number): boolean {
  // The small share lets 0.05 on a 0.1 scale count, whichever way binary fractions round it.
  return Math.abs(wrapSigned(standsDeg - wantedDeg, 360)) < resolutionDeg / 2 + resolutionDeg * 1e-6;
}

export interface SettingSteps {
  /** In beam order. */
  readonly plates: readonly PlateStep[];
  /** The plate to turn now; null when every dial says what it should, or what was kept. */
  readonly now: PlateStep | null;
  /** What every dial says, in beam order; null while one has still to be turned. */
  readonly dialledDeg: readonly number[] | null;
}

export interface SettingInput {
  readonly mounts: readonly StepMount[];
  /** The setting's dials, in beam order. */
  readonly wantedDeg: readonly number[];
  /** Where the dials stood when the setting was opened. */
  readonly standingDeg: readonly (number | null)[];
  /** What has been confirmed at this setting; null for a plate that has not. */
  readonly confirmedDeg: readonly (number | null)[];
  readonly side: ViewedFrom;
}

/** The steps of one setting: each plate that must turn, in beam order, then nothing left but to record. */
export function settingSteps({
  mounts,
  wantedDeg,
  standingDeg,
  confirmedDeg,
  side,
}: SettingInput): SettingSteps {
  let openPlate: PlateStep | null = null;
  const plates = mounts.map((mount, plateIndex): PlateStep => {
    const wanted = wantedDeg[plateIndex];
    if (wanted === undefined) throw new RangeError(`The setting has no dial for plate ${plateIndex + 1}.`);
    const confirmed = confirmedDeg[plateIndex] ?? null;
    const stood = standingDeg[plateIndex] ?? null;
    const base = { plateIndex, wantedDeg: wanted };
    if (confirmed !== null) return { ...base, state: 'dialled', standsDeg: confirmed, move: null };
    const move = stood === null ? null : seenMove(stood, wanted, mount.direction, side);
    if (stood !== null && alreadyReads(stood, wanted, mount.resolutionDeg)) {
      return { ...base, state: 'stays', standsDeg: stood, move: null };
    }
    const step: PlateStep = { ...base, state: openPlate === null ? 'now' : 'waits', standsDeg: stood, move };
    openPlate ??= step;
    return step;
  });
  const dialledDeg = plates.flatMap(({ state, standsDeg }) =>
    (state === 'dialled' || state === 'stays') && standsDeg !== null ? [standsDeg] : [],
  );
  return { plates, now: openPlate, dialledDeg: dialledDeg.length === plates.length ? dialledDeg : null };
}

/** How many decimals a number on this dial is written with: its resolution's, or more where somebody read it finer. */
export function decimalsOf(resolutionDeg: number, ...dialsDeg: readonly number[]): number {
  return Math.max(dialDecimals(resolutionDeg), ...dialsDeg.map((dial) => decimalsIn(dial)));
}

function decimalsIn(value: number): number {
  const fraction = value.toFixed(3).replace(/0+$/, '').split('.')[1];
  return fraction?.length ?? 0;
}
