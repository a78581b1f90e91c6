import { listed } from '../../../shared/words';
import type { Robustness } from '../../../shared/optics/robust';
import { type Convention, describeConvention, toDegrees } from '../../../shared/optics';
import {
  fixed,
  formatDial,
  formatTheta,
  groupDigits,
  infidelityAscii,
  thinGap,
  toPlainAscii,
  withTrueMinus,
} from '../../lib/format';
import { type Design, dialledInfidelity, dialsOf, type PlainDesign } from './design';
import type { ErrorKind } from './robust-form';

/** What a setting does about the error. */
export function effectWords({ cancelledOrders }: Pick<Robustness, 'cancelledOrders'>): string {
  switch (cancelledOrders) {
    case 0:
      return 'reduces it';
    case 1:
      return 'cancels first order';
    case 2:
      return 'cancels second order too';
    case 3:
      return 'cancels up to third order';
    default:
      return `cancels ${cancelledOrders} orders or more`;
  }
}

/** How often a setting's average 1 − F goes into the plain one's: "12 times better". */
export function ratioWords(setting: number, plain: number): string {
  if (!(setting > 0) || !(plain > 0))
    return setting < plain ? 'better, to rounding' : 'the same, to rounding';
  const better = plain >= setting;
  const ratio = better ? plain / setting : setting / plain;
  if (ratio < 1.005) return 'the same';
  if (ratio >= 1e6) return `more than a million times ${better ? 'better' : 'worse'}`;
  return `${timesWords(ratio)} times ${better ? 'better' : 'worse'}`;
}

function timesWords(ratio: number): string {
  if (ratio < 10) return fixed(ratio, ratio < 2 ? 2 : 1);
  return groupDigits(fixed(Number(ratio.toPrecision(2)), 0));
}

/** An error with its unit: "−5 %", "0.4 nm". */
export function errorWords(error: number, kind: ErrorKind): string {
  const shown = kind === 'retardance' ? error * 100 : error;
  const text = withTrueMinus(String(Number(shown.toPrecision(3))));
  return `${text}${thinGap}${kind === 'retardance' ? '%' : 'nm'}`;
}

export function errorName(kind: ErrorKind): string {
  return kind === 'retardance' ? 'common relative error ε of the retardances' : 'error ε of the wavelength';
}

/** What the plain solution is: whose plates, at which angles. */
export function plainWords({ kind, names, plates }: PlainDesign, shortfallDeg = 0): string {
  const angles = listed(plates.map(({ fastAxisRad }) => `${formatTheta(toDegrees(fastAxisRad))}°`));
  const which = `${listed(names)}${kind === 'fewest' && names.length === 1 ? ' alone' : ''} at ${angles}`;
  if (shortfallDeg > 0) return `the nearest that the plates come: ${which}`;
  return kind === 'bench' ? `what the designer puts first for these plates: ${which}` : which;
}

/** The setting in plain ASCII, to be pasted into a logbook or a script; `convention` is the one that the goal is written in. */
export function copiedText(design: Design, convention: Convention): string {
  const { named, plates, robustness, error, width, goalWords, title } = design;
  const { infidelityAtZero, averageInfidelity } = robustness;
  const dialled = dialledInfidelity(design);
  const dialsDeg = dialsOf(
    named,
    plates.map(({ fastAxisRad }) => toDegrees(fastAxisRad)),
  );
  const lines = named.map(({ name, retardanceDeg, scale }, k) => {
    const fastAxisRad = plates[k]?.fastAxisRad;
    const theta = formatTheta(fastAxisRad === undefined ? null : toDegrees(fastAxisRad));
    const dial = scale === null ? '' : `, dial ${formatDial(dialsDeg?.[k] ?? null, scale.resolutionDeg)}`;
    return `${name}: retardance ${Number(retardanceDeg.toFixed(4))} deg, fast axis ${theta} deg${dial}`;
  });
  const over =
    error === 'retardance' ? `${Number((width * 100).toPrecision(6))} % of every retardance` : `${width} nm`;
  const text = [
    `${title}, for ${goalWords}`,
    `written in: ${describeConvention(convention)}`,
    'plates in beam order; angles counter-clockwise from H as the receiver sees them',
    ...lines,
    design.meetsGoal
      ? 'these angles meet the goal at no error'
      : `these angles at no error: 1 - F ${infidelityAscii(infidelityAtZero)}`,
    ...(dialled === null ? [] : [`these dials at no error: 1 - F ${infidelityAscii(dialled)}`]),
    `average of 1 - F of these angles over +-${over}: ${infidelityAscii(averageInfidelity)}`,
  ].join('\n');
  return toPlainAscii(text).replaceAll('°', ' deg').replaceAll('’', "'").replaceAll('ω', 'w');
}
