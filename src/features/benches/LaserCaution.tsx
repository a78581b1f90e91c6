import type { LaserClass } from '../../../shared/schemas/benches';
import { CautionSign } from '../../components/SmallSigns';
import { GapText } from '../../lib/GapText';
import { cautionWords, classWords, needsCaution } from './laser-caution-words';

export interface LaserCautionProps {
  readonly laserClass: LaserClass;
  readonly hazardWavelengthsNm: readonly number[];
  /** `full` asks to be read, `short` stays in view. */
  readonly variant: 'full' | 'short';
}

/** The usual cautions where the beam can hurt; the bare class where it is not held to. It never says that something is safe. */
export function LaserCaution({ laserClass, hazardWavelengthsNm, variant }: LaserCautionProps) {
  if (!needsCaution(laserClass)) return <p className="text-s text-ink-2">{classWords(laserClass)}</p>;
  const words = cautionWords(laserClass, hazardWavelengthsNm);
  if (variant === 'short') {
    return (
      <p className="text-s text-ink-2 flex items-start gap-2">
        <CautionSign />
        <span>
          <GapText text={words.short} />
        </span>
      </p>
    );
  }
  return (
    <div role="note" aria-label="Laser caution" className="flex items-start gap-4">
      <CautionSign />
      <div>
        <p className="font-strong">{words.title}</p>
        <ul className="mt-1 list-none space-y-1">
          {words.rules.map((rule) => (
            <li key={rule}>
              <GapText text={rule} />
            </li>
          ))}
        </ul>
        <p className="text-ink-2 mt-2">{words.defers}</p>
      </div>
    </div>
  );
}
