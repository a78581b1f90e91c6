import { Quantity } from '../components/NumberText';
import { Polariser } from '../components/Polariser';
import { formatAngle, formatUncertain } from '../lib/format';
import type { StageSizes } from './stage-layout';

export function Source({
  wavelengthNm,
  zoneHeight,
}: {
  readonly wavelengthNm: number;
  readonly zoneHeight: number;
}) {
  return (
    <li className="stage-item stage-source">
      <span className="stage-zone" style={{ height: zoneHeight }} aria-hidden="true">
        <span className="stage-source-tick" />
      </span>
      <strong className="stage-name">
        <span className="sr-only">source, </span>
        <Quantity text={String(wavelengthNm)} unit="nm" />
      </strong>
    </li>
  );
}

const ON_AXIS_WITHIN_DEG = 0.05;

/** `H` for 0°, `V` for 90°, the angle otherwise. */
export function axisName(axisDeg: number): string {
  const letters: readonly (readonly [number, string])[] = [
    [0, 'H'],
    [90, 'V'],
    [45, 'D'],
    [-45, 'A'],
  ];
  const near = letters.find(([at]) => Math.abs(((axisDeg - at + 90 + 360) % 180) - 90) < ON_AXIS_WITHIN_DEG);
  return near === undefined ? formatAngle(axisDeg) : near[1];
}

interface PolariserProps {
  readonly axisDeg: number;
  readonly axisSigmaDeg: number | null;
  readonly sizes: StageSizes;
  readonly viewedFrom: 'receiver' | 'source';
}

export function StagePolariser({ axisDeg, axisSigmaDeg, sizes, viewedFrom }: PolariserProps) {
  return (
    <li className="stage-item">
      <span className="stage-zone" style={{ height: sizes.zoneHeight }}>
        <Polariser radius={sizes.polariserRadius} axisDeg={axisDeg} viewedFrom={viewedFrom} />
      </span>
      <strong className="stage-name">polariser at {axisName(axisDeg)}</strong>
      <span className="stage-second font-mono">{formatUncertain(axisDeg, axisSigmaDeg, 2)}°</span>
    </li>
  );
}
