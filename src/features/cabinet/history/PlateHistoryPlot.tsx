import type { CabinetPlate, PlateDetail } from '../../../../shared/schemas/cabinet';
import { NewSeatSign } from '../../../components/SmallSigns';
import { formatDate, formatUncertain } from '../../../lib/format';
import { useWidth } from '../../../lib/use-width';
import { materialNames } from '../plate-words';
import { historyFrame } from './history-frame';
import { Marks, Moves, Points, Prediction, TimeAxis } from './PlotParts';
import { historyPoints } from './seat-history';

/**
 * Retardance and zero over time with their 95 % intervals, double lines where the plate was seated anew, the retardance
 * that the material's dispersion gives as a dashed line. The table beside it holds the same numbers in words.
 */
export function PlateHistoryPlot(props: {
  readonly plate: CabinetPlate;
  readonly detail: Pick<PlateDetail, 'seats' | 'calibrations'>;
  readonly tableId: string;
}) {
  const { plate, detail, tableId } = props;
  const [frameRef, width] = useWidth<HTMLDivElement>(430);
  const points = historyPoints(plate, detail);
  const frame = historyFrame(points, width);
  if (frame === null) return null;
  const newest = points.predicted?.at(-1);
  return (
    <div ref={frameRef}>
      <svg
        width={width}
        height={frame.height}
        role="img"
        aria-label={summary(plate, detail)}
        aria-describedby={tableId}
        className="block"
      >
        <Marks scale={frame.retardance} frame={frame} />
        <Marks scale={frame.zero} frame={frame} />
        <Moves moves={points.moves} frame={frame} />
        {points.predicted !== null && (
          <Prediction
            points={points.predicted}
            obstacles={[...points.retardances, ...points.moves].map(({ at }) => at)}
            frame={frame}
            label={`dispersion of ${materialNames[plate.material ?? ''] ?? ''}, ${newest?.value.toFixed(1) ?? ''}`}
          />
        )}
        <Points points={points.retardances} scale={frame.retardance} frame={frame} />
        <Points points={points.zeros} scale={frame.zero} frame={frame} />
        <Name x={frame.left + 6} y={frame.names.retardance} text="retardance, degrees" />
        <Name x={frame.left + 6} y={frame.names.zero} text="zero, from the seat’s first" />
        <TimeAxis frame={frame} />
      </svg>
      <p className="text-s text-ink-2 mt-1 flex flex-wrap items-center gap-x-4">
        {points.moves.length > 0 && (
          <span className="flex items-center gap-1">
            <NewSeatSign className="scale-75" /> taken out and seated anew
          </span>
        )}
        <span>bars hold 95 %</span>
      </p>
    </div>
  );
}

/** Its ground keeps it readable where a line runs under it. */
function Name({ x, y, text }: { readonly x: number; readonly y: number; readonly text: string }) {
  return (
    <text
      x={x}
      y={y}
      className="fill-ink-2 text-s"
      stroke="var(--paper)"
      strokeWidth={6}
      strokeLinejoin="round"
      paintOrder="stroke"
    >
      {text}
    </text>
  );
}

function summary(
  plate: CabinetPlate,
  { seats, calibrations }: Pick<PlateDetail, 'seats' | 'calibrations'>,
): string {
  const [newest] = calibrations;
  const oldest = calibrations.at(-1);
  if (newest === undefined || oldest === undefined) return `${plate.name} has not been calibrated.`;
  const retardance = (c: typeof newest) => formatUncertain(c.retardanceDeg, c.retardanceSigmaDeg);
  const seatWords = seats.length === 1 ? 'one seat' : `${seats.length} seats`;
  return (
    `${plate.name} over time, ${calibrations.length} calibrations in ${seatWords} since ${formatDate(new Date(oldest.measuredAt))}: ` +
    `retardance from ${retardance(oldest)} to ${retardance(newest)} degrees. The table of its seats and calibrations says each value.`
  );
}
