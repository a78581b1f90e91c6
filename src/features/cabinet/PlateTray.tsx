import { useEffect, useRef } from 'react';
import { Link } from 'react-router-dom';
import type { Plate } from '../../../shared/schemas/cabinet';
import { AgeRing } from '../../components/AgeRing';
import { GapText } from '../../lib/GapText';
import { calibrationAge } from './calibration-age';
import { restingAxisDeg, shortKind } from './plate-words';

/** The plates as rings with their age; the open one is lit and a notch in the rule below points at it. */
export function PlateTray(props: {
  readonly plates: readonly Plate[];
  readonly openId: string | undefined;
  readonly base: string;
  readonly dueDays: number;
  readonly now: Date;
}) {
  const { plates, openId, base, dueDays, now } = props;
  const tray = useRef<HTMLElement>(null);
  const opened = useRef<HTMLLIElement>(null);

  // On a narrow window the tray is longer than the page: the open plate is brought to its middle.
  useEffect(() => {
    const [frame, item] = [tray.current, opened.current];
    if (frame === null || item === null) return;
    frame.scrollLeft = item.offsetLeft - (frame.clientWidth - item.offsetWidth) / 2;
  }, [openId]);

  return (
    <nav ref={tray} aria-label="Plates" className="relative overflow-x-auto">
      <ul className="flex min-w-full">
        {plates.map((plate) => {
          const age = calibrationAge(plate.calibration.measuredAt, dueDays, now);
          const open = plate.id === openId;
          return (
            <li key={plate.id} ref={open ? opened : undefined} className="flex min-w-28 flex-1 flex-col">
              <Link
                to={`${base}/${plate.id}`}
                preventScrollReset
                aria-current={open ? 'page' : undefined}
                className="hover:bg-wash flex flex-1 flex-col items-center px-1 pt-2 pb-3 text-center"
              >
                <AgeRing
                  fastAxisDeg={restingAxisDeg(plate)}
                  ageDays={age.ageDays}
                  dueDays={dueDays}
                  lit={open}
                />
                <span className="font-strong">{plate.name}</span>
                <span className="text-s text-ink-2">
                  <GapText text={shortKind(plate)} />
                </span>
                <span className="sr-only">, calibration {age.words}</span>
              </Link>
              <Notch open={open} />
            </li>
          );
        })}
      </ul>
    </nav>
  );
}

/** One stretch of the rule that opens the sheet; under the open plate it rises to a point. */
function Notch({ open }: { readonly open: boolean }) {
  if (!open) return <div className="border-ink mt-4 border-b-[1.5px]" />;
  return (
    <div className="mt-0 flex items-end" aria-hidden="true">
      <div className="border-ink flex-1 border-b-[1.5px]" />
      <svg width={32} height={16} viewBox="0 0 32 16" className="block">
        <path d="M0 15.25 16 1 32 15.25" fill="none" className="stroke-ink" strokeWidth={1.5} />
      </svg>
      <div className="border-ink flex-1 border-b-[1.5px]" />
    </div>
  );
}
