import type { Bench } from '../../../../shared/schemas/benches';
import { BeamWrong } from '../../../components/BeamState';
import { TextLink } from '../../../components/TextLink';
import { useLab } from '../../labs';

interface BenchWaitsProps {
  readonly bench: Bench;
  readonly sentences: readonly string[];
}

/** The draft's bench lacks a plate: nothing is solved for it until that one is back and calibrated. */
export function BenchWaits({ bench, sentences }: BenchWaitsProps) {
  const { lab } = useLab();
  const plates = bench.notReady.filter(({ part }) => part === 'preparation');
  return (
    <BeamWrong title={`The beam of ${bench.name} lacks a plate`} className="mb-4">
      {sentences.join(' ')} The targets stay as they are.{' '}
      {plates.map(({ plateId, name }) => (
        <TextLink key={plateId} to={`/labs/${lab.id}/cabinet/${plateId}`}>
          Open {name}
        </TextLink>
      ))}
    </BeamWrong>
  );
}
