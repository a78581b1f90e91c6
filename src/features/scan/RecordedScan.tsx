import type { CabinetPlate } from '../../../shared/schemas/cabinet';
import { BeamWorking, BeamWrong } from '../../components/BeamState';
import { SectionHead } from '../../components/SectionHead';
import { TextLink } from '../../components/TextLink';
import { formatLongDate, formatTime } from '../../lib/format';
import { QueryState } from '../../lib/QueryState';
import { fileAddress } from '../../lib/upload';
import { useLab } from '../labs';
import { PointsTable } from './PointsTable';
import { useRecordedScan } from './recorded-scan';
import { lightWords } from './scan-words';
import { ScanPlot } from './ScanPlot';
import { ScanResults } from './ScanResults';
import { useScanAnswer } from './use-scan-answer';

/** A recorded scan, fitted again from its stored file. */
export function RecordedScan(props: { readonly plate: CabinetPlate; readonly calibrationId: string }) {
  const { plate, calibrationId } = props;
  const { lab } = useLab();
  const { detail, request, failed } = useRecordedScan(lab.id, plate.id, plate, calibrationId);
  const { reply } = useScanAnswer(request);
  if (failed !== null) return <QueryState query={failed} what="the scan" />;
  if (detail.data === undefined) return <QueryState query={detail} what="the scan" />;
  const { calibration, scan } = detail.data;
  if (scan === null) {
    return (
      <p>
        This calibration was written by hand, so there is no scan to show.{' '}
        <TextLink to={`/labs/${lab.id}/cabinet/${plate.id}`}>See {plate.name}</TextLink>
      </p>
    );
  }
  const measured = new Date(calibration.measuredAt);
  return (
    <div className="grid grid-cols-1 gap-x-12 gap-y-8 lg:grid-cols-[minmax(0,3fr)_minmax(0,2fr)]">
      <section aria-label="The scan">
        <SectionHead
          className="mb-3"
          note={`${calibration.recordedBy}, ${calibration.method}${calibration.note === '' ? '' : `. ${calibration.note}`}`}
        >
          {formatLongDate(measured)}, {formatTime(measured)}
        </SectionHead>
        {reply === null ? (
          <BeamWorking doing="Fitting the stored file" className="max-w-md py-4" />
        ) : reply.kind === 'fitted' ? (
          <>
            <ScanPlot scan={reply} plateName={plate.name} />
            <PointsTable scan={reply} />
          </>
        ) : (
          <BeamWrong title="The stored scan can no longer be fitted" className="max-w-md py-4">
            Its file and its record are kept as they were. Tell whoever runs this server.
          </BeamWrong>
        )}
        {scan.record.leftOut.length > 0 && (
          <>
            <h3 className="text-section mt-4">Left out</h3>
            <ul>
              {scan.record.leftOut.map(({ line, why }) => (
                <li key={line} className="border-hair border-b py-1.5">
                  Line {line}: {why}
                </li>
              ))}
            </ul>
          </>
        )}
      </section>
      <section aria-label={`What it tells of ${plate.name}`}>
        <SectionHead className="mb-3">What it tells of {plate.name}</SectionHead>
        {reply?.kind === 'fitted' && <ScanResults scan={reply} plate={plate} before={null} isRecorded />}
        {scan.record.retardanceFrom === 'before' && (
          <p className="mt-3">The retardance was taken over from the calibration before.</p>
        )}
        <p className="mt-5">
          <a href={fileAddress(lab.id, scan.file.id)} download className="beam-link break-words">
            {scan.file.name}
          </a>
          <span className="text-s text-ink-2 block break-all">
            {reply?.kind === 'fitted' ? `${lightWords(reply)}, ` : ''}
            {scan.file.sizeBytes} bytes, SHA-256 {scan.file.sha256}
          </span>
        </p>
      </section>
    </div>
  );
}
