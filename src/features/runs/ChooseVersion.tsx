import type { VersionSummary } from '../../../shared/schemas/protocols';
import { BeamEmpty } from '../../components/BeamState';
import { TextLink } from '../../components/TextLink';
import { VersionSeal } from '../../components/VersionSeal';
import { formatMoment } from '../../lib/format';
import { startHref } from './start-href';

interface ChooseVersionProps {
  readonly labId: string;
  readonly versions: readonly VersionSummary[];
  /** The lab has older ones than these. */
  readonly more: boolean;
  /** An id in the address that is none of the lab's versions. */
  readonly unknownId: string | null;
}

/** The versions that a run can be made of, newest first. */
export function ChooseVersion({ labId, versions, more, unknownId }: ChooseVersionProps) {
  const now = new Date();
  // The list begins with the newest, so that of each protocol the first is the one.
  const newest = new Map(versions.toReversed().map(({ protocolId, number }) => [protocolId, number]));
  if (versions.length === 0) {
    return (
      <BeamEmpty title="No version to run yet">
        A run goes through a saved version. Save one in a protocol first.{' '}
        <TextLink to={`/labs/${labId}/plan`}>Go to the protocols</TextLink>
      </BeamEmpty>
    );
  }
  return (
    <>
      <h1 className="text-title pt-6">Which version is run?</h1>
      {unknownId !== null && (
        <p role="alert" className="text-fault font-strong mt-2">
          The address names a version that is not among the newest of this lab. Choose one here.
        </p>
      )}
      <div className="mt-6 overflow-x-auto">
        <table className="w-full border-t-[1.5px] border-ink">
          <thead>
            <tr className="text-s text-ink-2 text-start">
              <th scope="col" className="py-2 pr-4 text-start font-words">
                version
              </th>
              <th scope="col" className="py-2 pr-4 text-start font-words">
                protocol
              </th>
              <th scope="col" className="py-2 pr-4 text-start font-words">
                message
              </th>
              <th scope="col" className="py-2 pr-4 text-end font-words">
                settings
              </th>
              <th scope="col" className="py-2 text-start font-words">
                saved
              </th>
            </tr>
          </thead>
          <tbody>
            {versions.map((version) => (
              <tr key={version.id} className="border-t border-hair align-top">
                <td className="py-2 pr-4">
                  <VersionSeal state="saved" number={version.number} />
                </td>
                <td className="py-2 pr-4">
                  <TextLink to={startHref(labId, version)}>
                    {version.protocolName}, version {version.number}
                  </TextLink>
                  {newest.get(version.protocolId) !== version.number && (
                    <span className="block text-s text-ink-2">
                      version {newest.get(version.protocolId)} is newer
                    </span>
                  )}
                </td>
                <td className="py-2 pr-4">{version.message}</td>
                <td className="py-2 pr-4 text-end font-mono">{version.targetCount}</td>
                <td className="py-2">
                  {formatMoment(new Date(version.savedAt), now)}, {version.savedBy}
                </td>
              </tr>
            ))}
          </tbody>
        </table>
      </div>
      {more && (
        <p className="text-ink-2 mt-3">
          These are the newest. <TextLink to={`/labs/${labId}/review`}>All versions</TextLink> have their own
          pages, and each can be run from there.
        </p>
      )}
    </>
  );
}
