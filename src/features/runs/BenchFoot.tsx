import type { VersionContent } from '../../../shared/schemas/versions';
import { Button } from '../../components/Button';
import { ProgressRule, type RuleDivision } from '../../components/ProgressRule';
import { minutesLeft } from './run-progress';
import type { Bench } from './use-bench';
import type { BenchShape } from './use-bench-shape';
import { useLongPress } from './use-long-press';

/** About how wide the rule is, and a character under it: labels that would run into each other are left out. */
const ruleWidthPx: Readonly<Record<BenchShape, number>> = { landscape: 520, portrait: 752, phone: 350 };
const labelCharacterPx = 9;

interface BenchFootProps {
  readonly bench: Bench;
  readonly content: VersionContent;
  readonly shape: BenchShape;
  /** Said in the buttons’ place to somebody who may not record; null to everybody else. */
  readonly readOnly: string | null;
  /** What the one button says; null when there is nothing to confirm. */
  readonly mainLabel: string | null;
  readonly onMain: () => void;
  readonly onOther: (() => void) | null;
  /** Null where nothing can be recorded: a guest, or a paused run. */
  readonly onTrouble: (() => void) | null;
  readonly onSettings: () => void;
}

/** How far the run is, and the buttons: trouble, something else, and the one that repeats the number. */
export function BenchFoot({
  bench,
  content,
  shape,
  readOnly,
  mainLabel,
  onMain,
  onOther,
  onTrouble,
  onSettings,
}: BenchFootProps) {
  const press = useLongPress(onMain, onOther ?? onMain);
  const labelsFit =
    Math.max(...content.targets.map(({ label }) => label.length)) * labelCharacterPx + 6 <
    ruleWidthPx[shape] / bench.settingCount;
  const divisions = content.targets.map(({ label }, index): RuleDivision => {
    const outcome = bench.outcomes[index];
    const state =
      index === bench.setting ? 'current' : outcome === 'open' || outcome === undefined ? 'ahead' : outcome;
    // The index stands under the present one, and its label is at the head of the page.
    return { group: labelsFit && state !== 'current' ? label : '', state };
  });
  return (
    <footer className="bench-foot">
      <button type="button" className="bench-rule" aria-haspopup="dialog" onClick={onSettings}>
        <ProgressRule
          divisions={divisions}
          label={
            bench.setting < bench.settingCount
              ? `setting ${bench.setting + 1} of ${bench.settingCount}`
              : 'all settings passed'
          }
          showGroups={labelsFit}
        />
        <span className="bench-rule-words">
          <RunWords bench={bench} />
          <u>all settings</u>
        </span>
      </button>
      {readOnly !== null && <p className="bench-read-only">{readOnly}</p>}
      {onTrouble !== null && (
        <Button
          size="far"
          className="bench-trouble"
          aria-haspopup="dialog"
          aria-keyshortcuts="t"
          onClick={onTrouble}
        >
          Note trouble
        </Button>
      )}
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
        <div className="bench-main-place">
          <Button size="far" kind="filled" className="bench-main" aria-keyshortcuts="Space" {...press}>
            {mainLabel}
          </Button>
        </div>
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
