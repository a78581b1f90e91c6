import type { Convention } from '../../shared/optics/convention';
import type { Stokes } from '../../shared/optics/stokes';
import { fixed, formatAngle, thinGap } from '../lib/format';
import { type ReachInput, reachNet, reachRows, shareWhere } from './reach-grid';
import { type OutRegion, outRegions } from './reach-regions';
import { stateInWords } from './state-words';

/** Fine enough for a tenth of a degree beside a pole; a finer map is read at this step. */
const FINEST_NET_DEG = 0.5;

export interface ReachWords {
  readonly outShare: number;
  readonly twoWaysShare: number;
  readonly regions: readonly OutRegion[];
  /** The whole in sentences. */
  readonly text: string;
}

/** How much of the sphere a pair of plates leaves out, and where. Angles are degrees of the sphere. */
export function reachInWords(reach: ReachInput, convention: Convention): ReachWords {
  const rows = reachRows(reach);
  if (rows.length === 0) {
    return { outShare: 0, twoWaysShare: 0, regions: [], text: 'The map of what is reached has no cells.' };
  }
  const outShare = shareWhere(rows, (count) => count === 0);
  const twoWaysShare = shareWhere(rows, (count) => count === 2);
  const regions = outShare === 0 ? [] : outRegions(reachNet(reach, rows, FINEST_NET_DEG));
  const decimals = reach.stepDeg < 1 ? 1 : 0;
  const sentences = [
    outShare === 0
      ? 'Every cell of the map is within reach'
      : `${percent(outShare)} of the sphere is out of reach: ${placesInWords(regions, decimals, (state) => stateInWords(state, convention))}`,
    ...(twoWaysShare === 0 ? [] : [`${percent(twoWaysShare)} is reached in two ways`]),
    `Read off a map with a cell each ${formatAngle(reach.stepDeg, Number.isInteger(reach.stepDeg) ? 0 : 1)} of the sphere; a gap smaller than that can be missed`,
  ];
  return { outShare, twoWaysShare, regions, text: `${sentences.map(capitalised).join('. ')}.` };
}

function capitalised(sentence: string): string {
  return sentence.charAt(0).toUpperCase() + sentence.slice(1);
}

function percent(share: number): string {
  const value = share * 100;
  if (value < 0.1) return `less than 0.1${thinGap}%`;
  return `${fixed(value, value < 10 ? 1 : 0)}${thinGap}%`;
}

/** A boundary that keeps its distance to within half a degree is told by one number. */
const ROUND_WITHIN_DEG = 0.5;
const MOST_PLACES = 4;
/** A piece below this share of all that is out of reach is only counted. */
const SMALL_PIECE = 0.03;

function placesInWords(
  regions: readonly OutRegion[],
  decimals: number,
  name: (state: Stokes) => string,
): string {
  const [first, second] = regions;
  if (
    regions.length === 2 &&
    first !== undefined &&
    second !== undefined &&
    isPole(first.around) &&
    isPole(second.around) &&
    Math.abs(first.farthestDeg - second.farthestDeg) < ROUND_WITHIN_DEG &&
    Math.abs(first.nearestDeg - second.nearestDeg) < ROUND_WITHIN_DEG
  ) {
    return `around both poles ${extent(first, decimals)}`;
  }
  const total = regions.reduce((sum, { share }) => sum + share, 0);
  const named = regions
    .slice(0, MOST_PLACES)
    .filter(({ share }, index) => index === 0 || share >= SMALL_PIECE * total)
    .map((region) => `around ${name(region.around)} ${extent(region, decimals)}`);
  const more = regions.length - named.length;
  return [
    ...named,
    ...(more > 0 ? [more === 1 ? 'and in a smaller place' : `and in ${more} smaller places`] : []),
  ].join('; ');
}

function isPole([, , s3]: Stokes): boolean {
  return Math.abs(s3) > 1 - 1e-9;
}

function extent({ nearestDeg, farthestDeg }: OutRegion, decimals: number): string {
  const [near, far] = [formatAngle(nearestDeg, decimals), formatAngle(farthestDeg, decimals)];
  return farthestDeg - nearestDeg < ROUND_WITHIN_DEG || near === far
    ? `to ${far}`
    : `to between ${near} and ${far}`;
}
