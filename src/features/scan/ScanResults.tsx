import type { ReactNode } from 'react';
import type { CabinetPlate } from '../../../shared/schemas/cabinet';
import type { Calibration } from '../../../shared/schemas/calibrations';
import { UnsettledSign } from '../../components/SmallSigns';
import { formatDate, formatUncertain } from '../../lib/format';
import type { FittedScan } from './scan-points';
import { distanceWords, movedWarning, movedWords, openWords, warningWords } from './scan-words';

interface ScanResultsProps {
  readonly scan: FittedScan;
  readonly plate: CabinetPlate;
  /** In this seat; null where there is none to compare with. */
  readonly before: Calibration | null;
  /** Of a recorded one everything has happened already. */
  readonly isRecorded?: boolean;
}

/** What a scan tells of the plate, in numbers and in sentences. */
export function ScanResults({ scan, plate, before, isRecorded = false }: ScanResultsProps) {
  const { values, found } = scan;
  const { retardance } = values;
  const distance = distanceWords(scan, plate.material?.replace('-', ' ') ?? 'the model');
  const moved = isRecorded || before === null ? null : movedWarning(scan, before);
  const wrong = [
    ...found.fit.warnings.map((warning) => warningWords(warning, scan)),
    ...(moved === null ? [] : [moved]),
  ];
  return (
    <>
      <dl className="border-hair border-t">
        <Fact name="zero">
          <Value value={values.offsetDeg} sigma={values.offsetSigmaDeg} />{' '}
          <span className="text-ink-2">
            what the dial reads with the fast axis along H, or half a turn from it
          </span>
        </Fact>
        <Fact name="retardance">
          {retardance === null ? (
            'not told by this scan'
          ) : (
            <Value value={retardance.deg} sigma={retardance.sigmaDeg} />
          )}
          {distance !== null && <span className="text-ink-2 block">{distance}</span>}
        </Fact>
        {!isRecorded && (
          <Fact name="since before">
            {before === null
              ? 'Nothing was measured in this seat before.'
              : `${movedWords(scan, before)}, since ${formatDate(new Date(before.measuredAt))}.`}
          </Fact>
        )}
      </dl>
      {wrong.length > 0 && (
        <section aria-label="What looks wrong" className="mt-5">
          <h3 className="text-section">What looks wrong</h3>
          <ul className="mt-1 space-y-2">
            {wrong.map((sentence) => (
              <li key={sentence}>{sentence}</li>
            ))}
          </ul>
        </section>
      )}
      <section aria-label="What this scan leaves open" className="mt-5 space-y-4">
        {found.fit.open.length === 0 ? (
          <p>This scan leaves nothing open: axis and retardance are told.</p>
        ) : (
          found.fit.open.map((question) => {
            const { head, text, ways } = openWords(question, scan);
            return (
              <div key={question.kind} className="flex items-start gap-4">
                <UnsettledSign className="mt-1 h-10 w-14 shrink-0" />
                <div className="min-w-0">
                  <h3 className="text-section">{head}</h3>
                  <p className="mt-0.5">{text}</p>
                  <p className="text-ink-2 mt-0.5">{ways}</p>
                </div>
              </div>
            );
          })
        )}
      </section>
    </>
  );
}

function Fact({ name, children }: { readonly name: string; readonly children: ReactNode }) {
  return (
    <div className="border-hair grid grid-cols-[7rem_minmax(0,1fr)] gap-x-4 border-b py-2">
      <dt className="text-ink-2">{name}</dt>
      <dd>{children}</dd>
    </div>
  );
}

function Value({ value, sigma }: { readonly value: number; readonly sigma: number }) {
  return <span className="font-dial font-mono text-[1.0625rem]">{formatUncertain(value, sigma)}°</span>;
}
