import type { CabinetPlate } from '../../../shared/schemas/cabinet';
import { RingDial } from '../../components/RingDial';
import { formatDial } from '../../lib/format';
import { directionWords } from './mounts/mount-words';

const radius = 95;

/** The mount as it reads with the plate's fast axis along H, or what keeps it from being drawn so. */
export function PlateRing({ plate }: { readonly plate: CabinetPlate }) {
  const { seat, calibration, kind } = plate;
  if (seat === null || calibration === null) {
    return (
      <figure className="flex flex-col items-center">
        <RingDial
          radius={radius}
          kind={kind}
          scale={{ offsetDeg: 0, direction: 1 }}
          readingDeg={0}
          state="empty"
          className="max-w-full"
        />
        <figcaption className="text-ink-2 text-center">
          {seat === null
            ? 'No mount holds it.'
            : `What ${seat.mount.name} reads with the fast axis along H is not known.`}
        </figcaption>
      </figure>
    );
  }
  const open = calibration.openQuestions.includes('axis');
  return (
    <figure className="flex flex-col items-center">
      <div className="relative -mt-3 -mb-5">
        <RingDial
          radius={radius}
          kind={kind}
          scale={{ offsetDeg: calibration.offsetDeg, direction: seat.mount.direction }}
          readingDeg={calibration.offsetDeg}
          state={open ? 'unsettled' : 'standing'}
          className="max-w-full"
        />
        <span aria-hidden="true" className="text-ink-2 absolute top-1/2 right-2 -translate-y-1/2">
          H
        </span>
      </div>
      <figcaption className="text-ink-2 text-center">
        reads <b className="text-ink font-mono">{formatDial(calibration.offsetDeg, 0.01)}</b> when{' '}
        {open ? 'its fast or its slow axis lies along H' : 'its fast axis lies along H'};{' '}
        {directionWords(seat.mount.direction)}
      </figcaption>
    </figure>
  );
}
