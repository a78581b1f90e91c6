import { useBenchTheme } from '../../app/theme';
import { BeamWorking, BeamWrong } from '../../components/BeamState';
import { BenchNavigation } from '../../components/BenchNavigation';
import { TextLink } from '../../components/TextLink';
import { useLab } from '../labs';
import { benchTargets } from './bench-targets';

/** Puts the bench's theme on the page while it is shown. */
function BenchTheme() {
  useBenchTheme();
  return null;
}

interface BenchNoticeProps {
  readonly failed: Error | null;
  /** The bench is dark before its run is there, so that nothing flashes. */
  readonly atBench: boolean;
}

/** While a run is being fetched, and when it can't be. */
export function BenchNotice({ failed, atBench }: BenchNoticeProps) {
  const { lab } = useLab();
  return (
    <>
      {atBench && <BenchTheme />}
      <BenchNavigation homeHref={`/labs/${lab.id}`} targets={benchTargets(lab.id)} />
      <main id="page" tabIndex={-1} className="px-5 pt-12 sm:px-10">
        {failed === null ? (
          <BeamWorking doing="Fetching the run" />
        ) : (
          <BeamWrong title="The run could not be fetched">
            {failed.message} <TextLink to={`/labs/${lab.id}/bench`}>Go to the bench</TextLink>
          </BeamWrong>
        )}
      </main>
    </>
  );
}
