import { useQuery } from '@tanstack/react-query';
import type { Bench } from '../../../shared/schemas/benches';
import { Quantity } from '../../components/NumberText';
import { TextLink } from '../../components/TextLink';
import { GapText } from '../../lib/GapText';
import { useLab } from '../labs';
import { BeamLineOfBench } from './BeamLineOfBench';
import { benchConflicts } from './bench-conflicts';
import { ConflictWords } from './ConflictWords';
import { InputReading } from './InputReading';
import { LaserCaution } from './LaserCaution';
import { benchPlatesQuery } from './queries';
import { RetireBench } from './RetireBench';
import { WaitsForPlates } from './WaitsForPlates';

/** One optical set-up. */
export function BenchSection({ bench, now = new Date() }: { readonly bench: Bench; readonly now?: Date }) {
  const { lab, may } = useLab();
  const plates = useQuery(benchPlatesQuery(lab.id, bench.id)).data?.items;
  const headId = `bench-${bench.id}`;
  const standing = (plates ?? []).flatMap((plate) => {
    const place = bench.order.find(({ plateId }) => plateId === plate.id);
    return place === undefined ? [] : [{ part: place.part, plate }];
  });
  const waits = new Set(bench.notReady.map(({ plateId }) => plateId));
  const conflicts = benchConflicts(
    // What a bench waits for stands above, with the way to it.
    standing.filter(({ plate }) => !waits.has(plate.id)),
    bench,
    { calibrationDueDays: lab.calibrationDueDays, now },
  );
  return (
    <section aria-labelledby={headId} className="border-ink space-y-4 border-t-[1.5px] pt-4">
      <div className="flex flex-wrap items-baseline gap-x-4">
        <h2 id={headId} className="text-section">
          {bench.name}
        </h2>
        <p className="text-ink-2">
          <Quantity text={String(bench.wavelengthNm)} unit="nm" />,{' '}
          <InputReading expression={bench.inputExpression} convention={lab.convention} /> behind the polariser
        </p>
        {may('benches.write') && (
          <span className="ml-auto flex gap-5">
            <TextLink to={`/labs/${lab.id}/bench/${bench.id}/edit`}>
              Edit<span className="sr-only"> {bench.name}</span>
            </TextLink>
            <RetireBench bench={bench} />
          </span>
        )}
      </div>
      <BeamLineOfBench bench={bench} plates={plates} now={now} />
      <WaitsForPlates labId={lab.id} bench={bench} />
      {conflicts.length > 0 && (
        <div>
          {conflicts.map(({ kind, sentence }) => (
            <ConflictWords key={sentence} kind={kind}>
              <GapText text={sentence} />
            </ConflictWords>
          ))}
        </div>
      )}
      <LaserCaution
        laserClass={bench.laserClass}
        hazardWavelengthsNm={bench.hazardWavelengthsNm}
        variant="full"
      />
    </section>
  );
}
