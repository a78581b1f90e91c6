import { useNavigate, useSearchParams } from 'react-router-dom';
import { TextLink } from '../../../components/TextLink';
import { useLab } from '../../labs';
import { RefusedTask } from '../RefusedTask';
import { whoMay } from '../who-may';
import { MountForm } from './MountForm';
import { MountTable } from './MountTable';

/** The lab's mounts as a list. `?do=add` opens the form of a new one. */
export function Component() {
  const { lab, may } = useLab();
  const [search] = useSearchParams();
  const navigate = useNavigate();
  const cabinet = `/labs/${lab.id}/cabinet`;
  const base = `${cabinet}/mounts`;
  const edits = may('cabinet.write');
  const adds = search.get('do') === 'add' && edits;
  return (
    <>
      <title>Mounts · Quarterturn</title>
      <header className="mb-5 flex flex-wrap items-baseline gap-x-5 gap-y-2 pt-2">
        <h1 className="text-title">Mounts</h1>
        <p className="text-ink-2">What the plates sit in, and how well each comes back.</p>
        <nav aria-label="Mounts" className="flex flex-wrap gap-x-5 gap-y-2 sm:ml-auto">
          {edits && !adds && <TextLink to={`${base}?do=add`}>Add a mount</TextLink>}
          {adds && <TextLink to={base}>All mounts</TextLink>}
          <TextLink to={cabinet}>Plates</TextLink>
        </nav>
      </header>
      <RefusedTask refusal={whoMay(search.get('do'), may)} />
      {adds ? (
        <section aria-labelledby="new-mount" className="border-ink border-t-[1.5px] pt-5">
          <h2 id="new-mount" className="text-title mb-5">
            A mount that comes into the cabinet
          </h2>
          <MountForm
            labId={lab.id}
            mount={null}
            onDone={(mount) => void navigate(mount === null ? base : `${base}/${mount.id}`)}
          />
        </section>
      ) : (
        <MountTable cabinet={cabinet} base={base} />
      )}
    </>
  );
}
