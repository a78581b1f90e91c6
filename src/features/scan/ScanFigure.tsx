import { useQuery } from '@tanstack/react-query';
import { BeamWorking, BeamWrong } from '../../components/BeamState';
import { TextLink } from '../../components/TextLink';
import { formatMoment } from '../../lib/format';
import { QueryState } from '../../lib/QueryState';
import { plateQuery } from '../cabinet';
import { useLab } from '../labs';
import { SCAN_FRAME_HEIGHT } from './scan-frame';
import { useRecordedScan } from './recorded-scan';
import type { FittedScan } from './scan-points';
import { lightWords } from './scan-words';
import { ScanPlot } from './ScanPlot';
import { useScanAnswer } from './use-scan-answer';

interface ScanFigureProps {
  readonly plateId: string;
  readonly calibrationId: string;
  readonly now: Date;
}

/**
 * "Scan of today, 10:52": the plot of a recorded scan, fitted again from its stored file. Nothing where it was no scan. Its
 * place is kept while it is drawn, so that what stands below does not jump from under a press.
 */
export function ScanFigure({ plateId, calibrationId, now }: ScanFigureProps) {
  const { lab } = useLab();
  const plate = useQuery(plateQuery(lab.id, plateId));
  if (plate.data === undefined) return <QueryState query={plate} what="the plate" />;
  return <Figure {...{ calibrationId, now }} plate={plate.data.plate} />;
}

function Figure(props: {
  readonly plate: Parameters<typeof useRecordedScan>[2] & { readonly id: string; readonly name: string };
  readonly calibrationId: string;
  readonly now: Date;
}) {
  const { plate, calibrationId, now } = props;
  const { lab } = useLab();
  const { detail, request, failed } = useRecordedScan(lab.id, plate.id, plate, calibrationId);
  const { reply } = useScanAnswer(request);
  if (failed !== null) return <QueryState query={failed} what="the scan" />;
  if (detail.data?.scan === null) return null;
  const headId = `scan-of-${calibrationId}`;
  const recorded = detail.data?.calibration;
  const scan = reply?.kind === 'fitted' ? reply : null;
  return (
    <section aria-labelledby={headId}>
      <div className="mb-2 flex flex-wrap items-baseline justify-between gap-x-4 gap-y-1">
        <h3 id={headId} className="text-section">
          {recorded === undefined ? 'Scan' : `Scan of ${formatMoment(new Date(recorded.measuredAt), now)}`}
        </h3>
        {recorded !== undefined && scan !== null && (
          <span className="text-s text-ink-2">{`${recorded.recordedBy}, ${pointWords(scan)}`}</span>
        )}
      </div>
      <div style={{ minHeight: `calc(${SCAN_FRAME_HEIGHT}px + 2 * var(--type-s-line))` }}>
        <Drawn reply={reply} plateName={plate.name} />
      </div>
      <p className="mt-2">
        <TextLink to={`/labs/${lab.id}/cabinet/${plate.id}/scan?calibration=${calibrationId}`}>
          See the whole scan
        </TextLink>
      </p>
    </section>
  );
}

function pointWords(scan: FittedScan): string {
  const used = scan.found.fit.rows.filter(({ isUsed }) => isUsed).length;
  return `${used} points ${lightWords(scan)}`;
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
