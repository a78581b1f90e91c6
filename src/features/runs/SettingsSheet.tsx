import type { VersionContent } from '../../../shared/schemas/versions';
import { useTheme } from '../../app/theme';
import { Button } from '../../components/Button';
import { Lamp, LampInkSwitch } from '../../components/Lamp';
import type { Command } from '../../lib/commands';
import { formatTime } from '../../lib/format';
import { BenchSheet } from './BenchSheet';
import { KeyList } from './KeyList';
import type { Bench, BenchReading } from './use-bench';

interface SettingsSheetProps {
  readonly bench: Bench;
  readonly content: VersionContent;
  readonly commands: readonly Command[];
  readonly onGo: (setting: number) => void;
  readonly onBlank: () => void;
  readonly onClose: () => void;
}

/** Every setting with what became of it, and how the bench looks: side, light, keys. */
export function SettingsSheet({ bench, content, commands, onGo, onBlank, onClose }: SettingsSheetProps) {
  const { benchTheme, chooseBenchTheme } = useTheme();
  const { side, stand } = bench.entry;
  return (
    <BenchSheet title="Settings of this run" onClose={onClose} tall>
      <ol className="bench-settings">
        {content.targets.map((target, index) => {
          const reading = bench.newest[index];
          return (
            <li key={target.id}>
              <button
                type="button"
                className="bench-setting"
                data-outcome={bench.outcomes[index]}
                aria-current={index === bench.setting ? 'step' : undefined}
                {...(index === bench.setting ? { 'data-first': '' } : {})}
                onClick={() => onGo(index)}
              >
                <span className="bench-setting-number font-mono">{index + 1}</span>
                <span className="bench-setting-label">
                  {target.label === '' ? target.expression : target.label}
                </span>
                <span className="bench-setting-outcome">
                  {reading === undefined
                    ? index === bench.setting
                      ? 'open now'
                      : 'open'
                    : outcomeWords(reading)}
                </span>
                {reading?.outcome === 'skipped' && <span className="bench-setting-note">{reading.note}</span>}
              </button>
            </li>
          );
        })}
      </ol>
      <p className="bench-sheet-text">
        A setting that is recorded or skipped can be done again: the new reading takes the old one’s place,
        and both are kept.
      </p>
      <div className="bench-sheet-actions">
        <Button
          size="far"
          aria-pressed={side === 'source'}
          onClick={() => stand(side === 'source' ? 'receiver' : 'source')}
        >
          {side === 'source' ? 'I stand on the receiver side' : 'I stand on the source side'}
        </Button>
        <Button size="far" onClick={() => chooseBenchTheme(benchTheme === 'day' ? 'dark-room' : 'day')}>
          {benchTheme === 'day' ? 'Show the dark room' : 'Show in daylight'}
        </Button>
        <Button size="far" onClick={onBlank}>
          Dark until a key
        </Button>
        <Button size="far" kind="filled" onClick={onClose}>
          Go on at the bench
        </Button>
      </div>
      <div className="bench-sheet-extras">
        {benchTheme === 'dark-room' && (
          <>
            <Lamp />
            <LampInkSwitch />
          </>
        )}
        <KeyList commands={commands} />
      </div>
    </BenchSheet>
  );
}

function outcomeWords(reading: BenchReading): string {
  const time = formatTime(new Date(reading.recordedAt));
  const done = reading.outcome === 'done' ? 'recorded' : 'skipped';
  return reading.recordedBy === null ? `${done} ${time}, waits here` : `${done} ${time}`;
}
