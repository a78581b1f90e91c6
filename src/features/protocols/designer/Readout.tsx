import type { Plate } from '../../../../shared/schemas/cabinet';
import { Scientific } from '../../../components/Scientific';
import { TextButton } from '../../../components/TextLink';
import { formatFidelity } from '../../../lib/format';
import { toleranceVerdict } from './verdict';
import type { RowView } from './row-view';
import { travelDeg } from './SolutionsList';

interface ReadoutProps {
  readonly label: string;
  readonly view: Extract<RowView, { status: 'solved' }>;
  readonly plates: readonly Plate[];
  readonly toleranceInfidelity: number;
  /** 1 − F with a plate turned by hand; null while the dials stand at the solution. */
  readonly byHandInfidelity: number | null;
  readonly onListSolutions: () => void;
}

const verdictWords = {
  within: '.',
  'not decided': ': the tolerance lies between, so it is not decided.',
  'not within': ': not within the tolerance.',
} as const;

/** The one number that the page is about, and what it is made of. */
export function Readout(props: ReadoutProps) {
  const { label, view, plates, toleranceInfidelity, byHandInfidelity, onListSolutions } = props;
  const { solution, solved, chosen } = view;
  const others = solved.solutions.filter((_, index) => index !== chosen);
  const nearest = Math.min(...others.map((other) => travelDeg(solution, other)));
  const steps = [...new Set(plates.map(({ mount }) => mount.resolutionDeg))];
  const rounding = solution.dialledInfidelity - solution.infidelity;
  if (byHandInfidelity !== null) {
    return (
      <aside aria-label={`Fidelity of ${label} as turned by hand`} className="readout">
        <p className="m-0 font-mono text-readout">{formatFidelity(1 - byHandInfidelity)}</p>
        <p className="mt-2 mb-0">
          fidelity to {label} as turned by hand, 1 − F <Scientific value={byHandInfidelity} />, with the
          plates exactly as calibrated
        </p>
      </aside>
    );
  }
  return (
    <aside aria-label={`Expected fidelity of ${label}`} className="readout">
      <p className="m-0 font-mono text-readout">{formatFidelity(1 - solution.expectedInfidelity)}</p>
      <p className="mt-2 mb-0">
        expected fidelity, 1 − F <Scientific value={solution.expectedInfidelity} />; nineteen in twenty below{' '}
        <Scientific value={solution.expectedHigh} />
        {verdictWords[toleranceVerdict(solution, toleranceInfidelity)]}
      </p>
      <p className="mt-2 mb-0">
        {rounding > 0 ? 'Rounding' : 'Rounding, which helps here,'} to the{' '}
        {steps.map((step) => `${step}°`).join(' and ')} dials {rounding > 0 ? 'costs' : 'changes it by'}{' '}
        <Scientific value={Math.abs(rounding)} />.
      </p>
      {others.length > 0 && (
        <p className="mt-2 mb-0">
          <TextButton onClick={onListSolutions}>
            {others.length === 1 ? '1 other solution' : `${others.length} other solutions`}
          </TextButton>
          , the nearest by {Math.round(nearest)}° of travel
        </p>
      )}
    </aside>
  );
}
