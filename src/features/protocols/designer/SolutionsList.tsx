import type { Plate } from '../../../../shared/schemas/cabinet';
import { wrapSigned } from '../../../../shared/optics/units';
import { Scientific } from '../../../components/Scientific';
import { TextButton } from '../../../components/TextLink';
import { formatDial, formatTheta } from '../../../lib/format';
import { dialledAxisDeg } from './dialled-problem';
import type { RowView, SettingSolution } from './row-view';

interface SolutionsListProps {
  readonly view: Extract<RowView, { status: 'solved' }>;
  readonly plates: readonly Plate[];
  readonly label: string;
  readonly mayWrite: boolean;
  readonly rowIndex: number;
  readonly onHold: (fastAxesDeg: readonly number[] | null) => void;
}

/** How far all mounts turn from one setting to another, each the shorter way, in degrees. */
export function travelDeg(from: SettingSolution, to: SettingSolution): number {
  return to.dialsDeg.reduce(
    (sum, dialDeg, plate) => sum + Math.abs(wrapSigned(dialDeg - (from.dialsDeg[plate] ?? dialDeg), 360)),
    0,
  );
}

/** Every setting that makes the target, as ranked; one of them can be held. */
export function SolutionsList({ view, plates, label, mayWrite, rowIndex, onHold }: SolutionsListProps) {
  const { solved, solution, chosen, held } = view;
  return (
    <tr className="target-note" aria-rowindex={rowIndex}>
      <td colSpan={2} />
      <td colSpan={plates.length + 3}>
        <table className="my-2 w-full" aria-label={`Solutions for ${label}`}>
          <thead>
            <tr className="text-s text-ink-2">
              <th scope="col" className="w-10 text-left font-words">
                <span className="sr-only">solution</span>
              </th>
              {plates.map(({ id, name }) => (
                <th key={id} scope="col" className="text-right font-words">
                  {name} dial, θ
                </th>
              ))}
              <th scope="col" className="text-right font-words">
                expected 1 − F
              </th>
              <th scope="col" className="text-right font-words">
                travel
              </th>
              <th scope="col">
                <span className="sr-only">hold</span>
              </th>
            </tr>
          </thead>
          <tbody>
            {solved.solutions.map((other, index) => (
              <tr key={other.fastAxesDeg.join()} className="border-t border-hair">
                <th scope="row" className="h-8 text-left font-mono text-s font-words">
                  {index + 1}
                </th>
                {plates.map((plate, place) => (
                  <td key={plate.id} className="text-right font-mono">
                    {formatDial(other.dialsDeg[place] ?? 0, plate.mount.resolutionDeg)}
                    <span className="theta">
                      {formatTheta(dialledAxisDeg(plate, other.dialsDeg[place] ?? 0))}
                    </span>
                  </td>
                ))}
                <td className="text-right">
                  <Scientific value={other.expectedInfidelity} />
                </td>
                <td className="text-right font-mono text-s">{travelDeg(solution, other).toFixed(1)}°</td>
                <td className="pl-4 text-right">
                  {index === chosen && held && mayWrite && (
                    <TextButton onClick={() => onHold(null)}>Let go, follow the ranking</TextButton>
                  )}
                  {index === chosen && !held && <span className="text-s text-ink-2">stands</span>}
                  {index !== chosen && mayWrite && (
                    <TextButton onClick={() => onHold(other.fastAxesDeg)}>Hold this one</TextButton>
                  )}
                </td>
              </tr>
            ))}
          </tbody>
        </table>
      </td>
    </tr>
  );
}
