import {
  type FaultHarmonic,
  type OpenQuestion,
  type ScanWarning,
  SETTLED_SIGMA,
} from '../../../shared/optics/calibration';
import { wrapSigned } from '../../../shared/optics/units';
import type { Calibration } from '../../../shared/schemas/calibrations';
import { unitLabel } from '../../../shared/scan-file';
import { formatAngle, formatUncertain } from '../../lib/format';
import type { FittedScan } from './scan-points';

const angle = (valueDeg: number, sigmaDeg: number): string => `${formatUncertain(valueDeg, sigmaDeg)}°`;

/** A distance in σ as a sentence says it. */
export const sigmaWords = (sigmas: number): string =>
  `${sigmas < 10 ? sigmas.toFixed(1) : sigmas.toFixed(0)}σ`;

/** The quantity that the plot shows. */
export function valueWords({ found, table }: FittedScan): string {
  const unit = table.powerUnit === 'arbitrary' ? 'in the file’s unit' : unitLabel(table.powerUnit);
  if (found.kind === 'known') return `power behind the analyser, ${unit}`;
  const { ports } = found.fit;
  return ports === 'both'
    ? 'share of power behind the crossed polariser, P⊥/(P⊥ + P∥)'
    : `power behind the ${ports} polariser, ${unit}`;
}

/** "between crossed polarisers": how the light went, after a number of points. */
export function lightWords({ found }: FittedScan): string {
  if (found.kind === 'known') return 'behind known light';
  const { ports } = found.fit;
  return `between ${ports === 'both' ? 'crossed and parallel' : ports} polarisers`;
}

/** The plot in a sentence. */
export function scanSummary(scan: FittedScan, plateName: string): string {
  const { values, found } = scan;
  const used = found.fit.rows.filter(({ isUsed }) => isUsed).length;
  const left = found.fit.rows.length - used;
  const dials = scan.table.points.map(({ dialDeg }) => dialDeg);
  const [low, high] = [Math.min(...dials), Math.max(...dials)];
  const zero = values.openQuestions.includes('axis')
    ? `The zero is ${angle(values.offsetDeg, values.offsetSigmaDeg)} or a quarter turn away`
    : `The zero is ${angle(values.offsetDeg, values.offsetSigmaDeg)}`;
  const retardance =
    values.retardance === null
      ? 'the retardance is not told'
      : `the retardance ${angle(values.retardance.deg, values.retardance.sigmaDeg)}`;
  const worst = found.fit.rows.reduce(
    (far, { isUsed, residualSigmas }) => (isUsed ? Math.max(far, Math.abs(residualSigmas)) : far),
    0,
  );
  return `Scan of ${plateName}: ${used} points ${lightWords(scan)}, readings from ${low} to ${high} degrees${left === 0 ? '' : `, ${left} more left out`}. ${zero}, ${retardance}. The farthest point lies ${sigmaWords(worst)} from the fitted curve.`;
}

/** How far the retardance lies from what material and construction give, or why nothing is known; null without a retardance. */
export function distanceWords(
  { distance, prediction, values: { retardance } }: FittedScan,
  materialName: string,
): string | null {
  if (retardance === null) return null;
  if (distance === null) return prediction.ok ? null : `Nothing to compare with: ${prediction.reason}.`;
  const { deviationDeg, sigmas, larger, verdict, predictedDeg, branch } = distance;
  const size = formatAngle(Math.abs(deviationDeg), 1);
  const side = larger === 'neither' ? 'exactly' : `${size} ${larger === 'measured' ? 'above' : 'below'}`;
  const read = branch === 'other' ? ', read as 360° less' : '';
  const measured = retardance.sigmaDeg > 0 ? Math.abs(deviationDeg) / retardance.sigmaDeg : null;
  const far = measured === null ? '' : `: ${sigmaWords(measured)} of the measurement`;
  const allowed = sigmas === null ? '' : `, ${sigmaWords(sigmas)} with what makers allow`;
  const end = {
    agrees: '',
    'in-between': ' That is much for chance and little for proof.',
    apart: ' Look whether it is tilted, or not the plate that its facts say.',
  }[verdict];
  return `${side} what ${materialName} gives (${formatAngle(predictedDeg, 1)})${read}${far}${allowed}.${end}`;
}

export interface Said {
  readonly head: string;
  readonly text: string;
  /** What settles it. */
  readonly ways: string;
}

