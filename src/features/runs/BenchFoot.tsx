import type { VersionContent } from '../../../shared/schemas/versions';
import { Button } from '../../components/Button';
import { ProgressRule } from '../../components/ProgressRule';
import { minutesLeft } from './run-progress';
import type { Bench } from './use-bench';
import { useLongPress } from './use-long-press';

interface BenchFootProps {
  readonly bench: Bench;
  readonly content: VersionContent;
  /** What the one button says; null when there is nothing to confirm. */
  readonly mainLabel: string | null;
  readonly onMain: () => void;
  readonly onOther: (() => void) | null;
  readonly onTrouble: () => void;
  readonly onSettings: () => void;
}

/** How far the run is, and the buttons: trouble, something else, and the one that repeats the number. */
export function BenchFoot({
  bench,
  content,
  mainLabel,
  onMain,
  onOther,
  onTrouble,
  onSettings,
}: BenchFootProps) {
  const press = useLongPress(onMain, onOther ?? onMain);
  return (
    <footer className="bench-foot">
      <button type="button" className="bench-rule" aria-haspopup="dialog" onClick={onSettings}>
        <ProgressRule
          divisions={content.targets.map(({ label }, index) => ({
            label,
            state: bench.outcomes[index] ?? 'open',
          }))}
          current={bench.setting}
        />
        <span className="bench-rule-words">
          <RunWords bench={bench} />
          <u>Settings and more</u>
        </span>
      </button>
      <Button
        size="far"
        className="bench-trouble"
        aria-haspopup="dialog"
        aria-keyshortcuts="t"
        onClick={onTrouble}
      >
        Note trouble
      </Button>
      {onOther !== null && (
        <Button
          size="far"
          className="bench-trouble"
          aria-haspopup="dialog"
          aria-keyshortcuts="e"
          onClick={onOther}
        >
          It says something else
        </Button>
      )}
      {mainLabel !== null && (
        <Button size="far" kind="filled" className="bench-main" aria-keyshortcuts="Space" {...press}>
          {mainLabel}
        </Button>
      )}
    </footer>
  );
}

/** What is behind and what is left, on one line. */
function RunWords({ bench }: { readonly bench: Bench }) {
  const recorded = bench.outcomes.filter((outcome) => outcome === 'done').length;
  const skipped = bench.outcomes.flatMap((outcome, index) => (outcome === 'skipped' ? [index] : []));
  const open = bench.settingCount - recorded - skipped.length;
  const minutes = minutesLeft(
    bench.readings.map(({ recordedAt }) => recordedAt),
    open,
  );
  const [only] = skipped;
  const parts = [
    minutes === null ? `${recorded} recorded` : `about ${minutes} min left at this pace`,
    skipped.length === 1 && only !== undefined
      ? `setting ${only + 1} was skipped: “${bench.newest[only]?.note ?? ''}”`
      : skipped.length > 1
        ? `${skipped.length} were skipped`
        : null,
  ];
  return <span>{parts.filter((part) => part !== null).join('; ')}</span>;
}
