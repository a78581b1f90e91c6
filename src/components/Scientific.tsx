import { formatInfidelity } from '../lib/format/fidelity';
import { uncertainScientific } from '../lib/format/uncertain';
import { ScientificText } from './NumberText';

interface ScientificProps {
  readonly value: number | null;
  /** Standard uncertainty; its digits go into the bracket. */
  readonly sigma?: number | null | undefined;
  /** Keeps the power of ten, so that a column shares one. */
  readonly exponent?: number | undefined;
  /** Decimals of the mantissa when there is no sigma. */
  readonly decimals?: number;
  readonly mono?: boolean;
  readonly className?: string | undefined;
}

/** 1 − F and other small numbers: `2.5 × 10⁻⁵`, `1.8(5) × 10⁻⁴`. */
export function Scientific({
  value,
  sigma,
  exponent,
  decimals = 1,
  mono = true,
  className,
}: ScientificProps) {
  const parts =
    (sigma !== undefined && sigma !== null) || exponent !== undefined
      ? uncertainScientific(value, sigma ?? null, exponent)
      : formatInfidelity(value, decimals);
  return <ScientificText {...parts} mono={mono} className={className} />;
}
