import { useInfiniteQuery } from '@tanstack/react-query';
import { BeamEmpty, BeamWorking, BeamWrong } from '../../components/BeamState';
import { Button } from '../../components/Button';
import { TextLink } from '../../components/TextLink';
import { useTitle } from '../../lib/use-title';
import { useLab } from '../labs';
import { labVersionsQuery } from './queries';
import { VersionsTable } from './VersionsTable';

/** Everything that was frozen in this lab, newest first. */
export function Component() {
  const { lab } = useLab();
  const versions = useInfiniteQuery(labVersionsQuery(lab.id));
  useTitle('Review');
  const all = versions.data?.pages.flatMap(({ items }) => items) ?? [];
  return (
    <>
      <div className="flex flex-wrap items-baseline gap-x-4 pt-3">
        <h1 className="m-0 text-title">Review</h1>
        <p className="m-0 text-ink-2">every version saved in this lab, newest first</p>
      </div>
      {versions.isPending && <BeamWorking doing="Fetching the versions" />}
      {versions.isError && (
        <BeamWrong title="The versions could not be fetched">{versions.error.message}</BeamWrong>
      )}
      {versions.isSuccess && all.length === 0 && (
        <BeamEmpty title="No versions yet">
          A version is saved from a protocol’s draft, and never changes after that.{' '}
          <TextLink to={`/labs/${lab.id}/plan`}>Open a protocol</TextLink>
        </BeamEmpty>
      )}
      {all.length > 0 && <VersionsTable labId={lab.id} versions={all} namesProtocol />}
      {versions.hasNextPage && (
        <Button
          className="mt-6"
          waitsFor={versions.isFetchingNextPage ? 'the server' : undefined}
          onClick={() => void versions.fetchNextPage()}
        >
          Show older versions
        </Button>
      )}
    </>
  );
}
