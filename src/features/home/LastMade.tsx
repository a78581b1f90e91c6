import type { LastMade } from '../../../shared/schemas/home';
import { classNames } from '../../components/class-names';
import { FidelityChip } from '../../components/FidelityChip';
import { fidelityVerdict } from '../../components/fidelity-verdict';
import { Scientific } from '../../components/Scientific';
import { TextLink } from '../../components/TextLink';
import { formatShortDate } from '../../lib/format';
import { useWidth } from '../../lib/use-width';
import { useLab } from '../labs';
import { sharedAxis } from './shared-axis';

const deskAxisWidth = 234;

/** The worst target of each protocol's last run on one axis, so that the protocols can be compared. */
export function LastMadeAxis({ items }: { readonly items: readonly LastMade[] }) {
  const { lab } = useLab();
  // On a phone the axis has the whole column, so its width is what the head's line is given.
  const [head, axisWidth] = useWidth<HTMLParagraphElement>(deskAxisWidth);
  const axis = sharedAxis(items);
  const [worst, best] = axis;
  // The last mark's place belongs to the word that says which way is better.
  const marks = Array.from({ length: worst - best }, (_, k) => worst - k).filter(
    (power) => ((worst - power) / (worst - best)) * axisWidth < axisWidth - 70,
  );
  return (
    <div>
      <div className="border-hair flex items-end justify-between gap-4 border-b pb-2 max-sm:flex-wrap">
        <p className="text-xs text-ink-2">
          worst target as dialled, 1 − F;
          <br />
          <BracketSign /> is the tolerance
        </p>
        <p
          ref={head}
          className="text-xs text-ink-2 relative h-4 w-58.5 shrink-0 max-sm:w-full"
          aria-hidden="true"
        >
          {marks.map((power, index) => (
            <span
              key={power}
              // Centred on its tick, the first number would stand half outside the column.
              className={classNames('absolute -translate-x-1/2', index === 0 && 'max-sm:translate-x-0')}
              style={{ left: ((worst - power) / (worst - best)) * axisWidth }}
            >
              <PowerOfTen power={power} />
            </span>
          ))}
          <span className="absolute right-0">better →</span>
        </p>
      </div>
      <ul>
        {items.map((item) => {
          // What the dials make with the plates as calibrated: one number, with no interval of its own.
          const infidelity = {
            value: item.dialledInfidelity,
            low: item.dialledInfidelity,
            high: item.dialledInfidelity,
          };
          const verdict = fidelityVerdict(infidelity, item.toleranceInfidelity);
          return (
            <li
              key={item.protocolId}
              className="border-hair flex items-start justify-between gap-x-4 border-b py-2 max-sm:flex-wrap"
            >
              <div className="min-w-0">
                <p className="font-strong">
                  <TextLink to={`/labs/${lab.id}/bench/runs/${item.runId}/record`} className="border-b-0!">
                    {item.protocolName} {item.versionNumber}
                  </TextLink>
                </p>
                <p className="text-s text-ink-2">
                  {item.benchName}, run {item.runNumber}, {formatShortDate(new Date(item.recordedAt))}
                </p>
              </div>
              <div className="shrink-0">
                <FidelityChip
                  infidelity={infidelity}
                  tolerance={item.toleranceInfidelity}
                  kind="measured"
                  axis={axis}
                  width={axisWidth}
                  className="-mr-0.75"
                />
                <p className="text-s text-right">
                  <b>{item.label}</b> <Scientific value={item.dialledInfidelity} />
                  {verdict !== 'within' && <span className="text-fault font-strong"> {verdict}</span>}
                </p>
              </div>
            </li>
          );
        })}
      </ul>
    </div>
  );
}

function PowerOfTen({ power }: { readonly power: number }) {
  return (
    <span className="font-mono">
      10<sup>{String(power).replace('-', '\u2212')}</sup>
    </span>
  );
}

function BracketSign() {
  return (
    <svg
      viewBox="0 0 6 14"
      width={6}
      height={13}
      role="img"
      aria-label="the bracket"
      className="inline-block align-[-2px]"
    >
      <path d="M5 1H1V13H5" fill="none" className="stroke-ink" strokeWidth={1.6} />
    </svg>
  );
}
