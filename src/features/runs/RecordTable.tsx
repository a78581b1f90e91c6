import type { Reading, Run } from '../../../shared/schemas/runs';
import type { VersionContent } from '../../../shared/schemas/versions';
import { FidelityChip } from '../../components/FidelityChip';
import { fidelityVerdict } from '../../components/fidelity-verdict';
import { Scientific } from '../../components/Scientific';
import { WrittenFormula } from '../../components/WrittenFormula';
import { formatDate, formatTime, missingSign } from '../../lib/format';
import { dialledExpectation, type DialledExpectation, wantedDials } from './dial-cost';
import { dialText } from './move-words';
import { newestReadings } from './run-progress';

interface RecordTableProps {
  readonly run: Run;
  readonly content: VersionContent;
}

/** From so many plates on what was dialled stands under what was wanted. */
const manyPlates = 3;
const anyHead = 'py-2 pr-5 align-bottom font-words';
const head = `${anyHead} text-start`;

/** One row per setting: what was wanted, what was dialled, and what the frozen plates make of that. */
export function RecordTable({ run, content }: RecordTableProps) {
  const newest = newestReadings(run.readings, content.targets.length);
  return (
    <div
      className="relative mt-3 overflow-x-auto"
      role="region"
      aria-label="Readings, scrolls sideways"
      tabIndex={0}
    >
      <table className="w-full border-t-[1.5px] border-ink">
        <thead className="sticky top-0 bg-paper">
          <tr className="text-s text-ink-2">
            <th scope="col" className={head}>
              setting
            </th>
            <th scope="col" className={head}>
              {content.kind === 'apply' ? 'unitary' : 'state'}
            </th>
            {content.bench.plates.map(({ id, name }) => (
              <th key={id} scope="col" className={`${anyHead} text-end`}>
                {name}, wanted and dialled
              </th>
            ))}
            <th scope="col" className={head}>
              1 − F of what was dialled; the bar is 5 % to 95 % with all σ
            </th>
            <th scope="col" className={head}>
              note or reason
            </th>
            <th scope="col" className={head}>
              recorded
            </th>
          </tr>
        </thead>
        <tbody>
          {content.targets.map((target, index) => (
            <RecordRow
              key={target.id}
              {...{ content, index }}
              reading={newest[index]}
              replaced={run.readings.filter(
                (reading) => reading.settingIndex === index && reading.sequence !== newest[index]?.sequence,
              )}
            />
          ))}
        </tbody>
      </table>
    </div>
  );
}

interface RecordRowProps {
  readonly content: VersionContent;
  readonly index: number;
  readonly reading: Reading | undefined;
  /** Earlier readings of the setting: kept, and no longer counted. */
  readonly replaced: readonly Reading[];
}

function RecordRow({ content, index, reading, replaced }: RecordRowProps) {
  const target = content.targets[index];
  const many = content.bench.plates.length >= manyPlates;
  if (target === undefined) return null;
  const wanted = wantedDials(content, index);
  const dialled = reading?.outcome === 'done' ? reading.dialledDeg : null;
  const made = dialled === null ? null : dialledExpectation(content, index, dialled);
  return (
    <tr className="border-t border-hair align-top">
      <td className="py-2 pr-5 font-mono text-ink-3">{index + 1}</td>
      <th scope="row" className="py-2 pr-5 text-start font-words [&_.whitespace-nowrap]:whitespace-normal">
        <b>{target.label}</b>{' '}
        <WrittenFormula expression={target.expression} kind={content.kind} convention={content.convention} />
      </th>
      {content.bench.plates.map(({ id, mount }, plate) => {
        const wantedDeg = wanted[plate];
        const dialledDeg = dialled?.[plate];
        return (
          <td key={id} className="py-2 pr-5 text-end font-mono whitespace-nowrap">
            <span className={many ? 'block text-ink-2' : 'text-ink-2'}>
              {wantedDeg === undefined ? missingSign : dialText(wantedDeg, mount.resolutionDeg)}
            </span>{' '}
            <b className="text-dial">
              {dialledDeg === undefined ? missingSign : dialText(dialledDeg, mount.resolutionDeg)}
            </b>
          </td>
        );
      })}
      <td className="py-2 pr-5">
        {made === null ? missingSign : <Made made={made} tolerance={content.toleranceInfidelity} />}
      </td>
      <td className="max-w-80 min-w-40 py-2 pr-5 wrap-anywhere">
        {reading === undefined
          ? 'nothing recorded'
          : reading.outcome === 'skipped'
            ? `skipped: “${reading.note}”`
            : reading.note}
        {replaced.map((earlier) => (
          <span key={earlier.id} className="block text-s text-ink-3">
            took the place of{' '}
            {earlier.outcome === 'done' ? earlier.dialledDeg.join(', ') : `skipped: “${earlier.note}”`},{' '}
            {formatTime(new Date(earlier.recordedAt))}, {earlier.recordedBy}
          </span>
        ))}
      </td>
      <td className="py-2 whitespace-nowrap">
        {reading === undefined ? (
          missingSign
        ) : (
          <>
            {formatDate(new Date(reading.recordedAt))} {formatTime(new Date(reading.recordedAt))}
            <span className="block text-s text-ink-2">{reading.recordedBy}</span>
          </>
        )}
      </td>
    </tr>
  );
}

/** 1 − F of the dials with the plates as calibrated, as a number and at its place on the axis; the bar is what every σ makes of it. */
function Made({ made, tolerance }: { readonly made: DialledExpectation; readonly tolerance: number }) {
  const interval = { value: made.infidelity, low: made.low, high: made.high };
  const verdict = fidelityVerdict(interval, tolerance);
  return (
    <div className="flex flex-wrap items-center gap-x-4 gap-y-1">
      <Scientific value={made.infidelity} className="w-24" />
      <FidelityChip infidelity={interval} tolerance={tolerance} kind="predicted" />
      {verdict !== 'within' && <b className={verdict === 'not within' ? 'text-fault' : ''}>{verdict}</b>}
    </div>
  );
}
