import type { VersionSummary } from '../../../shared/schemas/protocols';
import { TextLink } from '../../components/TextLink';
import { VersionSeal } from '../../components/VersionSeal';
import { formatMoment } from '../../lib/format';
import { ShortHash } from './ShortHash';

interface VersionsTableProps {
  readonly labId: string;
  readonly versions: readonly VersionSummary[];
  /** In a list over many protocols each row says whose version it is. */
  readonly namesProtocol: boolean;
}

/** Versions, newest first: the seal, what changed and why, who saved it when. */
export function VersionsTable({ labId, versions, namesProtocol }: VersionsTableProps) {
  return (
    <table className="mt-5 w-full border-collapse">
      <thead>
        <tr className="border-y border-ink text-left text-s text-ink-2">
          <th scope="col" className="h-8 w-14 font-words">
            version
          </th>
          {namesProtocol && (
            <th scope="col" className="font-words">
              protocol
            </th>
          )}
          <th scope="col" className="font-words">
            what changed, and why
          </th>
          <th scope="col" className="pr-6 text-right font-words max-sm:hidden">
            targets
          </th>
          <th scope="col" className="font-words max-md:hidden">
            saved
          </th>
          <th scope="col" className="font-words max-md:hidden">
            content
          </th>
        </tr>
      </thead>
      <tbody>
        {versions.map((version) => (
          <tr key={version.id} className="h-14 border-b border-hair align-middle hover:bg-wash">
            <td>
              <VersionSeal state="saved" number={version.number} />
            </td>
            {namesProtocol && (
              <th scope="row" className="pr-6 text-left font-strong">
                {version.protocolName}
              </th>
            )}
            <td className="py-3 pr-6">
              <TextLink to={`/labs/${labId}/plan/${version.protocolId}/versions/${version.number}`}>
                {version.message}
              </TextLink>
            </td>
            <td className="pr-6 text-right font-mono max-sm:hidden">{version.targetCount}</td>
            <td className="pr-6 text-s text-ink-2 max-md:hidden">
              {formatMoment(new Date(version.savedAt), new Date())}, {version.savedBy}
            </td>
            <td className="max-md:hidden">
              <ShortHash hash={version.contentHash} />
            </td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