/** An open question of a fit: what it is, and what settles it. */
export function openWords(question: OpenQuestion, scan: FittedScan): Said {
  const { values, found } = scan;
  const sigma = values.retardance?.sigmaDeg ?? 0;
  switch (question.kind) {
    case 'axis': {
      const [one, other] = question.offsetsDeg.map((deg) => angle(deg, values.offsetSigmaDeg));
      const why =
        question.sigmas === null || found.kind === 'linear'
          ? 'A scan between polarisers reads the same for both axes.'
          : `This light holds the two apart by ${sigmaWords(question.sigmas)}, and 5σ settle it.`;
      return {
        head: 'Fast or slow?',
        text: `${why} The fast axis lies along H at ${one ?? ''} or at ${other ?? ''}.`,
        ways: 'A scan behind circular or elliptical light settles it, or the mark on the plate’s rim.',
      };
    }
    case 'branch': {
      const [one, other] = question.retardancesDeg.map((deg) => angle(deg, sigma));
      const why = {
        'no-nominal': 'Nothing says what this plate was made to retard here.',
        'half-wave': 'For a half-wave plate the design lies where the two meet and can’t say which it is.',
        blind: 'So near to 180° the design can’t say which it is.',
        'too-close': `The design holds the two apart by ${sigmaWords(question.sigmas ?? 0)}, and 5σ settle it.`,
        'fits-neither': 'The design fits neither of the two.',
      }[question.reason];
      return {
        head: `${one ?? ''} or ${other ?? ''}?`,
        text: `Between polarisers a retardance and 360° less it read the same. ${why}`,
        ways: 'A scan behind circular or elliptical light settles it together with the axis.',
      };
    }
    case 'blind':
      return {
        head: `Near ${question.atDeg}° the retardance is hardly felt`,
        text: `The power changes there with the square of what is missing, so all that can be said is from ${formatAngle(question.fromDeg, 1)} to ${formatAngle(question.toDeg, 1)}, at 95 %.`,
        ways: 'More light or more points make the interval narrower; a plate of known retardance beside it moves the scan to where it feels more.',
      };
    case 'supplement':
      return {
        head: 'δ or 180° − δ?',
        text: `This light holds ${question.readings.map(({ retardanceDeg }) => formatAngle(retardanceDeg, 1)).join(' and ')} apart by ${sigmaWords(question.sigmas)}, and 5σ settle it. So it can’t be recorded.`,
        ways: 'Take a scan between polarisers of this seat together with it, or scan behind elliptical light.',
      };
    case 'retardance':
      return {
        head: 'The retardance is not told',
        text: 'One port by itself tells the zero only.',
        ways:
          question.wants === 'power'
            ? 'State the power that enters, or scan both ports. Recorded so, the retardance of before stays.'
            : 'State the extinction or the power that enters, or scan both ports. Recorded so, the retardance of before stays.',
      };
  }
}

export function warningWords(warning: ScanWarning, { found: { fit } }: FittedScan): string {
  const far = sigmaWords(warning.sigmas);
  switch (warning.kind) {
    case 'misfit':
      return `The points scatter more than their σ allow: χ² ${fit.chiSquared.toFixed(1)} for ${fit.degreesOfFreedom}, ${far} too much. The σ are too small, or the power follows the plate in another way than a retarder’s.`;
    case 'other-light':
      return `No plate makes these powers of the light that is stated: what is left over is ${far} beyond chance, so the zero and the retardance mean nothing yet. Look whether the state, the analyser’s angle, its extinction and the scan that is taken together with it are what stood there.`;
    case 'fault-harmonic':
      return harmonicWords(warning.harmonic, far);
    case 'over-full':
      return `The power swings by ${far} more than any plate can make it. Look whether the ports are swapped or of unequal gain, or the power or the extinction stated wrong.`;
    case 'negative-leak':
      return `Between crossed polarisers less than no light is left, by ${far}. Look whether the dark level was taken off twice, or the ports are of unequal gain.`;
  }
}

function harmonicWords({ hint, perTurn }: FaultHarmonic, far: string): string {
  const turn = perTurn === 1 ? 'once' : 'twice';
  const look =
    hint === 'wedge-or-decentre'
      ? 'The plate may be a wedge, or its axis off the beam.'
      : 'The plate may absorb more along one axis, or the light come in elliptical.';
  return `The power also changes ${turn} a turn, by ${far}, which no retarder does. ${look}`;
}

/** What a zero that moved within one seat says; null where it moved no more than chance and the two scans allow. */
export function movedWarning({ values }: FittedScan, before: Calibration): string | null {
  const { zero, sigma } = zeroMoved(values, before);
  const sigmas = Math.abs(zero) / sigma;
  if (!(sigmas >= SETTLED_SIGMA)) return null;
  return `The zero moved by ${formatAngle(Math.abs(zero), 2)}, ${sigmaWords(sigmas)}, and a plate that stays in its seat keeps its zero. Look whether it was turned or taken out in between (then seat it anew first), and whether the file is this plate’s.`;
}

function zeroMoved(values: FittedScan['values'], before: Calibration) {
  const isQuarter = values.openQuestions.includes('axis') || before.openQuestions.includes('axis');
  return {
    isQuarter,
    zero: wrapSigned(values.offsetDeg - before.offsetDeg, isQuarter ? 90 : 180),
    sigma: Math.hypot(values.offsetSigmaDeg, before.offsetSigmaDeg),
  };
}

/** "zero moved by 0.05(11)°, retardance by −0.3(5)°" since the calibration that stands in this seat. */
export function movedWords({ values }: FittedScan, before: Calibration): string {
  const { isQuarter, zero, sigma } = zeroMoved(values, before);
  const moved = `zero moved by ${angle(zero, sigma)}${isQuarter ? ', if the same axis is meant' : ''}`;
  const { retardance } = values;
  if (retardance === null) return moved;
  const isBranch = values.openQuestions.includes('branch') || before.openQuestions.includes('branch');
  const own = retardance.deg - before.retardanceDeg;
  const other = 360 - retardance.deg - before.retardanceDeg;
  const change = isBranch && Math.abs(other) < Math.abs(own) ? other : own;
  const changeSigma = Math.hypot(retardance.sigmaDeg, before.retardanceSigmaDeg);
  return `${moved}; retardance by ${angle(change, changeSigma)}`;
}
