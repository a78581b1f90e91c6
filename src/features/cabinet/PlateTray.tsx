import type { RefObject } from 'react';
import { Link } from 'react-router-dom';
import type { CabinetPlate } from '../../../shared/schemas/cabinet';
import { AgeRing } from '../../components/AgeRing';
import { GapText } from '../../lib/GapText';
import { calibrationAge } from './calibration-age';
import { useTrayFrame } from './use-tray-frame';
import { restingAxisDeg, shortKind, trustWords } from './plate-words';

interface TrayProps {
  readonly plates: readonly CabinetPlate[];
  readonly openId: string | undefined;
  readonly base: string;
  readonly dueDays: number;
  readonly now: Date;
  /** There are more by name, to the right. */
  readonly hasMore: boolean;
  readonly onMore: () => void;
}

/** How far from its right end the tray asks for more, in px. */
const aheadPx = 600;

/** The plates as rings with their age; the open one is lit and a notch in the rule below points at it. Tab comes to that one, and arrows walk. */
export function PlateTray({ plates, openId, base, dueDays, now, hasMore, onMore }: TrayProps) {
  const { frame, opened } = useTrayFrame(openId);
  const scrolled = ({ scrollLeft, clientWidth, scrollWidth }: HTMLElement) => {
    if (hasMore && scrollLeft + clientWidth > scrollWidth - aheadPx) onMore();
  };
  const stopId = plates.some(({ id }) => id === openId) ? openId : plates[0]?.id;
  return (
    <nav
      ref={frame}
      aria-label="Plates"
      className="relative -mt-1.5 overflow-x-auto pt-1.5"
      onScroll={(event) => scrolled(event.currentTarget)}
    >
      <ul className="flex min-w-full">
        {plates.map((plate) => (
          <TrayPlate
            key={plate.id}
            {...{ plate, base, dueDays, now }}
            open={plate.id === openId}
            itemRef={plate.id === openId ? opened : undefined}
            isStop={plate.id === stopId}
          />
        ))}
        {hasMore && (
          <li className="flex min-w-28 flex-1 flex-col">
            <button
              type="button"
              onClick={onMore}
              className="hover:bg-wash text-ink-2 flex-1 px-2 text-center"
            >
              <span className="beam-link">More plates</span>
            </button>
            <Notch open={false} />
          </li>
        )}
      </ul>
    </nav>
  );
}

function TrayPlate(props: {
  readonly plate: CabinetPlate;
  readonly open: boolean;
  readonly itemRef: RefObject<HTMLLIElement | null> | undefined;
  /** Whether Tab comes to it; from there the arrows go on. */
  readonly isStop: boolean;
  readonly base: string;
  readonly dueDays: number;
  readonly now: Date;
}) {
  const { plate, open, itemRef, isStop, base, dueDays, now } = props;
  const { calibration, seat } = plate;
  const age = calibration === null ? null : calibrationAge(calibration.measuredAt, dueDays, now);
  const unsettled = seat !== null && (calibration === null || calibration.openQuestions.length > 0);
  return (
    <li ref={itemRef} className="flex min-w-28 flex-1 flex-col">
      <Link
        to={`${base}/${plate.id}`}
        preventScrollReset
        aria-current={open ? 'page' : undefined}
        tabIndex={isStop ? undefined : -1}
        className="hover:bg-wash flex flex-1 flex-col items-center px-1 pt-2 pb-3 text-center"
      >
        <AgeRing
          fastAxisDeg={restingAxisDeg(plate)}
          dashed={seat === null}
          ageDays={age?.ageDays ?? null}
          dueDays={dueDays}
          unsettled={unsettled}
          lit={open}
        />
        <span className="font-strong max-w-full break-words">{plate.name}</span>
        <span className="text-s text-ink-2">
          <GapText text={shortKind(plate)} />
        </span>
        <span className="sr-only">, {trustWords(plate, dueDays, now)}</span>
      </Link>
      <Notch open={open} />
    </li>
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
