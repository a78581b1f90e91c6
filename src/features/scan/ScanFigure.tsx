import { useQuery } from '@tanstack/react-query';
import type { Calibration } from '../../../shared/schemas/calibrations';
import { BeamWorking, BeamWrong } from '../../components/BeamState';
import { TextLink } from '../../components/TextLink';
import { formatMoment } from '../../lib/format';
import { QueryState } from '../../lib/QueryState';
import { plateQuery } from '../cabinet';
import { useLab } from '../labs';
import { SCAN_FRAME_HEIGHT } from './scan-frame';
import { useRecordedScan } from './recorded-scan';
import { ScanPlot } from './ScanPlot';
import { useScanAnswer } from './use-scan-answer';

interface ScanFigureProps {
  readonly plateId: string;
  readonly calibration: RecordedScanHead;
  readonly now: Date;
}

type RecordedScanHead = Pick<Calibration, 'id' | 'measuredAt' | 'recordedBy' | 'method'>;

/**
 * "Scan of today, 10:52": the plot of a recorded scan, fitted again from its stored file. Nothing where it was no scan. Its
 * place is kept while it is drawn, so that what stands below does not jump from under a press.
 */
export function ScanFigure({ plateId, calibration, now }: ScanFigureProps) {
  const { lab } = useLab();
  const plate = useQuery(plateQuery(lab.id, plateId));
  if (plate.data === undefined) return <QueryState query={plate} what="the plate" />;
  return <Figure {...{ calibration, now }} plate={plate.data.plate} />;
}

function Figure(props: {
  readonly plate: Parameters<typeof useRecordedScan>[2] & { readonly id: string; readonly name: string };
  readonly calibration: RecordedScanHead;
  readonly now: Date;
}) {
  const { plate, calibration, now } = props;
  const { lab } = useLab();
  const { detail, request, failed } = useRecordedScan(lab.id, plate.id, plate, calibration.id);
  const { reply } = useScanAnswer(request);
  if (failed !== null) return <QueryState query={failed} what="the scan" />;
  if (detail.data?.scan === null) return null;
  const headId = `scan-of-${calibration.id}`;
  return (
    <section aria-labelledby={headId} className="@container">
      <div className="mb-2 flex flex-wrap items-baseline justify-between gap-x-4 gap-y-1">
        <h3 id={headId} className="text-section">
          Scan of {formatMoment(new Date(calibration.measuredAt), now)}
        </h3>
        <span className="text-s text-ink-2">
          {calibration.recordedBy}, {calibration.method.replace(/^scan /u, '')}
        </span>
      </div>
      {/* The plot and as many lines of words about it as this width breaks them into. */}
      <div
        className="[--lines:5] @min-[25rem]:[--lines:4] @min-[29rem]:[--lines:3] @min-[32.5rem]:[--lines:2]"
        style={{ minHeight: `calc(${SCAN_FRAME_HEIGHT}px + var(--lines) * var(--type-s-line))` }}
      >
        <Drawn reply={reply} plateName={plate.name} />
      </div>
      <p className="mt-2">
        <TextLink to={`/labs/${lab.id}/cabinet/${plate.id}/scan?calibration=${calibration.id}`}>
          See the whole scan
        </TextLink>
      </p>
    </section>
  );
}

function Drawn(props: {
  readonly reply: ReturnType<typeof useScanAnswer>['reply'];
  readonly plateName: string;
}) {
  const { reply, plateName } = props;
  if (reply === null) return <BeamWorking doing="Drawing the scan" className="max-w-md py-4" />;
  if (reply.kind !== 'fitted') {
    return (
      <BeamWrong title="The stored scan can no longer be fitted" className="max-w-md py-4">
        Its file and its record are kept as they were. Tell whoever runs this server.
      </BeamWrong>
    );
  }
  return <ScanPlot scan={reply} plateName={plateName} />;
}
