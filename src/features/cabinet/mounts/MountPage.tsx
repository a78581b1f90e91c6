import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { useNavigate, useParams, useSearchParams } from 'react-router-dom';
import { BeamWrong } from '../../../components/BeamState';
import { TextLink } from '../../../components/TextLink';
import { ApiError } from '../../../lib/api';
import { QueryState } from '../../../lib/QueryState';
import { useLab } from '../../labs';
import { RefusedTask } from '../RefusedTask';
import { whoMay } from '../who-may';
import { MountFacts } from './MountFacts';
import { MountForm } from './MountForm';
import { MountSeats } from './MountSeats';
import { mountQuery } from './queries';
import { RetireMount } from './RetireMount';

/** One mount: what it can do, what sits in it, and every plate that ever did. `?do=edit` opens its form. */
export function Component() {
  const { lab, may } = useLab();
  const { mountId = '' } = useParams();
  const [search] = useSearchParams();
  const navigate = useNavigate();
  const [now] = useState(() => new Date());
  const detail = useQuery(mountQuery(lab.id, mountId));
  const cabinet = `/labs/${lab.id}/cabinet`;
  const page = `${cabinet}/mounts/${mountId}`;
  const edits = may('cabinet.write');
  if (detail.data === undefined) {
    const { error } = detail;
    return error instanceof ApiError && [404, 422, 400].includes(error.status) ? (
      <BeamWrong title="There is no such mount here" className="max-w-md pt-2">
        <TextLink to={`${cabinet}/mounts`}>See the mounts</TextLink>
      </BeamWrong>
    ) : (
      <QueryState query={detail} what="the mount" />
    );
  }
  const { mount, seats } = detail.data;
  const retired = mount.retiredAt !== null;
  const leave = () => void navigate(page, { preventScrollReset: true });
  return (
    <>
      <title>{`${mount.name} · Quarterturn`}</title>
      <header className="mb-5 flex flex-wrap items-baseline gap-x-5 gap-y-2 pt-2">
        <h1 className="text-title">{mount.name}</h1>
        <p className="text-ink-2">
          {mount.plate === null ? (
            retired ? (
              'A retired mount.'
            ) : (
              'An empty mount.'
            )
          ) : (
            <>
              Holds <TextLink to={`${cabinet}/${mount.plate.id}`}>{mount.plate.name}</TextLink>
            </>
          )}
        </p>
        <nav aria-label="Mounts" className="flex flex-wrap gap-x-5 gap-y-2 sm:ml-auto">
          <TextLink to={`${cabinet}/mounts`}>All mounts</TextLink>
          <TextLink to={cabinet}>Plates</TextLink>
        </nav>
      </header>
      <RefusedTask refusal={whoMay(search.get('do'), may)} />
      <div className="border-ink grid grid-cols-1 gap-x-14 gap-y-8 border-t-[1.5px] pt-4 lg:grid-cols-[26rem_minmax(0,1fr)]">
        <div>
          <MountFacts mount={mount} />
          {edits && (
            <p className="mt-4 flex flex-wrap gap-5">
              {!retired && (
                <TextLink to={`${page}?do=edit`} preventScrollReset>
                  Edit {mount.name}
                </TextLink>
              )}
              <RetireMount mount={mount} />
            </p>
          )}
        </div>
        {search.get('do') === 'edit' && edits && !retired ? (
          <section aria-labelledby="edit-mount">
            <h2 id="edit-mount" className="text-section mb-3">
              Edit {mount.name}
            </h2>
            <MountForm labId={lab.id} mount={mount} onDone={leave} />
          </section>
        ) : (
          <MountSeats {...{ seats, cabinet, now }} name={mount.name} />
        )}
      </div>
    </>
  );
}
