import { degrees, radians, toDegrees, toRadians } from '../../../../shared/optics/units';
import { platesAtDials } from '../../../../shared/optics/solve-target';
import { stackQuaternion, type Retarder } from '../../../../shared/optics/retarder';
import { unitaryShortfall } from '../../../../shared/optics/goal';
import { targetPlates, usedRetardance } from '../../../../shared/protocol/solving-plates';
import type { Bench } from '../../../../shared/schemas/benches';
import { Scientific } from '../../../components/Scientific';
import { GapText } from '../../../lib/GapText';
import { calibratedElsewhere, elsewhereSentence } from '../../benches';

/** The turn, in degrees of the sphere, by which the whole stack differs from what the measured values alone would make. */
function movedByDeg(bench: Bench, dialsDeg: readonly number[]): number {
  const used = platesAtDials(targetPlates(bench.plates, bench), dialsDeg);
  const measured = used.map((retarder, k): Retarder => ({
    ...retarder,
    retardanceRad: toRadians(degrees(bench.plates[k]?.calibration.retardanceDeg ?? 0)),
  }));
  const left = unitaryShortfall(stackQuaternion(used), stackQuaternion(measured));
  return toDegrees(radians(2 * Math.asin(Math.sqrt(left))));
}

interface CalibratedElsewhereProps {
  readonly bench: Bench;
  /** Of the selected row; null while none is solved. */
  readonly dialsDeg: readonly number[] | null;
}

/** Says which plates were measured at another wavelength than they are used at, what is made of that, and how much it moves. */
export function CalibratedElsewhere({ bench, dialsDeg }: CalibratedElsewhereProps) {
  const elsewhere = bench.plates.filter((plate) => calibratedElsewhere(plate, bench.wavelengthNm));
  if (elsewhere.length === 0) return null;
  const unmodelled = elsewhere.some((plate) => usedRetardance(plate, bench).source === 'no-model');
  const movedDeg = dialsDeg?.length === bench.plates.length ? movedByDeg(bench, dialsDeg) : null;
  return (
    <div className={`mb-2 text-s ${unmodelled ? 'font-strong text-fault' : 'text-ink-2'}`}>
      {elsewhere.map((plate) => (
        <p key={plate.id} className="m-0">
          <GapText text={elsewhereSentence(plate, usedRetardance(plate, bench), bench.wavelengthNm)} />
        </p>
      ))}
      {movedDeg !== null && movedDeg > 0.005 && (
        <p className="m-0">
          For the selected row that turns the light by {movedDeg.toFixed(2)}° on the sphere against the values
          as measured; left out, it could cost 1 − F up to{' '}
          <Scientific value={Math.sin((movedDeg * Math.PI) / 360) ** 2} />.
        </p>
      )}
    </div>
  );
}
