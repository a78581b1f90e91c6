import { type BenchReadiness, notReadySentences } from '../../../shared/bench-ready';
import type { BenchPart } from '../../../shared/schemas/benches';
import { TextLink } from '../../components/TextLink';

/** Whether nothing can be solved for a bench because a plate of its preparation is not ready. */
export function waitsForPlates({ notReady }: Pick<BenchReadiness, 'notReady'>): boolean {
  return notReady.some(({ part }) => part === 'preparation');
}

/** Which plates a bench waits for, and why, each with the way to it. Nothing where all of them are ready. */
export function WaitsForPlates(props: {
  readonly labId: string;
  readonly bench: BenchReadiness;
  /** Of one part only; of the whole beam unless given. */
  readonly part?: BenchPart;
}) {
  const { labId, bench, part } = props;
  const plates = bench.notReady.filter((plate) => part === undefined || plate.part === part);
  if (plates.length === 0) return null;
  return (
    <ul aria-label={`What ${bench.name} waits for`} className="space-y-1">
      {plates.map((plate) => (
        <li key={plate.plateId} className="text-fault font-strong">
          {notReadySentences({ name: bench.name, notReady: [plate] })[0]}{' '}
          <TextLink to={`/labs/${labId}/cabinet/${plate.plateId}`}>See {plate.name}</TextLink>
        </li>
      ))}
    </ul>
  );
}
