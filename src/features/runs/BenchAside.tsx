import { useTheme } from '../../app/theme';
import { Lamp } from '../../components/Lamp';
import { SaveState, type Saving } from '../../components/SaveState';

interface BenchAsideProps {
  readonly savedAt: Date | null;
  readonly waiting: number;
  /** Whether this browser keeps what waits through a reload. */
  readonly kept: boolean;
}

/** The right end of the beam: which of the three honest words holds, and the lamp. */
export function BenchAside({ savedAt, waiting, kept }: BenchAsideProps) {
  const dark = useTheme(({ benchTheme }) => benchTheme === 'dark-room');
  const saving: Saving | null =
    waiting > 0
      ? kept
        ? { kind: 'kept', waiting }
        : { kind: 'typed' }
      : savedAt === null
        ? null
        : { kind: 'saved', at: savedAt };
  return (
    <div className="bench-aside">
      {saving !== null && <SaveState saving={saving} one="reading" many="readings" className="bench-saved" />}
      {dark && <Lamp />}
    </div>
  );
}
