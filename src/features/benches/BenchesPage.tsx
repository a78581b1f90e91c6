import { useQuery } from '@tanstack/react-query';
import type { Bench } from '../../../shared/schemas/benches';
import { BeamEmpty } from '../../components/BeamState';
import { ButtonLink } from '../../components/Button';
import { TextLink } from '../../components/TextLink';
import { QueryState } from '../../lib/QueryState';
import { useLab } from '../labs';
import { BenchSection } from './BenchSection';
import { benchesQuery } from './queries';
import { RetireBench } from './RetireBench';
import { RunList } from './RunList';

/** The lab's optical set-ups, and the runs at them. */
export function Component() {
  const { lab, may } = useLab();
  const benches = useQuery(benchesQuery(lab.id));
  const items = benches.data?.items.filter(({ retiredAt }) => retiredAt === null);
  const retired = benches.data?.items.filter(({ retiredAt }) => retiredAt !== null) ?? [];
  return (
    <>
      <title>Bench · Quarterturn</title>
      <header className="mb-6 flex flex-wrap items-center gap-x-5 gap-y-3 pt-2">
        <h1 className="text-title">Bench</h1>
        <div className="flex flex-wrap items-center gap-5 sm:ml-auto">
          {may('benches.write') && <TextLink to={`/labs/${lab.id}/bench/new`}>Add a bench</TextLink>}
          {may('runs.record') && items !== undefined && items.length > 0 && (
            <ButtonLink kind="filled" to={`/labs/${lab.id}/bench/start`}>
              Start a run
            </ButtonLink>
          )}
        </div>
      </header>
      <div className="grid grid-cols-1 gap-x-14 gap-y-10 lg:grid-cols-[1fr_27rem]">
        <div className="space-y-10">
          {items === undefined ? (
            <QueryState query={benches} what="the benches" />
          ) : items.length === 0 ? (
            <BeamEmpty title="No bench yet">
              A bench is one optical set-up: its wavelength, what goes in, and one to six plates in beam order
              to prepare it, and what analyses it.{' '}
              {may('benches.write') ? (
                <TextLink to={`/labs/${lab.id}/bench/new`}>Add a bench</TextLink>
              ) : (
                'A designer or the lead sets it up.'
              )}
            </BeamEmpty>
          ) : (
            items.map((bench) => <BenchSection key={bench.id} bench={bench} />)
          )}
          {retired.length > 0 && <RetiredBenches benches={retired} />}
        </div>
        <RunList />
      </div>
    </>
  );
}

/** Benches out of use, each with the way back for those who may take it. */
function RetiredBenches({ benches }: { readonly benches: readonly Bench[] }) {
  const { may } = useLab();
  return (
    <section aria-labelledby="retired-benches" className="border-ink border-t-[1.5px] pt-4">
      <h2 id="retired-benches" className="text-section mb-1">
        Retired
      </h2>
      <ul>
        {benches.map((bench) => (
          <li key={bench.id} className="border-hair flex items-baseline justify-between gap-4 border-b py-2">
            {bench.name}
            {may('benches.write') && <RetireBench bench={bench} />}
          </li>
        ))}
      </ul>
    </section>
  );
}
