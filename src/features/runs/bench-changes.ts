import { type Convention, infidelityBetween, parseState } from '../../../shared/optics';
import type { Bench } from '../../../shared/schemas/benches';
import type { FrozenPlate, VersionContent } from '../../../shared/schemas/versions';
import { formatDate } from '../../lib/format';
import { elsewhereSentence, usedElsewhere } from '../benches';

const gap = '\u202f';

/** Two ways of writing one state differ by rounding alone below this 1 − F. */
const sameStateInfidelity = 1e-12;

/** The plate that a version froze at one place of its beam, against the same place now. */
function plateChanges(frozen: FrozenPlate, index: number, bench: Bench): string[] {
  const { name } = frozen;
  if (bench.order[index]?.plateId !== frozen.id) {
    return [`${name} no longer stands in its place at ${bench.name}. This version’s dials are for it.`];
  }
  const waits = bench.notReady.find(({ plateId }) => plateId === frozen.id);
  if (waits !== undefined) {
    return [
      waits.why === 'not-seated'
        ? `${name} was taken out of its mount. This version’s dials are void: a zero holds for one seat.`
        : `${name} was seated anew and is not calibrated yet. This version’s dials are void.`,
    ];
  }
  const live = bench.plates.find(({ id }) => id === frozen.id);
  // Not shown as long as another plate of the beam is not ready, which is said of that one.
  if (live === undefined) return [];
  const changes: string[] = [];
  if (live.calibration.id !== frozen.calibration.id) {
    changes.push(
      `${name} has a newer calibration, of ${formatDate(new Date(live.calibration.measuredAt))}. This version’s dials are for the older one: save a new version to use it.`,
    );
  }
  if (live.mount.direction !== frozen.mount.direction) {
    const way = live.mount.direction === 1 ? 'counter-clockwise' : 'clockwise';
    changes.push(
      `The numbers of ${name}’s mount now rise when it is turned ${way}. This version’s dials are for the other way, so that every one of them is another angle: save a new version.`,
    );
  }
  if (live.mount.resolutionDeg !== frozen.mount.resolutionDeg) {
    changes.push(
      `The finest step of ${name}’s dial is now ${live.mount.resolutionDeg}°. This version’s dials are rounded to ${frozen.mount.resolutionDeg}°.`,
    );
  }
  return changes;
}

function inputChange(content: VersionContent, live: Bench, convention: Convention): string[] {
  const { input, name } = content.bench;
  const now = parseState(live.inputExpression, convention);
  if (!now.ok) {
    return [
      `The input of ${name} is now written “${live.inputExpression}”, which cannot be read. This version’s dials are for ${input.expression}.`,
    ];
  }
  if (infidelityBetween(now.stokes, input.stokes) < sameStateInfidelity) return [];
  return [
    `The input of ${name} is now ${live.inputExpression}. This version’s dials are for ${input.expression}.`,
  ];
}

/** The plates that a version froze with a calibration of another wavelength than its bench's, in sentences. */
export function frozenElsewhere({ bench }: VersionContent): string[] {
  return bench.plates
    .filter((plate) => usedElsewhere(plate, plate.used, bench))
    .map((plate) => elsewhereSentence(plate, plate.used, bench));
}

/** What became of the bench since a version froze it, in sentences; its input is written in the lab's convention. */
export function benchChanges(content: VersionContent, live: Bench, convention: Convention): string[] {
  const { bench } = content;
  const changes: string[] = [];
  if (live.retiredAt !== null) {
    changes.push(`${bench.name} was retired on ${formatDate(new Date(live.retiredAt))}.`);
  }
  changes.push(...bench.plates.flatMap((frozen, index) => plateChanges(frozen, index, live)));
  if (live.wavelengthNm !== bench.wavelengthNm) {
    changes.push(
      `${bench.name} now works at ${live.wavelengthNm}${gap}nm. This version’s dials are for ${bench.wavelengthNm}${gap}nm.`,
    );
  }
  return [...changes, ...inputChange(content, live, convention)];
}
